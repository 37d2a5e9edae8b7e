/** Lays the retrofit starter out in a model that was just created: one transaction, which can be undone like any other. */
import type { Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { BlockAllocator } from "../domain/editing/allocate-node-id";
import { layOutRetrofit } from "../domain/editing/starters/lay-out-retrofit";
import { newId } from "../utils/ids.server";
import { leaseNodeIds } from "./lease-node-ids.server";
import { appendTransactions, loadWorkingModel } from "./working-model.server";

/** Problems: those of the commands, and of models that the starter needs and the model does not require. */
export async function startRetrofit(author: Caller, model: ModelRow, typeName: string): Promise<Result<null>> {
  const clientId = `starter-${newId()}`;
  const lease = await leaseNodeIds(model, clientId, author.userId);
  if (!lease.ok) return lease;
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const ids = BlockAllocator.forModel(() => working.space, [lease.value]);
  const edit = layOutRetrofit(working.space, ids, { name: typeName });
  if (!edit.ok) return edit;
  const outcome = await appendTransactions(model.id, author, {
    clientId,
    base: working.seq,
    transactions: [{ clientSeq: 1, label: "lay-out-retrofit", operations: edit.value.operations }],
  });
  if (outcome.kind === "accepted") return ok(null);
  return fail(...(outcome.kind === "refused" ? outcome.problems : [problem("transactions.stale")]));
}
