/** A frozen revision as the new working state: one edit, which can be undone like any other. */
import type { Caller } from "../auth/caller.server";
import type { ModelRow } from "../db/repositories/models.server";
import { toState } from "../domain/compare/merge/model-state";
import { listStateOperations } from "../domain/compare/merge/state-operations";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { applyEdit } from "./apply-edit.server";
import { loadState } from "./load-revision.server";
import { loadWorkingModel } from "./working-model.server";

/** Answers how many operations it took. Problems: `request.not-found`, `revision.is-now`, those of the operations. */
export async function restoreRevision(author: Caller, model: ModelRow, number: number): Promise<Result<{ operations: number }>> {
  const wanted = await loadState(model, number);
  const working = await loadWorkingModel(model.id);
  if (!wanted || !working) return fail(problem("request.not-found"));
  const operations = listStateOperations(working.space, toState(wanted));
  if (operations.length === 0) return fail(problem("revision.is-now", { number }));
  const edited = await applyEdit(author, model.id, { base: working.seq, label: "restore", operations });
  return edited.ok ? ok({ operations: operations.length }) : edited;
}
