import { unzipSync } from "fflate";
import type { ReleaseRow } from "../db/repositories/releases.server";
import { loadBundle } from "./release-revision.server";

/** One file of the bundle as it was kept; undefined for a path that the release does not name. */
export async function readBundleFile(release: ReleaseRow, path: string): Promise<Uint8Array | undefined> {
  if (!release.files.some((file) => file.path === path)) return undefined;
  const bundle = await loadBundle(release);
  return bundle && unzipSync(bundle, { filter: (entry) => entry.name === path })[path];
}
