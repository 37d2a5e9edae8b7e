import { reactRouter } from "@react-router/dev/vite";
import tailwindcss from "@tailwindcss/vite";
import { fileURLToPath } from "node:url";
import { defineConfig } from "vitest/config";

const alias = { "~": fileURLToPath(new URL("./app", import.meta.url)) };

export default defineConfig({
  plugins: process.env.VITEST ? [] : [tailwindcss(), reactRouter()],
  resolve: { alias },
  test: {
    projects: [
      { extends: true, test: { name: "unit", include: ["tests/unit/**/*.test.{ts,tsx}"], testTimeout: 20_000 } },
      {
        extends: true,
        test: {
          name: "integration",
          include: ["tests/integration/**/*.test.ts"],
          testTimeout: 60_000,
          hookTimeout: 60_000,
          pool: "forks",
        },
      },
      {
        extends: true,
        test: { name: "conformance", include: ["tests/conformance/**/*.test.ts"], testTimeout: 180_000, pool: "forks" },
      },
      {
        extends: true,
        test: {
          name: "e2e",
          include: ["tests/e2e/**/*.test.ts"],
          testTimeout: 120_000,
          hookTimeout: 180_000,
          fileParallelism: false,
          pool: "forks",
          // A browser on a busy machine is late now and then; what is broken fails twice.
          retry: 1,
        },
      },
    ],
  },
});
