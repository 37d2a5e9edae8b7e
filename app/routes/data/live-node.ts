import { requireCaller } from "~/auth/caller.server";
import { readEndpointNode } from "~/services/browse-endpoint.server";
import { requireLiveTarget } from "~/services/live-target.server";
import { handleApi } from "~/utils/api-handler.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/live-node";

/** `GET /live/:testServerId/node?node=`: all that a node's card shows. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const target = await requireLiveTarget(await requireCaller(request), params.testServerId, "read");
  const node = new URL(request.url).searchParams.get("node");
  if (node === null || node.length > 4000) throw failWith(400, "request.field", { field: "node", message: "must be a NodeId" });
  const card = await readEndpointNode(target.id, node);
  return card.ok ? Response.json(card.value, { headers: { "cache-control": "no-store" } }) : problemResponse(503, card.problems);
});
