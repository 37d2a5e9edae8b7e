import { requireModel } from "~/auth/require-model.server";
import { restoreRevision } from "~/services/restore-revision.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireMethod } from "~/utils/parse-request.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/revision-restore";

/** `POST /api/v1/models/{id}/revisions/{number}/restore`: one edit that makes the working state what the revision is. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "POST");
  if (!/^\d{1,9}$/.test(params.number)) throw failWith(404, "request.not-found");
  const restored = await restoreRevision(caller, model, Number(params.number));
  if (restored.ok) return Response.json(restored.value);
  return problemResponse(restored.problems[0]?.code === "request.not-found" ? 404 : 409, restored.problems);
});
