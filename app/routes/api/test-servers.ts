import { requireModel } from "~/auth/require-model.server";
import { listTestServers } from "~/presenters/list-test-servers.server";
import { describeTestServer } from "~/services/describe-test-server.server";
import { startTestServer, testServerIntentSchema } from "~/services/start-test-server.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireMethod, requireOptionalJson } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/test-servers";

/** `GET /api/v1/models/:modelId/test-servers`: those that run, start or have failed. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const servers = listTestServers(model.organizationId, model.id).map((server) => describeTestServer(server));
  return Response.json(servers, { headers: { "cache-control": "no-store" } });
});

/** `POST`: starts one and answers at once; the caller asks again until it is running or has failed. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "test-server.run");
  requireMethod(request, "POST");
  const intent = await requireOptionalJson(request, testServerIntentSchema);
  const started = await startTestServer(model, caller, intent);
  if (!started.ok) return problemResponse(503, started.problems);
  const location = `/api/v1/test-servers/${started.value.id}`;
  return Response.json(describeTestServer(started.value), { status: 201, headers: { location } });
});
