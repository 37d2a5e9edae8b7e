import { requireRelease } from "~/auth/require-review.server";
import { withdrawRelease, withdrawSchema } from "~/services/release-revision.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/release-withdrawal";

/** `POST /api/v1/releases/{id}/withdrawal` `{reason}` */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model, release } = await requireRelease(request, params.releaseId, "release");
  requireMethod(request, "POST");
  const { reason } = await requireJson(request, withdrawSchema);
  const withdrawn = await withdrawRelease(caller, model, release, reason);
  return withdrawn.ok ? new Response(null, { status: 204 }) : problemResponse(409, withdrawn.problems);
});
