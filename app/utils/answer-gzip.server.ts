import { gunzipSync } from "node:zlib";

/** Sends stored gzip bytes as they are to whoever takes them, unpacked to the rest. */
export function answerGzip(
  request: Request,
  gzip: Uint8Array,
  headers: Readonly<Record<string, string>>,
  contentType = "application/json",
): Response {
  const takesGzip = /\bgzip\b/.test(request.headers.get("accept-encoding") ?? "");
  const body = takesGzip ? gzip : gunzipSync(gzip);
  return new Response(body as Uint8Array<ArrayBuffer>, {
    headers: {
      ...headers,
      "content-type": contentType,
      "content-length": String(body.length),
      ...(takesGzip ? { "content-encoding": "gzip" } : {}),
    },
  });
}
