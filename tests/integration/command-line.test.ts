/** The command line as pipelines call it: exit codes, pure JSON, files. */
import { execFile } from "node:child_process";
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { getPackageFolder } from "~/library/published.server";
import { projectRoot } from "../support/source-files";

const scratch = mkdtempSync(join(tmpdir(), "ferrule-command-"));
afterAll(() => rmSync(scratch, { recursive: true, force: true }));

type Outcome = { code: number; out: string; err: string };

/** As `npm run ferrule` does: builds when stale. */
const launch = (...args: string[]): Promise<Outcome> => start(["app/cli/launch.mjs", "ferrule", ...args]);
/** What was built, without asking again whether it is stale. */
const run = (...args: string[]): Promise<Outcome> => start(["build/node/cli.js", ...args]);

function start(args: readonly string[]): Promise<Outcome> {
  return new Promise((resolve) => {
    const options = { cwd: projectRoot, timeout: 50_000, maxBuffer: 50_000_000 };
    execFile(process.execPath, args, options, (error, out, err) => {
      resolve({ code: typeof error?.code === "number" ? error.code : error ? -1 : 0, out, err });
    });
  });
}

const published = (name: string): string => join(getPackageFolder(), name);

function write(name: string, text: string): string {
  const path = join(scratch, name);
  writeFileSync(path, text);
  return path;
}

const OWN = "http://merrow.example/line/";

function file(required: string, body: string): string {
  return `<?xml version="1.0" encoding="utf-8"?>
<UANodeSet xmlns="http://opcfoundation.org/UA/2011/03/UANodeSet.xsd">
  <NamespaceUris><Uri>${OWN}</Uri></NamespaceUris>
  <Models><Model ModelUri="${OWN}" Version="1.0.0" PublicationDate="2026-01-01T00:00:00Z">${required}</Model></Models>
  ${body}
</UANodeSet>
`;
}

let first: Outcome;
beforeAll(async () => {
  first = await launch("help");
});

describe("ferrule", () => {
  it("explains itself", () => {
    expect(first).toMatchObject({ code: 0, out: expect.stringContaining("roundtrip IN OUT") as string });
  });

  it.each([
    [[]],
    [["check"]],
    [["check", "a", "b"]],
    [["roundtrip", "a"]],
    [["frobnicate"]],
    [["check", "--fast", "a"]],
  ])("answers wrong usage %j with 2", async (args) => {
    const { code, out, err } = await run(...args);
    expect({ code, out }).toEqual({ code: 2, out: "" });
    expect(err).not.toContain("    at ");
  });
});

describe("check", () => {
  it("prints one JSON document with ids by URI", async () => {
    const body = `<UAObject NodeId="ns=1;i=1" BrowseName="1:A"><DisplayName>A</DisplayName></UAObject>`;
    const path = write("one.xml", file('<RequiredModel ModelUri="http://opcfoundation.org/UA/" />', body));
    const { code, out } = await run("check", path, "--json");
    const report = JSON.parse(out) as {
      file: string;
      counts: Record<string, number>;
      findings: Record<string, unknown>[];
      problems: unknown[];
    };
    expect(report.file).toBe(path);
    expect(Object.keys(report)).toEqual(["file", "counts", "findings", "problems"]);
    expect(code).toBe(report.counts.error === 0 ? 0 : 1);
    // An Object without type definition breaks OPC 10000-3 §5.5.1.
    const found = report.findings.find((finding) => finding.nodeId === `nsu=${OWN};i=1`);
    expect(found).toMatchObject({
      browseName: expect.any(String) as string,
      line: 5,
      column: 3,
      facts: expect.any(Array) as unknown[],
    });
    expect(JSON.stringify(report.findings)).not.toMatch(/"nodeId":"ns=\d/);
  });

  it("finds no error in the base NodeSet, which requires nothing", async () => {
    const { code, out } = await run("check", published("Opc.Ua.NodeSet2.xml"), "--json");
    expect((JSON.parse(out) as { counts: { error: number } }).counts.error).toBe(0);
    expect(code).toBe(0);
  });

  it("answers 2 for a file that cannot be read, as JSON too", async () => {
    for (const path of [join(scratch, "none.xml"), join(projectRoot, "package.json"), write("cut.xml", "<UANodeSet")]) {
      const { code, out } = await run("check", path, "--json");
      expect(code).toBe(2);
      expect((JSON.parse(out) as { problems: unknown[] }).problems).toHaveLength(1);
    }
  });

  it("answers 2 and names what is missing, until --with brings it", async () => {
    const required = '<RequiredModel ModelUri="http://merrow.example/base/" Version="3.1" />';
    const path = write("needs.xml", file(required, ""));
    const missing = await run("check", path);
    expect(missing.code).toBe(2);
    expect(missing.out).toContain(`${path}:4:`);
    expect(missing.out).toContain(
      `${OWN} requires the model http://merrow.example/base/ (3.1), which is not in the library.`,
    );
    const folder = join(scratch, "more");
    mkdirSync(join(folder, "below"), { recursive: true });
    writeFileSync(
      join(folder, "below", "base.xml"),
      file("", "").replaceAll(OWN, "http://merrow.example/base/").replace('"1.0.0"', '"3.1"'),
    );
    expect((await run("check", path, "--with", folder)).out).not.toContain("not in the library");
  });
});

describe("roundtrip", () => {
  it("writes the same bytes for its own output", async () => {
    const [once, twice] = [join(scratch, "1.xml"), join(scratch, "2.xml")];
    expect((await run("roundtrip", published("Opc.Ua.IOLink.NodeSet2.xml"), once)).code).toBe(0);
    expect((await run("roundtrip", once, twice)).code).toBe(0);
    const canonical = join(scratch, "canonical.xml");
    expect((await run("roundtrip", once, canonical, "--canonical")).code).toBe(0);
    const order = (path: string): string[] =>
      [...readFileSync(path, "utf8").matchAll(/<UA(\w+) NodeId="([^"]+)"/g)].map((match) => match[2] ?? "");
    expect(order(canonical)).not.toEqual(order(once));
    expect(order(canonical).sort()).toEqual(order(once).sort());
    expect(readFileSync(twice)).toEqual(readFileSync(once));
  });

  it("needs no required models", async () => {
    const value = '<Value><x:Thing xmlns:x="urn:unknown">7</x:Thing></Value>';
    const body = `<UAVariable NodeId="ns=1;i=1" BrowseName="1:A" DataType="ns=1;i=99">${value}</UAVariable>`;
    const path = write("alone.xml", file('<RequiredModel ModelUri="urn:nowhere" />', body));
    expect((await run("roundtrip", path, join(scratch, "alone.out.xml"))).code).toBe(0);
    expect(readFileSync(join(scratch, "alone.out.xml"), "utf8")).toContain(value);
  });

  it("writes nothing when something could not be kept", async () => {
    const node = '<UAObject NodeId="ns=1;i=1" BrowseName="1:A"/>';
    const output = join(scratch, "twice.out.xml");
    const { code, err } = await run("roundtrip", write("twice.xml", file("", node + node)), output);
    expect(code).toBe(1);
    expect(err).toContain("nodeset.duplicate-node-id");
    expect(existsSync(output)).toBe(false);
  });

  it("answers 2 where it cannot read or write", async () => {
    expect((await run("roundtrip", join(scratch, "none.xml"), join(scratch, "x.xml"))).code).toBe(2);
    expect((await run("roundtrip", published("Opc.Ua.Di.NodeSet2.xml"), join(scratch, "no", "folder.xml"))).code).toBe(
      2,
    );
  });
});
