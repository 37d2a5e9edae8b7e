/** Types of a model into a namespace of their own: a new model, and one edit of the old one, which then requires it. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { findModel, type ModelRow } from "../db/repositories/models.server";
import type { NodeKey } from "../domain/address-space/node-id";
import { listSplittableTypes, splitModel } from "../domain/compare/split-model";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { addModel } from "./add-model.server";
import { applyEdit } from "./apply-edit.server";
import { deleteModel } from "./update-model.server";
import { loadWorkingModel } from "./working-model.server";

export const splitSchema = z.strictObject({
  name: z.string().trim().min(1).max(100),
  namespaceUri: z.string().trim().min(1).max(400),
  /** Keys of types. */
  types: z.array(z.string().min(1).max(5000)).min(1).max(1000),
});

/** Problems: those of `splitModel`, `model.namespace-taken`; when the old model cannot follow, the new one is taken away again. */
export async function splitOffModel(author: Caller, model: ModelRow, intent: z.infer<typeof splitSchema>): Promise<Result<ModelRow>> {
  if (model.variantOf !== null) return fail(problem("variant.of-variant"));
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  const parts = splitModel(working.space, {
    types: intent.types as readonly string[] as readonly NodeKey[],
    namespaceUri: intent.namespaceUri,
    version: "1.0.0",
    publicationDate: `${new Date().toISOString().slice(0, 19)}Z`,
  });
  if (!parts.ok) return parts;
  const { content, operations } = parts.value;
  const added = await addModel(author, model.organizationId, {
    name: intent.name,
    kind: "types",
    content,
    message: `Split off from ${model.name}`,
  });
  if (!added.ok) return added;
  const edited = await applyEdit(author, model.id, { base: working.seq, label: "split-off", operations });
  if (edited.ok) return ok((await findModel(added.value.id)) ?? added.value);
  await deleteModel(author, added.value);
  return edited;
}

/** The types that can be chosen. */
export async function listSplitChoices(model: ModelRow): Promise<ReturnType<typeof listSplittableTypes>> {
  const working = await loadWorkingModel(model.id);
  return working ? listSplittableTypes(working.space) : [];
}
