import { requireModel } from "~/auth/require-model.server";
import { toWaiverFile } from "~/domain/checks/waiver-file";
import { presentWaivers } from "~/presenters/waivers.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import type { Route } from "./+types/model-waivers";

/** `GET /api/v1/models/{id}/waivers`: what people have accepted, as the file that `ferrule check --waivers` reads. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json(toWaiverFile(await presentWaivers(model.id)), { headers: { "cache-control": "no-store" } });
});

export const action = refuseChanges;
