import { requireModel } from "~/auth/require-model.server";
import { findingsQuerySchema, reportFindings } from "~/services/report-findings.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { requireFields } from "~/utils/parse-request.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-findings";

/** `GET /api/v1/models/{id}/findings?format=json|sarif|text&severity=`: what the checker says of the working state. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const query = requireFields(findingsQuerySchema, Object.fromEntries(new URL(request.url).searchParams));
  const written = await reportFindings(model.id, query);
  if (!written) throw failWith(404, "request.not-found");
  return new Response(written.text, { headers: { "content-type": written.mediaType, "cache-control": "no-store" } });
});

export const action = refuseChanges;
