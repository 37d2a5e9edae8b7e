/** One signal of one machine proved by hand: stimulus, local reading and the value shown, within a tolerance. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addPointCheckStatement } from "../db/repositories/as-built.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import type { ModelRow } from "../db/repositories/models.server";
import { findParent, getPath } from "../domain/address-space/browse";
import { parseNodeId, type NodeKey } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";
import { loadWorkingModel } from "./working-model.server";

export const pointCheckSchema = z.strictObject({
  /** NodeId text of the Variable. */
  nodeId: z.string().min(3).max(4_000),
  stimulus: z.string().trim().min(1, "say what was done to the sensor").max(500),
  localReading: z.coerce.number(),
  shownValue: z.coerce.number(),
  tolerance: z.coerce.number().min(0),
  unit: z.string().trim().max(50).default(""),
  note: z.string().trim().max(1_000).default(""),
});
export type PointCheckIntent = z.infer<typeof pointCheckSchema>;

/** Problem: `point-check.no-variable`. */
export async function recordPointCheck(author: Caller, model: ModelRow, intent: PointCheckIntent): Promise<Result<{ id: string; isWithin: boolean }>> {
  const space = (await loadWorkingModel(model.id))?.space;
  const parsed = parseNodeId(intent.nodeId, []);
  const node = parsed.ok ? space?.findByNodeId(parsed.value) : undefined;
  if (!space || node?.nodeClass !== "Variable") return fail(problem("point-check.no-variable", { nodeId: intent.nodeId }));
  const isWithin = Math.abs(intent.localReading - intent.shownValue) <= intent.tolerance;
  const id = newId();
  const path = getPath(space, node.key);
  await writeBatch([
    addPointCheckStatement({
      id,
      organizationId: model.organizationId,
      modelId: model.id,
      machineKey: findMachine(space, node.key),
      path,
      ...intent,
      isWithin,
      checkedBy: author.name,
      at: new Date(),
      dueSince: null,
    }),
    addAuditStatement({
      organizationId: model.organizationId,
      userId: author.userId,
      userName: author.name,
      action: "point-check.record",
      subject: { kind: "model", id: model.id, name: model.name },
      details: { path, isWithin, localReading: intent.localReading, shownValue: intent.shownValue, tolerance: intent.tolerance },
    }),
  ]);
  return ok({ id, isWithin });
}

type Space = NonNullable<Awaited<ReturnType<typeof loadWorkingModel>>>["space"];

/** The topmost own Object above the Variable: the machine. */
function findMachine(space: Space, key: NodeKey): NodeKey {
  let machine = key;
  for (let at = findParent(space, key); at !== undefined && space.isOwn(at) && at !== machine; at = findParent(space, at)) machine = at;
  return machine;
}
