import { requireModel } from "~/auth/require-model.server";
import { requireLiveTarget } from "~/services/live-target.server";
import { asBuiltIntentSchema, startAsBuilt } from "~/services/make-as-built.server";
import { describeRun, listAsBuilt } from "~/services/read-as-built.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/as-built-reports";

/** `GET /api/v1/models/{id}/as-built-reports`: newest first. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json(await listAsBuilt(model.id), { headers: { "cache-control": "no-store" } });
});

/** `POST`: starts a run and answers at once; the caller asks for the run until it is done or has failed. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "as-built.record");
  requireMethod(request, "POST");
  const intent = await requireJson(request, asBuiltIntentSchema);
  const target = await requireLiveTarget(caller, intent.targetId, "read");
  const run = await startAsBuilt(caller, model, target, intent);
  if (!run.ok) return problemResponse(422, run.problems);
  return Response.json(describeRun(run.value), { status: 202, headers: { location: `/api/v1/as-built-runs/${run.value.id}` } });
});
