import { requireReview } from "~/auth/require-review.server";
import { addReviewComment, commentSchema } from "~/services/comment-review.server";
import { describeComments } from "~/services/describe-review.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/review-comments";

/** `GET /api/v1/reviews/{id}/comments`: oldest first. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { review } = await requireReview(request, params.reviewId, "read");
  return Response.json(await describeComments(review), { headers: { "cache-control": "no-store" } });
});

/** `POST` a comment or a reply. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model, review } = await requireReview(request, params.reviewId, "comment");
  requireMethod(request, "POST");
  const added = await addReviewComment(caller, model, review, await requireJson(request, commentSchema));
  if (!added.ok) return problemResponse(422, added.problems);
  const made = (await describeComments(review)).find((comment) => comment.id === added.value.id);
  return Response.json(made, { status: 201 });
});
