import { requireModel } from "~/auth/require-model.server";
import { readModelReleases } from "~/services/read-release.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import type { Route } from "./+types/model-releases";

/** `GET /api/v1/models/{id}/releases`: newest first, withdrawn ones among them. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json(await readModelReleases(model), { headers: { "cache-control": "no-store" } });
});

export const action = refuseChanges;
