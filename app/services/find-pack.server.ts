import { findBlobGzip } from "../db/repositories/blobs.server";
import { hasPinnedPack } from "../db/repositories/models.server";
import { hasUploadWithPack } from "../db/repositories/uploads.server";
import { getLibrary } from "../library/library.server";

/**
 * The compressed pack with this name: a published one is for everybody, an uploaded one for the organisations whose
 * library it is in, a frozen revision for those whose machines stand on it. Undefined when there is none or it is not theirs.
 */
export async function findPackFor(organizationIds: readonly string[], hash: string): Promise<Uint8Array | undefined> {
  const published = await getLibrary().findPack(hash);
  if (published) return published.gzip;
  for (const organizationId of organizationIds) {
    if ((await hasUploadWithPack(organizationId, hash)) || (await hasPinnedPack(organizationId, hash))) return findBlobGzip(hash);
  }
  return undefined;
}
