import { requireModel } from "~/auth/require-model.server";
import { exportRevision } from "~/services/export-revision.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/revision-nodeset";

/** `GET /api/v1/models/{id}/revisions/{number}/nodeset`: never changes. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const written = /^\d{1,9}$/.test(params.number) ? await exportRevision(model, Number(params.number)) : undefined;
  if (!written) throw failWith(404, "request.not-found");
  return new Response(written.xml, {
    headers: {
      "content-type": "application/xml; charset=utf-8",
      "content-disposition": `attachment; filename="${written.fileName}"`,
      "cache-control": "private, max-age=31536000, immutable",
    },
  });
});

export const action = refuseChanges;
