import { requireModel } from "~/auth/require-model.server";
import { presentLayers } from "~/presenters/model-workspace.server";
import { loadWorkingModel } from "~/services/working-model.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-layers";

/** `GET /models/:modelId/layers`: the required models beneath, for a window that has changed which ones there are. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const working = await loadWorkingModel(model.id);
  if (!working) throw failWith(404, "request.not-found");
  return Response.json(presentLayers(working), { headers: { "cache-control": "no-store" } });
}
