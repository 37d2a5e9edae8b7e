import { requireModel } from "~/auth/require-model.server";
import { listAllFindings } from "~/services/check-model.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-findings";

/** `GET /models/:modelId/findings.json`: all findings at the head, accepted ones too, so that a window need not check at once. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const checked = await listAllFindings(model.id);
  if (!checked) throw failWith(404, "request.not-found");
  return Response.json({ seq: checked.seq, findings: checked.findings }, { headers: { "cache-control": "no-store" } });
}
