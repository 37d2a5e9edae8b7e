import { requireModel } from "~/auth/require-model.server";
import { applyNodeIds } from "~/services/apply-node-ids.server";
import { exportNodeIds } from "~/services/export-node-ids.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireMediaType, requireMethod } from "~/utils/parse-request.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import { readBody } from "~/utils/read-body.server";
import type { Route } from "./+types/model-node-ids";

const MAX_BYTES = 20_000_000;

/** `GET /api/v1/models/{id}/node-ids`: symbol, identifier and class of every node, as CSV. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const exported = await exportNodeIds(model.id);
  if (!exported) throw failWith(404, "request.not-found");
  return new Response(exported.csv, {
    headers: {
      "content-type": "text/csv; charset=utf-8",
      "content-disposition": `attachment; filename="${exported.fileName}"`,
      "cache-control": "no-store",
    },
  });
});

/** `PUT /api/v1/models/{id}/node-ids` with such a file: the nodes that it names get its ids. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "PUT");
  requireMediaType(request, "text/csv");
  const body = await readBody(request, MAX_BYTES, "request.body-size");
  if (!body.ok) return problemResponse(body.problems[0]?.code === "request.body-size" ? 413 : 422, body.problems);
  const applied = await applyNodeIds(caller, model, new TextDecoder().decode(body.value));
  if (!applied.ok) return problemResponse(applied.problems.some((p) => p.code === "transactions.stale") ? 409 : 422, applied.problems);
  const { changed, unknown, unnamed } = applied.value;
  return Response.json({ changed, unknown: unknown.map(({ symbol, line }) => ({ symbol, line })), unnamed });
});
