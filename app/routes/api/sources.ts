import { assertMay, requireCaller, requireOrganization } from "~/auth/caller.server";
import { readSources } from "~/services/read-sources.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import type { Route } from "./+types/sources";

/** `GET /api/v1/sources`: sources with the plan of their ports, gateways, and what machines bind. */
export const loader = handleApi(async ({ request }: Route.LoaderArgs) => {
  const caller = await requireCaller(request);
  const { organizationId } = requireOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return Response.json(await readSources(organizationId), { headers: { "cache-control": "no-store" } });
});

export const action = refuseChanges;
