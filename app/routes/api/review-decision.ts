import { requireReview } from "~/auth/require-review.server";
import { decideReview, decisionSchema } from "~/services/decide-review.server";
import { describeReview, findReviewAgain } from "~/services/describe-review.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/review-decision";

/** `POST /api/v1/reviews/{id}/decision` `{decision, note?}` */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model, review } = await requireReview(request, params.reviewId, "review.decide");
  requireMethod(request, "POST");
  const decided = await decideReview(caller, model, review, await requireJson(request, decisionSchema));
  if (!decided.ok) return problemResponse(409, decided.problems);
  return Response.json(await describeReview(model, await findReviewAgain(review)));
});
