import { requireCaller } from "~/auth/caller.server";
import { browseEndpoint } from "~/services/browse-endpoint.server";
import { requireLiveTarget } from "~/services/live-target.server";
import { handleApi } from "~/utils/api-handler.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/live-children";

/** `GET /live/:testServerId/children?node=&continuation=`: a page of a node's children. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const target = await requireLiveTarget(await requireCaller(request), params.testServerId, "read");
  const search = new URL(request.url).searchParams;
  const node = search.get("node");
  if (node === null || node.length > 4000) throw failWith(400, "request.field", { field: "node", message: "must be a NodeId" });
  const page = await browseEndpoint(target.id, node, search.get("continuation"));
  return page.ok ? Response.json(page.value, { headers: { "cache-control": "no-store" } }) : problemResponse(503, page.problems);
});
