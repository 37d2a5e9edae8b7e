/** Bytes by content: stored once however often they are named. */
import { gunzipSync, gzipSync } from "node:zlib";
import { eq } from "drizzle-orm";
import { sha256 } from "../../utils/ids.server";
import { getDatabase } from "../client.server";
import { contentBlob } from "../schema/schema";

export type StoredBlob = { readonly hash: string; readonly gzip: Buffer; readonly size: number };

/** Hashes and compresses; nothing is written before the statement runs. */
export function toBlob(data: Uint8Array | string): StoredBlob {
  const bytes = typeof data === "string" ? Buffer.from(data, "utf8") : Buffer.from(data.buffer, data.byteOffset, data.byteLength);
  return { hash: sha256(bytes), gzip: gzipSync(bytes, { level: 6 }), size: bytes.length };
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
  const gzip = await findBlobGzip(hash);
  return gzip ? gunzipSync(gzip) : undefined;
}
