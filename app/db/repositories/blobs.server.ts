/** Bytes by content: stored once however often they are named. */
import { promisify } from "node:util";
import { gunzip, gzip } from "node:zlib";
import { eq, sql } from "drizzle-orm";
import { sha256 } from "../../utils/ids.server";
import { getDatabase } from "../client.server";
import { contentBlob } from "../schema/models";

export type StoredBlob = { readonly hash: string; readonly gzip: Buffer; readonly size: number };

const compress = promisify(gzip);
const unpack = promisify(gunzip);

/** Hashes, and compresses off the main thread; nothing is written before the statement runs. */
export async function toBlob(data: Uint8Array | string): Promise<StoredBlob> {
  const bytes = typeof data === "string" ? Buffer.from(data, "utf8") : Buffer.from(data.buffer, data.byteOffset, data.byteLength);
  return { hash: sha256(bytes), gzip: await compress(bytes, { level: 5 }), size: bytes.length };
}

export function addBlobStatement(blob: StoredBlob, now: Date) {
  return getDatabase()
    .insert(contentBlob)
    .values({ hash: blob.hash, bytes: blob.gzip, size: blob.size, createdAt: now })
    .onConflictDoNothing();
}

/** The compressed bytes, as browsers take them. */
export async function findBlobGzip(hash: string): Promise<Buffer | undefined> {
  const [row] = await getDatabase().select({ bytes: contentBlob.bytes }).from(contentBlob).where(eq(contentBlob.hash, hash));
  return row?.bytes;
}

export async function findBlob(hash: string): Promise<Buffer | undefined> {
  const stored = await findBlobGzip(hash);
  return stored ? unpack(stored) : undefined;
}

/** Removes the bytes that nothing names any more: of deleted models, old snapshots, removed uploads. */
export async function removeUnusedBlobs(): Promise<number> {
  const result = await getDatabase().run(sql`
    delete from blob where hash not in (
      select pack_hash from revision
      union select file_hash from revision where file_hash is not null
      union select json_extract(pin.value, '$.hash') from revision, json_each(revision.pinned) as pin
      union select pack_hash from snapshot
      union select variant_base_hash from model where variant_base_hash is not null
      union select pack_hash from release
      union select bundle_hash from release
      union select pack_hash from uploaded_node_set
      union select file_hash from uploaded_node_set
      union select file_hash from device_description
      union select description_hash from device_description
      union select file_hash from tag_list where file_hash is not null
      union select tags_hash from tag_list
      union select body_hash from as_built_report
    )`);
  return result.rowsAffected;
}
