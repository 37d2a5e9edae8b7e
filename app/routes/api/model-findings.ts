import { requireModel } from "~/auth/require-model.server";
import { reportModel } from "~/services/check-model.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-findings";

/** `GET /api/v1/models/{id}/findings`: what the checker says of the working state. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const report = await reportModel(model.id);
  if (!report) throw failWith(404, "request.not-found");
  return Response.json(report, { headers: { "cache-control": "no-store" } });
});

export const action = refuseChanges;
