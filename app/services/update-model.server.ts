import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { listVariants, removeModelStatement, updateModelStatement, type ModelRow } from "../db/repositories/models.server";
import { addRetiredStatements } from "../db/repositories/node-ids.server";
import { listReleases } from "../db/repositories/releases.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { publish } from "./event-hub.server";
import { isInLibrary, listDependents } from "./required-models.server";
import { toRetired } from "./retire-node-ids.server";
import { forgetWorkingModel, inModelTurn, loadWorkingModel } from "./working-model.server";

/** The name that the team gives the model; namespace and version belong to its contents. */
export async function renameModel(author: Caller, model: ModelRow, name: string): Promise<void> {
  await inModelTurn(model.id, async () => {
    await writeBatch([
      updateModelStatement(model.id, { name, updatedAt: new Date(), updatedBy: author.name }),
      addAuditStatement({ ...describe(author, model), action: "model.rename", details: { from: model.name, to: name } }),
    ]);
    forgetWorkingModel(model.id);
  });
  publish(`models:${model.organizationId}`, { id: model.id, change: "renamed" });
}

/**
 * Deletes a model with its history, sheets and variants; its NodeIds stay in the ledger, so that none is given again.
 * Problems: `model.has-releases`; `model.required-by-others`, unless the library has the same namespace for them to fall
 * back on. Nobody stands on a variant.
 */
export async function deleteModel(author: Caller, model: ModelRow): Promise<Result<null>> {
  if ((await listReleases(model.id)).length > 0) return fail(problem("model.has-releases"));
  const isElsewhere = model.variantOf !== null || (await isInLibrary(model.organizationId, model.namespaceUri));
  const users = isElsewhere ? [] : await listDependents(model.organizationId, model.namespaceUri);
  if (users.length > 0) return fail(problem("model.required-by-others", { names: users.join(", ") }));
  const variants = await listVariants(model.id);
  await inModelTurn(model.id, async () => {
    const nodes = (await loadWorkingModel(model.id))?.space.listOwnNodes() ?? [];
    await writeBatch([
      removeModelStatement(model.id),
      ...variants.map((variant) => removeModelStatement(variant.id)),
      ...addRetiredStatements(model.organizationId, nodes.map(toRetired)),
      addAuditStatement({ ...describe(author, model), action: "model.delete", details: { namespaceUri: model.namespaceUri } }),
    ]);
    for (const { id } of [model, ...variants]) forgetWorkingModel(id);
  });
  for (const { id } of [model, ...variants]) publish(`model:${id}`, { deleted: true });
  publish(`models:${model.organizationId}`, { id: model.id, change: "deleted" });
  return ok(null);
}

function describe(author: Caller, model: ModelRow) {
  return {
    organizationId: model.organizationId,
    userId: author.userId,
    userName: author.name,
    subject: { kind: "model", id: model.id, name: model.name },
  };
}
