import { requireModel } from "~/auth/require-model.server";
import { exportModel } from "~/services/export-model.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-nodeset";

/** `GET /api/v1/models/{id}/nodeset?order=canonical`: the NodeSet2 file of the working state. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const order = new URL(request.url).searchParams.get("order") ?? "file";
  if (order !== "file" && order !== "canonical") throw failWith(400, "request.field", { field: "order", message: "file or canonical" });
  const written = await exportModel(model.id, { canonicalOrder: order === "canonical" });
  if (!written) throw failWith(404, "request.not-found");
  return new Response(written.xml, {
    headers: {
      "content-type": "application/xml; charset=utf-8",
      "content-disposition": `attachment; filename="${written.fileName}"`,
      "cache-control": "no-store",
      "x-ferrule-seq": String(written.working.seq),
    },
  });
});

export const action = refuseChanges;
