/** A list of NodeIds from another tool: the nodes that it names get its ids, in one transaction that can be undone. */
import type { Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { BlockAllocator } from "../domain/editing/allocate-node-id";
import { renumberNodes } from "../domain/editing/commands/renumber-nodes";
import { planNodeIds, readNodeIdsCsv, type NodeIdRow } from "../domain/nodeset/node-ids-csv";
import { newId } from "../utils/ids.server";
import { appendTransactions, loadWorkingModel } from "./working-model.server";

export type AppliedNodeIds = {
  /** Nodes that got another NodeId. */
  readonly changed: number;
  /** Rows that name no node of the model. */
  readonly unknown: readonly NodeIdRow[];
  /** Nodes that the list does not name; they keep their ids. */
  readonly unnamed: number;
};

/** All of the list or nothing. Problems: those of the reader, each with its line, and of `renumberNodes`. */
export async function applyNodeIds(author: Caller, model: ModelRow, csv: string): Promise<Result<AppliedNodeIds>> {
  const rows = readNodeIdsCsv(csv, model.namespaceUri);
  if (!rows.ok || rows.problems.length > 0) return fail(...rows.problems);
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const plan = planNodeIds(working.space, rows.value);
  const applied = { changed: plan.changes.length, unknown: plan.unknown, unnamed: plan.unnamed.length };
  if (plan.changes.length === 0) return ok(applied);
  const made = renumberNodes(working.space, new BlockAllocator(model.namespaceUri, []), { changes: plan.changes });
  if (!made.ok) return made;
  const outcome = await appendTransactions(model.id, author, {
    clientId: `node-ids-${newId()}`,
    base: working.seq,
    transactions: [{ clientSeq: 1, label: "renumber", operations: made.value.operations }],
  });
  if (outcome.kind === "accepted") return ok(applied);
  return outcome.kind === "refused" ? fail(...outcome.problems) : fail(problem("transactions.stale"));
}
