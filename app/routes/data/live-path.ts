import { requireCaller } from "~/auth/caller.server";
import { findEndpointPath } from "~/services/browse-endpoint.server";
import { requireLiveTarget } from "~/services/live-target.server";
import { handleApi } from "~/utils/api-handler.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/live-path";

/** `GET /live/:testServerId/path?node=`: the NodeIds from Objects down to the node, for an address that names it. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const target = await requireLiveTarget(await requireCaller(request), params.testServerId, "read");
  const node = new URL(request.url).searchParams.get("node");
  if (node === null || node.length > 4000) throw failWith(400, "request.field", { field: "node", message: "must be a NodeId" });
  const path = await findEndpointPath(target.id, node);
  return path.ok ? Response.json({ path: path.value }, { headers: { "cache-control": "no-store" } }) : problemResponse(503, path.problems);
});
