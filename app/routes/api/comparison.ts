import { requireModel } from "~/auth/require-model.server";
import { compareStates } from "~/services/compare-states.server";
import { parseStateName, type StateName } from "~/services/load-revision.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { toComparisonJson } from "~/utils/api-schemas";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/comparison";

/** `GET /api/v1/models/{id}/comparison?from=1&to=working` */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const query = new URL(request.url).searchParams;
  const comparison = await compareStates(model, requireStateName(query.get("from")), requireStateName(query.get("to")));
  if (!comparison) throw failWith(404, "request.not-found");
  return Response.json(toComparisonJson(comparison), { headers: { "cache-control": "no-store" } });
});

function requireStateName(text: string | null): StateName {
  const name = parseStateName(text);
  if (name === undefined) throw failWith(400, "revision.state-name", { text: text ?? "" });
  return name;
}

export const action = refuseChanges;
