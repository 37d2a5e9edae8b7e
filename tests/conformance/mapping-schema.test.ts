/**
 * The published JSON Schema of mapping documents is what the reader checks by, and an independent validator agrees with the
 * reader. `npx vitest run --project conformance mapping-schema -u` writes the file anew; a change that is not compatible
 * needs a new number in its name.
 */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { Ajv2020 } from "ajv/dist/2020.js";
import { describe, expect, test } from "vitest";
import { MAPPING_DOCUMENT_VERSION, makeMappingDocumentSchema, readMappingDocument } from "~/domain/deliver/mapping-document";
import { projectRoot } from "../support/source-files";

const file = join(projectRoot, `public/schemas/mapping-document-${MAPPING_DOCUMENT_VERSION}.schema.json`);
const validate = new Ajv2020({ strict: false }).compile(makeMappingDocumentSchema() as object);
const demo = readFileSync(join(projectRoot, "nodesets/demo/rope-braider.mapping.json"), "utf8");

describe("the JSON Schema of mapping documents", () => {
  test("is the published file", async () => {
    await expect(`${JSON.stringify(makeMappingDocumentSchema(), null, 2)}\n`).toMatchFileSnapshot(file);
  });

  test("takes the demo's document, as the reader does", () => {
    expect(validate(JSON.parse(demo)) ? [] : validate.errors).toEqual([]);
    expect(readMappingDocument(demo).ok).toBe(true);
  });

  test.each([
    ["an unknown member", (d: Record<string, unknown>) => ({ ...d, extra: 1 })],
    ["no rows", (d: Record<string, unknown>) => ({ ...d, mapping: { machineType: "T", roles: [] } })],
    ["another version", (d: Record<string, unknown>) => ({ ...d, formatVersion: 2 })],
  ])("refuses %s, as the reader does", (_, change) => {
    const changed = change(JSON.parse(demo) as Record<string, unknown>);
    expect(validate(changed)).toBe(false);
    expect(readMappingDocument(JSON.stringify(changed)).ok).toBe(false);
  });
});
