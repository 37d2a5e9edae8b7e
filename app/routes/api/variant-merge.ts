import { requireModel } from "~/auth/require-model.server";
import { mergeSchema, mergeVariant, previewMerge } from "~/services/branch-model.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/variant-merge";

/** `GET /api/v1/models/{variantId}/merge?direction=into-model`: what merging would do, conflict by conflict. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const direction = new URL(request.url).searchParams.get("direction") === "into-variant" ? "into-variant" : "into-model";
  const preview = await previewMerge(model, direction);
  if (!preview.ok) return problemResponse(409, preview.problems);
  const { operations, ...rest } = preview.value;
  return Response.json({ ...rest, operations: operations.length }, { headers: { "cache-control": "no-store" } });
});

/** `POST` `{direction, seqs, choices}`: merges with a choice at every conflict. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "POST");
  const merged = await mergeVariant(caller, model, await requireJson(request, mergeSchema));
  return merged.ok ? Response.json(merged.value) : problemResponse(409, merged.problems);
});
