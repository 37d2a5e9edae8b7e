/** Reads request bodies within limits, while they arrive. */
import { fail, ok, problem, type Result } from "../domain/core/result";

const MAX_DISCARD_BYTES = 512 * 1024 * 1024;
const MAX_DISCARD_MS = 20_000;

/**
 * The whole body, or `problem(code, {size, limit})` as soon as more than `limit` bytes have come. What comes after is
 * thrown away for a while, since most clients look for the answer only after they have sent everything.
 */
export async function readBody(request: Request, limit: number, code = "request.body-size"): Promise<Result<Uint8Array>> {
  const announced = Number(request.headers.get("content-length") ?? "0");
  const reader = request.body?.getReader();
  if (!reader) return fail(problem("request.body-empty"));
  const chunks: Uint8Array[] = [];
  let size = 0;
  for (;;) {
    const { done, value } = await reader.read();
    if (done) break;
    size += value.length;
    if (size > limit || announced > limit) {
      const total = Math.max(announced, size + (await discard(reader)));
      return fail(problem(code, { size: total, limit }));
    }
    chunks.push(value);
  }
  if (size === 0) return fail(problem("request.body-empty"));
  return ok(joinChunks(chunks, size));
}

async function discard(reader: ReadableStreamDefaultReader<Uint8Array>): Promise<number> {
  const end = Date.now() + MAX_DISCARD_MS;
  let size = 0;
  while (size < MAX_DISCARD_BYTES && Date.now() < end) {
    const { done, value } = await reader.read();
    if (done) return size;
    size += value.length;
  }
  await reader.cancel();
  return size;
}

function joinChunks(chunks: readonly Uint8Array[], size: number): Uint8Array {
  const all = new Uint8Array(size);
  let at = 0;
  for (const chunk of chunks) {
    all.set(chunk, at);
    at += chunk.length;
  }
  return all;
}

/** The media type without parameters, in lower case. */
export function getMediaType(request: Request): string {
  return (request.headers.get("content-type") ?? "").split(";")[0]?.trim().toLowerCase() ?? "";
}
