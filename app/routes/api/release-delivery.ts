import { z } from "zod";
import { requireRelease } from "~/auth/require-review.server";
import { advanceDelivery } from "~/services/deliver-release.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/release-delivery";

const stateSchema = z.strictObject({ state: z.literal("loaded") });

/** `POST /api/v1/releases/{id}/deliveries/{deliveryId}` `{state: "loaded"}`; `proved` follows from an as-built report. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model, release } = await requireRelease(request, params.releaseId, "release");
  requireMethod(request, "POST");
  const { state } = await requireJson(request, stateSchema);
  const advanced = await advanceDelivery(caller, model, release, params.deliveryId, state);
  return advanced.ok ? new Response(null, { status: 204 }) : problemResponse(409, advanced.problems);
});
