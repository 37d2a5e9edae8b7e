import { z } from "zod";
import { requireModel } from "~/auth/require-model.server";
import { NODE_CLASSES } from "~/domain/address-space/id-policy";
import { leaseNodeIds, listGivenPaths, MAX_LEASE_SIZE } from "~/services/lease-node-ids.server";
import { loadWorkingModel } from "~/services/working-model.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-lease";

const leaseSchema = z.strictObject({
  clientId: z.string().min(1).max(100),
  count: z.int().min(1).max(MAX_LEASE_SIZE).optional(),
  nodeClass: z.enum(NODE_CLASSES).optional(),
});

/**
 * `POST /models/:modelId/lease`: `{block?, given?}`, a block of numeric identifiers for one window, both ends included, from
 * the range of a class where the model gives it one; no block when there is no number left. `given` are string identifiers
 * that were given before, for a model that names nodes by their paths.
 */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "POST");
  const { nodeClass, clientId, count } = await requireJson(request, leaseSchema);
  const working = await loadWorkingModel(model.id);
  if (!working) throw failWith(404, "request.not-found");
  const intent = { clientId, userId: caller.userId, ...(count === undefined ? {} : { count }) };
  const block = await leaseNodeIds(model, working.space, nodeClass, intent);
  const isByPath = working.space.own.header.idPolicy?.kind === "paths";
  return Response.json({
    ...(block.ok ? { block: block.value } : {}),
    ...(isByPath ? { given: await listGivenPaths(model) } : {}),
  });
}
