import { z } from "zod";
import { requireModel } from "~/auth/require-model.server";
import { leaseNodeIds } from "~/services/lease-node-ids.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-lease";

const leaseSchema = z.strictObject({ clientId: z.string().min(1).max(100) });

/** `POST /models/:modelId/lease`: a block of numeric identifiers for one window, both ends included. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "POST");
  const { clientId } = await requireJson(request, leaseSchema);
  const block = await leaseNodeIds(model, clientId, caller.userId);
  if (!block.ok) throw problemResponse(409, block.problems);
  return Response.json(block.value);
}
