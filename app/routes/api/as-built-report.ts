import { requireCaller } from "~/auth/caller.server";
import { requireAsBuiltReport } from "~/services/read-as-built.server";
import { handleApi } from "~/utils/api-handler.server";
import type { Route } from "./+types/as-built-report";

/** `GET /api/v1/as-built-reports/{id}`: the very text that was hashed and signed. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { summary, text } = await requireAsBuiltReport(await requireCaller(request), params.reportId);
  return new Response(text, {
    headers: { "content-type": "application/json", "x-ferrule-sha256": summary.sha256, ...(summary.signature ? { "x-ferrule-signature": summary.signature } : {}) },
  });
});
