import { requireRelease } from "~/auth/require-review.server";
import { readBundleFile } from "~/services/read-bundle-file.server";
import { handleApi, refuseChanges } from "~/utils/api-handler.server";
import { htmlDocument } from "~/utils/html-document.server";
import { failWith } from "~/utils/problem-response.server";
import type { Route } from "./+types/release-file";

/** `GET /releases/:releaseId/file?path=…`: one file of the kept bundle; pages are shown, the rest is downloaded. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { release } = await requireRelease(request, params.releaseId, "read");
  const path = new URL(request.url).searchParams.get("path") ?? "";
  const bytes = await readBundleFile(release, path);
  if (!bytes) throw failWith(404, "request.not-found");
  if (path.endsWith(".html")) return htmlDocument(bytes);
  return new Response(bytes as BodyInit, {
    headers: {
      "content-type": "application/octet-stream",
      "content-disposition": `attachment; filename="${(path.split("/").at(-1) ?? "file").replace(/[^\w.-]/g, "_")}"`,
      "cache-control": "private, max-age=31536000, immutable",
      "x-content-type-options": "nosniff",
    },
  });
});

export const action = refuseChanges;
