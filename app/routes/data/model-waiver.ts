import { requireModel } from "~/auth/require-model.server";
import { removeWaiver } from "~/services/save-waiver.server";
import { requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-waiver";

/** `DELETE /models/:modelId/waivers/:waiverId`: the finding is open again. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "DELETE");
  const removed = await removeWaiver(caller, model, params.waiverId);
  return removed.ok ? new Response(null, { status: 204 }) : problemResponse(404, removed.problems);
}
