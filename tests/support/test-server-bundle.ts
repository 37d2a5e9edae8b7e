/** Builds the test server's process as `npm run build` does, into a folder of the tests, so that they never run a stale one. */
import { rmSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { join } from "node:path";
import { build } from "vite";

const root = fileURLToPath(new URL("../..", import.meta.url));

export type TestServerBundle = { readonly entry: string; readonly supervisor: string; remove(): void };

export async function buildTestServer(name: string): Promise<TestServerBundle> {
  const outDir = join(root, "node_modules/.cache", `ferrule-${name}-${process.pid}`);
  await build({
    configFile: false,
    root,
    logLevel: "error",
    publicDir: false,
    resolve: { alias: { "~": join(root, "app") } },
    build: {
      ssr: true,
      target: "node20",
      outDir,
      emptyOutDir: true,
      rolldownOptions: {
        input: {
          "test-server": join(root, "app/opcua/test-server/main.ts"),
          supervisor: join(root, "app/opcua/supervisor.server.ts"),
        },
      },
    },
  });
  return { entry: join(outDir, "test-server.js"), supervisor: join(outDir, "supervisor.js"), remove: () => rmSync(outDir, { recursive: true, force: true }) };
}
