import { requireRelease } from "~/auth/require-review.server";
import { toReleaseSummary } from "~/services/read-release.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import type { Route } from "./+types/release";

/** `GET /api/v1/releases/{id}` */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model, release } = await requireRelease(request, params.releaseId, "read");
  return Response.json(toReleaseSummary(release, model.name), { headers: { "cache-control": "no-store" } });
});

export const action = refuseChanges;
