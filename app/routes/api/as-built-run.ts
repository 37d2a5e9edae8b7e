import { assertMay, requireCaller } from "~/auth/caller.server";
import { findAsBuiltRun, type AsBuiltRun } from "~/services/make-as-built.server";
import { describeRun } from "~/services/read-as-built.server";
import { handleApi } from "~/utils/api-handler.server";
import type { Route } from "./+types/as-built-run";

/** `GET /api/v1/as-built-runs/{id}`: how far a run is. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const caller = await requireCaller(request);
  const run = findAsBuiltRun(params.runId);
  assertMay(caller, "read", run?.organizationId);
  return Response.json(describeRun(run as AsBuiltRun), { headers: { "cache-control": "no-store" } });
});
