import { requireModel } from "~/auth/require-model.server";
import { presentRevisions } from "~/presenters/revisions.server";
import { freezeRevision, freezeSchema } from "~/services/freeze-revision.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/revisions";

/** `GET /api/v1/models/{id}/revisions`: newest first. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json(await presentRevisions(model), { headers: { "cache-control": "no-store" } });
});

/** `POST` `{message}`: freezes the working state. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "revision.freeze");
  requireMethod(request, "POST");
  const { message } = await requireJson(request, freezeSchema);
  const frozen = await freezeRevision(caller, model, message);
  if (!frozen.ok) return problemResponse(frozen.problems[0]?.code === "revision.unchanged" ? 409 : 422, frozen.problems);
  const made = (await presentRevisions(model)).find((revision) => revision.number === frozen.value.number);
  if (!made) throw failWith(404, "request.not-found");
  return Response.json(made, { status: 201 });
});
