import { requireRelease } from "~/auth/require-review.server";
import { loadBundle } from "~/services/release-revision.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/release-bundle";

/** `GET /api/v1/releases/{id}/bundle`: the ZIP as it was built; the digest header is RFC 9530's. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { release } = await requireRelease(request, params.releaseId, "read");
  const bytes = await loadBundle(release);
  if (!bytes) throw failWith(404, "request.not-found");
  return new Response(bytes as BodyInit, {
    headers: {
      "content-type": "application/zip",
      "content-disposition": `attachment; filename="${release.fileName}"`,
      "repr-digest": `sha-256=:${Buffer.from(release.bundleHash, "hex").toString("base64")}:`,
      "cache-control": "private, max-age=31536000, immutable",
    },
  });
});

export const action = refuseChanges;
