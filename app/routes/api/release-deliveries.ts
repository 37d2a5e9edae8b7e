import { requireRelease } from "~/auth/require-review.server";
import { deliverRelease, deliverSchema } from "~/services/deliver-release.server";
import { listReleaseDeliveries, toDeliveryLine } from "~/services/read-release.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/release-deliveries";

/** `GET /api/v1/releases/{id}/deliveries`: newest first. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { release } = await requireRelease(request, params.releaseId, "read");
  return Response.json(await listReleaseDeliveries(release), { headers: { "cache-control": "no-store" } });
});

/** `POST` `{gatewayId, note?}`: the bundle was sent to a gateway. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model, release } = await requireRelease(request, params.releaseId, "release");
  requireMethod(request, "POST");
  const delivered = await deliverRelease(caller, model, release, await requireJson(request, deliverSchema));
  if (!delivered.ok) return problemResponse(delivered.problems[0]?.code === "delivery.no-gateway" ? 422 : 409, delivered.problems);
  return Response.json(toDeliveryLine(delivered.value), { status: 201 });
});
