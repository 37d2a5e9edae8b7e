import { requireReview } from "~/auth/require-review.server";
import { toReleaseSummary } from "~/services/read-release.server";
import { releaseRevision, releaseSchema } from "~/services/release-revision.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/review-release";

/** `POST /api/v1/reviews/{id}/release` `{version, notes?}`: builds, signs and keeps the bundle. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model, review } = await requireReview(request, params.reviewId, "release");
  requireMethod(request, "POST");
  const released = await releaseRevision(caller, model, review, await requireJson(request, releaseSchema));
  if (!released.ok) return problemResponse(409, released.problems);
  return Response.json(toReleaseSummary(released.value, model.name), { status: 201 });
});
