/** Machines that stand on working states of their types, as models from before did, are held at frozen revisions from now on. */
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { findModel, updateModelStatement, type ModelRow } from "../db/repositories/models.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { publish } from "./event-hub.server";
import { freezeRevision } from "./freeze-revision.server";
import { choosePins } from "./pins.server";
import { forgetWorkingModel, inModelTurn, loadWorkingModel } from "./working-model.server";

/** Types that were edited since they were frozen are frozen first, so that nothing changes for the machines. Problems: those of freezing. */
export async function holdTypes(author: Caller, model: ModelRow): Promise<Result<null>> {
  const working = await loadWorkingModel(model.id);
  if (!working) return fail(problem("request.not-found"));
  for (const { from } of working.layers) {
    const types = from && (await findModel(from.modelId));
    if (!types) continue;
    const frozen = await freezeRevision(author, types, `For the machines of ${model.name}`);
    if (!frozen.ok && frozen.problems.some((found) => found.code !== "revision.unchanged")) return frozen;
  }
  const pins = await choosePins(model.organizationId, working.space.own.header, []);
  await inModelTurn(model.id, async () => {
    await writeBatch([
      updateModelStatement(model.id, { pins }),
      addAuditStatement({
        organizationId: model.organizationId,
        userId: author.userId,
        userName: author.name,
        action: "model.hold-types",
        subject: { kind: "model", id: model.id, name: model.name },
        details: { pins: pins.map(({ modelUri, number }) => ({ modelUri, number })) },
      }),
    ]);
    forgetWorkingModel(model.id);
  });
  publish(`model:${model.id}`, { pinned: true, by: "" });
  return ok(null);
}
