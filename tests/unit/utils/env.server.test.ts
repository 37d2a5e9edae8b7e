import { mkdtempSync, readFileSync, rmSync, statSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, expect, test } from "vitest";
import { EnvironmentError, readEnvironment } from "~/utils/env.server";

const folder = mkdtempSync(join(tmpdir(), "ferrule-env-"));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

test("needs nothing but a place: all defaults", () => {
  const environment = readEnvironment({ FERRULE_DATA: folder, PORT: "" });
  expect(environment).toMatchObject({ port: 3000, host: "127.0.0.1", dataFolder: folder, isDemo: false });
  expect(environment.databaseUrl).toBe(`file:${join(folder, "ferrule.db")}`);
});

test("makes the secret once, for its owner's eyes only", () => {
  const first = readEnvironment({ FERRULE_DATA: folder }).secret;
  expect(first.length).toBeGreaterThanOrEqual(32);
  expect(readEnvironment({ FERRULE_DATA: folder }).secret).toBe(first);
  expect(readFileSync(join(folder, "secret"), "utf8")).toBe(first);
  expect(statSync(join(folder, "secret")).mode & 0o077).toBe(0);
});

test("the demo never uses the database that is configured for real work", () => {
  const environment = readEnvironment({ FERRULE_DATA: folder, FERRULE_DEMO: "1", DATABASE_URL: "libsql://db.harbour.example" });
  expect(environment.dataFolder).toBe(join(folder, "demo"));
  expect(environment.databaseUrl).toBe(`file:${join(folder, "demo", "ferrule.db")}`);
});

test("names every setting that is wrong in one message", () => {
  const read = () => readEnvironment({ FERRULE_DATA: folder, PORT: "many", DATABASE_URL: "postgres://x", FERRULE_SECRET: "short" });
  expect(read).toThrow(EnvironmentError);
  expect(read).toThrow(/PORT[\s\S]*DATABASE_URL[\s\S]*FERRULE_SECRET/);
});
