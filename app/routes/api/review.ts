import { requireReview } from "~/auth/require-review.server";
import { describeReview } from "~/services/describe-review.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import type { Route } from "./+types/review";

/** `GET /api/v1/reviews/{id}` */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model, review } = await requireReview(request, params.reviewId, "read");
  return Response.json(await describeReview(model, review), { headers: { "cache-control": "no-store" } });
});

export const action = refuseChanges;
