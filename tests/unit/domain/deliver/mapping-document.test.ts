import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { applyMappingDocument, makeTypeDocument } from "~/domain/deliver/make-mapping-document";
import { readMappingDocument, writeMappingDocument } from "~/domain/deliver/mapping-document";
import { applyOperations } from "~/domain/editing/apply-operation";
import { listTargets } from "~/domain/mapping/list-targets";
import { readTypeMapping } from "~/domain/mapping/type-mapping";
import { braiderType, makeBraiderSpace, makeMappedBraiderSpace, readDemoDocument } from "../../../support/demo-mapping";

describe("the mapping document", () => {
  it("is read into a model and written out of it unchanged", () => {
    const document = readDemoDocument();
    expect(makeTypeDocument(makeMappedBraiderSpace(), braiderType)).toEqual(document);
  });

  it("gives the same mapping back when it is read again, through its text", () => {
    const mapped = makeMappedBraiderSpace();
    const text = writeMappingDocument(makeTypeDocument(mapped, braiderType));
    const fresh = makeBraiderSpace();
    const operations = getValue(applyMappingDocument(fresh, braiderType, getValue(readMappingDocument(text))));
    const again = getValue(applyOperations(fresh, operations));
    expect(readTypeMapping(again, braiderType)).toEqual(readTypeMapping(mapped, braiderType));
    expect(getValue(applyMappingDocument(mapped, braiderType, getValue(readMappingDocument(text))))).toEqual([]);
  });

  it("names the member that the type lacks and changes nothing", () => {
    const document = readDemoDocument();
    const [row] = document.mapping.rows;
    const rows = row ? [{ ...row, target: "Process/Nowhere" }] : [];
    const read = applyMappingDocument(makeBraiderSpace(), braiderType, { ...document, mapping: { ...document.mapping, rows } });
    expect(read.ok ? [] : read.problems.map((p) => [p.code, p.at?.path])).toContainEqual(["mapping.unknown-target", "Process/Nowhere"]);
  });
});

describe("targets of a machine type", () => {
  const targets = listTargets(makeBraiderSpace(), braiderType);
  const find = (path: string) => targets.find((t) => t.path === path);

  // Scenario: table of the members of RopeBraiderType.
  it("know unit, ranges, data type and rule", () => {
    expect(find("Process/CreelDistance")).toMatchObject({
      group: "Process",
      dataTypeName: "Float",
      unit: { code: "MMT" },
      range: { low: 0, high: 400 },
      isMandatory: true,
    });
    expect(find("Process/PicksCounter")).toMatchObject({ dataTypeName: "UInt32", isMandatory: false, unit: undefined });
    expect(find("Status/State")?.states.map((s) => s.text)).toEqual(["Off", "Setup", "Running", "Waiting", "Fault"]);
  });

  it("reach into types of members that the model does not declare", () => {
    const inside = targets.filter((t) => t.path.startsWith("Status/StackLight/") && t.target.includes("\n"));
    expect(inside.length).toBeGreaterThan(0);
    expect(new Set(targets.map((t) => t.target)).size).toBe(targets.length);
    expect(targets.some((t) => /EngineeringUnits|EURange/.test(t.path))).toBe(false);
  });
});
