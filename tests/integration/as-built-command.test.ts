/** `ferrule as-built` as pipelines call it, against a test server in its own process. */
import { execFile } from "node:child_process";
import { createHash, X509Certificate } from "node:crypto";
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it, vi } from "vitest";
import { Supervisor } from "~/opcua/supervisor.server";
import { projectRoot } from "../support/source-files";
import { buildTestServer, type TestServerBundle } from "../support/test-server-bundle";
import { makeSeed, removeTestFolders, startWinch, winchFile } from "../support/winch-server";

vi.setConfig({ testTimeout: 120_000, hookTimeout: 180_000 });

const scratch = mkdtempSync(join(tmpdir(), "ferrule-as-built-test-"));
let bundle: TestServerBundle;
let supervisor: Supervisor;
let endpointUrl: string;
let fingerprint: string;

type Outcome = { code: number; out: string; err: string };

function start(args: readonly string[], env: NodeJS.ProcessEnv = {}): Promise<Outcome> {
  return new Promise((resolve) => {
    execFile(process.execPath, args, { cwd: projectRoot, timeout: 100_000, env: { ...process.env, ...env } }, (error, out, err) => {
      resolve({ code: typeof error?.code === "number" ? error.code : error ? -1 : 0, out, err });
    });
  });
}

const run = (...args: string[]) => start(["build/node/cli.js", "as-built", ...args, "--pki", join(scratch, "pki")]);

beforeAll(async () => {
  const built = await start(["app/cli/launch.mjs", "ferrule", "help"]);
  expect(built.out).toContain("as-built FILE ENDPOINT");
  bundle = await buildTestServer("as-built-command");
  supervisor = new Supervisor({ entry: bundle.entry });
  const state = await startWinch(supervisor, makeSeed("cli", ["basic256sha256", "none"]));
  endpointUrl = state.endpointUrl ?? "";
  const certificate = new X509Certificate(supervisor.getCertificate("cli") ?? Buffer.alloc(0));
  fingerprint = createHash("sha256").update(certificate.raw).digest("hex");
});

afterAll(async () => {
  await supervisor.stopAll();
  bundle.remove();
  removeTestFolders();
  rmSync(scratch, { recursive: true, force: true });
});

describe("as-built", () => {
  it("prints the certificate's fingerprint and ends with 2 until it is given", async () => {
    const { code, err } = await run(winchFile, endpointUrl);
    expect(code).toBe(2);
    expect(err.replaceAll(":", "").toLowerCase()).toContain(fingerprint);
  });

  it("reads the pinned server and answers 0 as released", async () => {
    const { code, out } = await run(winchFile, endpointUrl, "--fingerprint", fingerprint, "--watch", "2", "--json");
    expect(code).toBe(0);
    const report = JSON.parse(out) as { verdict: string; differences: unknown[]; counts: { nodes: number; watched: number } };
    expect(report).toMatchObject({ verdict: "as released", differences: [] });
    expect(report.counts.watched).toBeGreaterThan(3);
  });

  it("talks to no other certificate", async () => {
    const { code, err } = await run(winchFile, endpointUrl, "--fingerprint", "00".repeat(32));
    expect(code).toBe(2);
    expect(err).toContain("another certificate");
  });

  it("names what differs and answers 1, unless it is told not to count", async () => {
    const changed = join(scratch, "changed.xml");
    writeFileSync(changed, readFileSync(winchFile, "utf8").replaceAll('BrowseName="1:Load"', 'BrowseName="1:Pull"'));
    const differs = await run(changed, endpointUrl, "--security", "none");
    expect(differs.code).toBe(1);
    expect(differs.out).toMatch(/Pull.*\n/);
    expect(differs.out).toContain("differs.");
    const ignored = await run(changed, endpointUrl, "--security", "none", "--ignore", "*");
    expect({ code: ignored.code, last: ignored.out.trim().split("\n").at(-1) }).toMatchObject({ code: 0, last: expect.stringMatching(/^0 differences count, [1-9].* as released\.$/) as string });
  });

  it("answers 2 for nobody there, a missing password and a file that is none", async () => {
    expect(await run(winchFile, "opc.tcp://127.0.0.1:1", "--security", "none")).toMatchObject({ code: 2, err: expect.stringContaining("does not answer") as string });
    expect(await run(winchFile, endpointUrl, "--fingerprint", fingerprint, "--user", "tester")).toMatchObject({ code: 2, err: expect.stringContaining("FERRULE_PASSWORD") as string });
    expect((await run(join(scratch, "none.xml"), endpointUrl)).code).toBe(2);
  });

  it("signs in with a user name", async () => {
    const args = ["build/node/cli.js", "as-built", winchFile, endpointUrl, "--fingerprint", fingerprint, "--user", "tester", "--pki", join(scratch, "pki")];
    expect((await start(args, { FERRULE_PASSWORD: "hawser" })).code).toBe(0);
    expect((await start(args, { FERRULE_PASSWORD: "wrong" })).code).toBe(2);
  });
});
