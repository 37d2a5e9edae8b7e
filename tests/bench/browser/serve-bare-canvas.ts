/** Builds the bare canvas into a folder of its own and serves it on a free port of this machine. */
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { createServer } from "node:http";
import { tmpdir } from "node:os";
import { extname, join, normalize } from "node:path";
import { build } from "vite";
import { findProjectRoot } from "~/utils/project-root.server";

const TYPES: Readonly<Record<string, string>> = { ".html": "text/html", ".js": "text/javascript", ".css": "text/css" };

export type BareCanvas = { readonly url: string; stop(): void };

export async function serveBareCanvas(): Promise<BareCanvas> {
  const folder = mkdtempSync(join(tmpdir(), "ferrule-bare-"));
  await build({
    configFile: false,
    logLevel: "error",
    root: join(findProjectRoot(), "tests/bench/browser/bare-canvas"),
    oxc: { jsx: { runtime: "automatic" } },
    build: { outDir: folder, emptyOutDir: true },
  });
  const server = createServer((request, response) => {
    const path = normalize(new URL(request.url ?? "/", "http://localhost").pathname);
    const file = join(folder, path === "/" ? "index.html" : path);
    try {
      response.setHeader("content-type", TYPES[extname(file)] ?? "application/octet-stream");
      response.end(readFileSync(file));
    } catch {
      response.writeHead(404).end();
    }
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  const address = server.address();
  const port = address !== null && typeof address === "object" ? address.port : 0;
  return {
    url: `http://127.0.0.1:${port}/`,
    stop: () => {
      server.close();
      rmSync(folder, { recursive: true, force: true });
    },
  };
}
