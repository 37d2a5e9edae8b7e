/** An edit that a page or a service makes instead of an editing window: one transaction on the state that was looked at. */
import type { Caller } from "../auth/caller.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import type { Operation } from "../domain/editing/operation";
import { newId } from "../utils/ids.server";
import { appendTransactions } from "./working-model.server";

export type PageEdit = {
  readonly base: number;
  readonly label: string;
  readonly operations: readonly Operation[];
  /** Set by releasing alone: the version that is written in is no edit that would need a review. */
  readonly keepsApprovals?: true;
};

/** Answers the new head. Problems: `transactions.stale`, `request.not-found`, those of the operations. */
export async function applyEdit(author: Caller, modelId: string, { base, label, operations, keepsApprovals }: PageEdit): Promise<Result<{ head: number }>> {
  const outcome = await appendTransactions(modelId, author, {
    clientId: `page-${newId()}`,
    base,
    transactions: [{ clientSeq: 1, label, operations }],
    ...(keepsApprovals ? { keepsApprovals } : {}),
  });
  switch (outcome.kind) {
    case "accepted":
      return ok({ head: outcome.head });
    case "refused":
      return fail(...outcome.problems);
    case "stale":
      return fail(problem("transactions.stale"));
    case "gone":
      return fail(problem("request.not-found"));
  }
}
