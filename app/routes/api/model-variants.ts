import { requireModel } from "~/auth/require-model.server";
import { branchModel, branchSchema, listModelVariants } from "~/services/branch-model.server";
import { handleApi } from "~/utils/api-handler.server";
import { toModelJson } from "~/utils/api-schemas";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-variants";

/** `GET /api/v1/models/{id}/variants` */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json((await listModelVariants(model)).map(toModelJson), { headers: { "cache-control": "no-store" } });
});

/** `POST` `{revision, name}`: a branch of the model for a trial. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "POST");
  const made = await branchModel(caller, model, await requireJson(request, branchSchema));
  return made.ok ? Response.json(toModelJson(made.value), { status: 201 }) : problemResponse(422, made.problems);
});
