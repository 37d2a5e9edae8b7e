import { z } from "zod";
import { requireModel } from "~/auth/require-model.server";
import { leaseNodeIds, MAX_LEASE_SIZE } from "~/services/lease-node-ids.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-lease";

const leaseSchema = z.strictObject({ clientId: z.string().min(1).max(100), count: z.int().min(1).max(MAX_LEASE_SIZE).optional() });

/** `POST /models/:modelId/lease`: a block of `count` numeric identifiers for one window, both ends included. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "POST");
  const { clientId, count } = await requireJson(request, leaseSchema);
  const block = await leaseNodeIds(model, clientId, caller.userId, count);
  if (!block.ok) throw problemResponse(409, block.problems);
  return Response.json(block.value);
}
