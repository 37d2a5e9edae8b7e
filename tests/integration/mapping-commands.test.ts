/** The command line over mappings: exit codes, problems, check cases. */
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import { check } from "~/cli/check";
import type { CheckCommand } from "~/cli/parse-command-line";

const model = "nodesets/demo/merrow-rope-braider.NodeSet2.xml";
const document = "nodesets/demo/rope-braider.mapping.json";
let folder: string;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "ferrule-mapping-"));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

async function run(mapping: string | undefined): Promise<{ code: number; out: string }> {
  let out = "";
  const write = vi.spyOn(process.stdout, "write").mockImplementation((text) => {
    out += String(text);
    return true;
  });
  const command: CheckCommand = { name: "check", file: model, folders: [], format: "text", severity: undefined, waivers: undefined, conventions: undefined, mapping };
  try {
    return { code: await check(command), out };
  } finally {
    write.mockRestore();
  }
}

describe("check with a mapping document", () => {
  test("runs the check cases and finds nothing wrong with the demo's", async () => {
    const { code, out } = await run(document);
    expect(code).toBe(0);
    expect(out).not.toMatch(/R2\d\d|R4\d\d/);
  });

  test("tells a check case that does not hold and ends with 1", async () => {
    const changed = JSON.parse(readFileSync(document, "utf8")) as { checkCases: { expected: { value: unknown }[] }[] };
    const expected = changed.checkCases[0]?.expected[0];
    if (expected) expected.value = 221;
    const file = join(folder, "changed.mapping.json");
    writeFileSync(file, JSON.stringify(changed));
    const { code, out } = await run(file);
    expect(code).toBe(1);
    expect(out).toContain("R402");
    expect(out).toContain("expected 221 Good, got 220 Good");
  });

  test("ends with 2 for a document that cannot be read or names another type", async () => {
    const broken = join(folder, "broken.json");
    writeFileSync(broken, "{");
    expect((await run(broken)).code).toBe(2);
    const other = join(folder, "other.json");
    writeFileSync(other, readFileSync(document, "utf8").replaceAll("RopeBraiderType", "PressType"));
    const { code, out } = await run(other);
    expect(code).toBe(2);
    expect(out).toContain("PressType");
  });
});
