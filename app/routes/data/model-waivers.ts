import { requireModel } from "~/auth/require-model.server";
import { presentWaivers } from "~/presenters/waivers.server";
import { saveWaiver, waiverIntentSchema } from "~/services/save-waiver.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-waivers";

export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json(await presentWaivers(model.id), { headers: { "cache-control": "no-store" } });
}

/** `POST /models/:modelId/waivers` `{rule, nodeId, attribute?, reason}`: accepts a finding. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "POST");
  const saved = await saveWaiver(caller, model, await requireJson(request, waiverIntentSchema));
  return saved.ok ? Response.json(saved.value, { status: 201 }) : problemResponse(409, saved.problems);
}
