/** Second build for what runs in plain Node beside the web application: server, test server's process, workers, command line. */
import { existsSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { defineConfig } from "vite";

const entries: Record<string, string> = {
  server: "app/server.ts",
  cli: "app/cli/main.ts",
  "test-server": "app/opcua/test-server/main.ts",
  "fake-master": "app/opcua/fake-master/main.ts",
  "read-worker": "app/library/read-worker.ts",
  bench: "tests/bench/main.ts",
  "bench-browser": "tests/bench/browser/main.ts",
};

export default defineConfig({
  publicDir: false,
  resolve: { alias: { "~": fileURLToPath(new URL("./app", import.meta.url)) } },
  build: {
    ssr: true,
    target: "node20",
    outDir: "build/node",
    emptyOutDir: true,
    sourcemap: true,
    rolldownOptions: { input: Object.fromEntries(Object.entries(entries).filter(([, file]) => existsSync(file))) },
  },
});
