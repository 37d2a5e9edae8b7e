import { requireCaller } from "~/auth/caller.server";
import { describeTestServer } from "~/services/describe-test-server.server";
import { readTestServerLog, requireTestServer } from "~/services/find-test-server.server";
import { stopTestServer } from "~/services/stop-test-server.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireMethod } from "~/utils/parse-request.server";
import type { Route } from "./+types/test-server";

/** `GET /api/v1/test-servers/:testServerId` with the end of its log. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const server = requireTestServer(await requireCaller(request), params.testServerId, "read");
  return Response.json(describeTestServer(server, readTestServerLog(server.id)), { headers: { "cache-control": "no-store" } });
});

/** `DELETE`: answers when the process is gone and the port is free. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const caller = await requireCaller(request);
  const server = requireTestServer(caller, params.testServerId, "test-server.run");
  requireMethod(request, "DELETE");
  await stopTestServer(server, caller);
  return new Response(null, { status: 204 });
});
