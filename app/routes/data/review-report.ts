import { requireReview } from "~/auth/require-review.server";
import { writeReport } from "~/services/read-review-texts.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { failWith } from "~/utils/problem-response.server";
import { htmlDocument } from "~/utils/html-document.server";
import type { Route } from "./+types/review-report";

/** `GET /reviews/:reviewId/report`: the changes as a page to print. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model, review } = await requireReview(request, params.reviewId, "read");
  const report = await writeReport(model, review.baseRevision, review.revision);
  if (report === undefined) throw failWith(404, "request.not-found");
  return htmlDocument(report);
});

export const action = refuseChanges;
