import { requireModel } from "~/auth/require-model.server";
import { exportModel } from "~/services/export-model.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-nodeset";

/** `GET /models/:modelId/nodeset?order=canonical`: the NodeSet2 file as a download. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const canonicalOrder = new URL(request.url).searchParams.get("order") === "canonical";
  const written = await exportModel(model.id, { canonicalOrder });
  if (!written) throw failWith(404, "request.not-found");
  return new Response(written.xml, {
    headers: {
      "content-type": "application/xml; charset=utf-8",
      "content-disposition": `attachment; filename="${written.fileName}"`,
      "cache-control": "no-store",
    },
  });
}
