import { requireModel } from "~/auth/require-model.server";
import { askReview, askReviewSchema } from "~/services/ask-review.server";
import { describeReview, listModelReviews } from "~/services/describe-review.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-reviews";

/** `GET /api/v1/models/{id}/reviews`: newest first. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json(await listModelReviews(model), { headers: { "cache-control": "no-store" } });
});

/** `POST` `{title, reviewers}`: freezes the working state and asks. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "revision.freeze");
  requireMethod(request, "POST");
  const asked = await askReview(caller, model, await requireJson(request, askReviewSchema));
  if (!asked.ok) return problemResponse(asked.problems[0]?.code === "review.running" ? 409 : 422, asked.problems);
  return Response.json(await describeReview(model, asked.value), { status: 201 });
});
