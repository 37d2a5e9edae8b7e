/** `check` and `rules` as pipelines call them: formats, threshold, waivers, conventions of a team. */
import { execFile } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { projectRoot } from "../support/source-files";

const scratch = mkdtempSync(join(tmpdir(), "ferrule-check-"));
afterAll(() => rmSync(scratch, { recursive: true, force: true }));

type Outcome = { code: number; out: string };

function start(args: readonly string[]): Promise<Outcome> {
  return new Promise((resolve) => {
    const options = { cwd: projectRoot, timeout: 50_000, maxBuffer: 50_000_000 };
    execFile(process.execPath, args, options, (error, out) => {
      resolve({ code: typeof error?.code === "number" ? error.code : error ? -1 : 0, out });
    });
  });
}

const run = (...args: string[]): Promise<Outcome> => start(["build/node/cli.js", ...args]);

function write(name: string, text: string): string {
  const path = join(scratch, name);
  writeFileSync(path, text);
  return path;
}

const OWN = "http://merrow.example/line/";

/** One type without a DisplayName, which is an error, and without a Description, which is a hint; no metadata object. */
const model = write(
  "line.xml",
  `<?xml version="1.0" encoding="utf-8"?>
<UANodeSet xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd">
  <NamespaceUris><Uri>${OWN}</Uri></NamespaceUris>
  <Models><Model ModelUri="${OWN}" Version="1.0.0" ModelVersion="1.0.0" PublicationDate="2026-01-01T00:00:00Z">
    <RequiredModel ModelUri="http://opcfoundation.org/UA/" PublicationDate="2013-12-02T00:00:00Z"/></Model></Models>
  <UAObjectType NodeId="ns=1;i=1001" BrowseName="1:LineType">
    <References><Reference ReferenceType="i=45" IsForward="false">i=58</Reference></References>
  </UAObjectType>
</UANodeSet>
`,
);

type Report = { findings: { rule: string; severity: string; nodeId: string; line: number }[] };

async function list(...args: string[]): Promise<{ code: number; rules: string[] }> {
  const { code, out } = await run("check", model, "--json", ...args);
  return { code, rules: (JSON.parse(out) as Report).findings.map((f) => f.rule) };
}

beforeAll(async () => {
  await start(["app/cli/launch.mjs", "ferrule", "help"]);
});

describe("ferrule check", () => {
  it("finds with line and NodeId", async () => {
    const { code, out } = await run("check", model, "--json");
    expect(code).toBe(1);
    expect((JSON.parse(out) as Report).findings).toContainEqual(
      expect.objectContaining({ rule: "R016", severity: "error", nodeId: `nsu=${OWN};i=1001`, line: 6 }),
    );
  });

  it("leaves out what is below the severity asked for", async () => {
    expect((await list()).rules).toContain("R019");
    expect((await list("--severity", "warning")).rules).not.toContain("R019");
  });

  it("prints SARIF with the same findings", async () => {
    const { code, out } = await run("check", model, "--format", "sarif");
    const log = JSON.parse(out) as { version: string; runs: { results: { ruleId: string }[] }[] };
    expect({ code, version: log.version }).toEqual({ code: 1, version: "2.1.0" });
    expect(log.runs[0]?.results.map((r) => r.ruleId).sort()).toEqual((await list()).rules.sort());
  });

  it("asks what the team has agreed on", async () => {
    const conventions = write("conventions.json", JSON.stringify({ names: { ObjectType: "[A-Z]+" } }));
    expect((await list("--conventions", conventions)).rules).toContain("R301");
  });

  it("keeps a finding whose waiver does not fit the node any more", async () => {
    const waiver = {
      rule: "R016",
      nodeId: `nsu=${OWN};i=1001`,
      attribute: "displayName",
      reason: "Known",
      person: "Ines",
      date: "2026-05-04",
    };
    const waivers = write(
      "waivers.json",
      JSON.stringify({ waivers: [{ ...waiver, fingerprint: "0000000000000000" }] }),
    );
    expect((await list("--waivers", waivers)).rules).toContain("R016");
  });

  it.each([
    ["--waivers", "{"],
    ["--conventions", JSON.stringify({ names: { ObjectType: "[" } })],
  ])("answers a broken file for %s with 2 and a problem", async (option, text) => {
    const { code, out } = await run("check", model, "--json", option, write("broken.json", text));
    expect(code).toBe(2);
    expect((JSON.parse(out) as { problems: { code: string }[] }).problems[0]?.code).toBe("check-file.unreadable");
  });

  it("refuses a format that it does not know", async () => {
    expect((await run("check", model, "--format", "html")).code).toBe(2);
  });
});

describe("ferrule rules", () => {
  it("lists every rule with what pipelines need", async () => {
    const { code, out } = await run("rules", "--json");
    const rules = JSON.parse(out) as Record<string, unknown>[];
    expect(code).toBe(0);
    expect(rules.length).toBeGreaterThanOrEqual(204);
    for (const rule of rules) {
      expect(Object.keys(rule)).toEqual(
        expect.arrayContaining(["id", "title", "severity", "clause", "hasFix", "implemented"]),
      );
    }
  });
});
