/** Built scripts and styles as gzip: compressed once when first asked for, then kept, since their names change with their contents. */
import { readFile } from "node:fs/promises";
import type { IncomingMessage, ServerResponse } from "node:http";
import { extname, join } from "node:path";
import { promisify } from "node:util";
import { gzip } from "node:zlib";

const compress = promisify(gzip);

const types: Readonly<Record<string, string>> = {
  ".js": "text/javascript; charset=utf-8",
  ".css": "text/css; charset=utf-8",
  ".svg": "image/svg+xml",
};

/** A handler for paths directly below `folder`; what it does not serve it hands on. */
export function serveCompressed(folder: string) {
  const kept = new Map<string, Promise<Buffer>>();
  const load = (name: string): Promise<Buffer> => {
    const known = kept.get(name);
    if (known) return known;
    const loading = readFile(join(folder, name)).then((bytes) => compress(bytes, { level: 9 }));
    kept.set(name, loading);
    loading.catch(() => kept.delete(name));
    return loading;
  };
  return (request: IncomingMessage, response: ServerResponse, next: () => void): void => {
    const name = /^\/([\w-][\w.-]*)$/.exec(request.url ?? "")?.[1] ?? "";
    const type = types[extname(name)];
    const takesGzip = /\bgzip\b/.test(String(request.headers["accept-encoding"] ?? ""));
    if (type === undefined || !takesGzip || request.method !== "GET") return next();
    load(name).then(
      (bytes) => {
        response.setHeader("content-type", type);
        response.setHeader("content-encoding", "gzip");
        response.setHeader("content-length", bytes.length);
        response.setHeader("cache-control", "public, max-age=31536000, immutable");
        response.setHeader("vary", "accept-encoding");
        response.end(bytes);
      },
      () => next(),
    );
  };
}
