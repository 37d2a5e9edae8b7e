/** What changed between two states of one model, by meaning. */
import type { ModelRow } from "../db/repositories/models.server";
import { compareModels } from "../domain/compare/compare-models";
import type { Comparison } from "../domain/compare/change";
import { loadState, type StateName } from "./load-revision.server";

/** Undefined when the model has not both states. */
export async function compareStates(model: ModelRow, from: StateName, to: StateName): Promise<Comparison | undefined> {
  const before = await loadState(model, from);
  const after = await loadState(model, to);
  return before && after ? compareModels(before, after) : undefined;
}
