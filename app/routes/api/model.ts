import { requireModel } from "~/auth/require-model.server";
import { toModelJson } from "~/utils/api-schemas";
import { deleteModel } from "~/services/update-model.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/model";

/** `GET /api/v1/models/{id}` */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json(toModelJson(model), { headers: { "cache-control": "no-store" } });
});

/** `DELETE /api/v1/models/{id}`: with its history; 409 while other models require it. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "DELETE");
  const deleted = await deleteModel(caller, model);
  return deleted.ok ? new Response(null, { status: 204 }) : problemResponse(409, deleted.problems);
});
