import { readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, it } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { hasValueAttributes } from "~/domain/address-space/node";
import { numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { getValue, type Result } from "~/domain/core/result";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { setEnumerationFields } from "~/domain/editing/commands/add-enumeration";
import {
  listEncodings,
  setOptionSetBits,
  setStructureFields,
  type StructureFieldIntent,
} from "~/domain/editing/commands/add-structure";
import { setAbstract, setBaseType } from "~/domain/editing/commands/change-data-type";
import { setValue } from "~/domain/editing/commands/set-value";
import type { CommandContext, Edit } from "~/domain/editing/edit-draft";
import { convertValues, listValueMisfits } from "~/domain/editing/misfit-values";
import { SpaceDataTypes } from "~/domain/nodeset/values/data-type-shapes";
import { formatValue } from "~/domain/nodeset/values/format-value";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { readValue } from "~/domain/nodeset/values/read-value";
import { getStandardLayer } from "../../../support/published-layers";
import { projectRoot } from "../../../support/source-files";

const NAMESPACE = "http://example.test/UA/Values/";
const file = join(projectRoot, "tests/fixtures/nodesets/values-of-all-types.NodeSet2.xml");
const { header, nodes } = getValue(readNodeSet(readFileSync(file, "utf8")));
const before = AddressSpace.of([getStandardLayer()], buildLayer(header, nodes));
const keyOf = (id: number): NodeKey => toNodeKey(numericNodeId(NAMESPACE, id));
const [pointType, shapeType, colour, health, union] = [3001, 3002, 3007, 3008, 3005].map(keyOf) as [
  NodeKey,
  NodeKey,
  NodeKey,
  NodeKey,
  NodeKey,
];
const [aPoint, aColour, aHealth] = [6026, 6030, 6031].map(keyOf) as [NodeKey, NodeKey, NodeKey];

const context: CommandContext = BlockAllocator.forModel(() => before, [{ from: 9000, to: 9100 }]);

function run<I>(space: AddressSpace, command: (s: AddressSpace, c: CommandContext, i: I) => Result<Edit>, intent: I) {
  return getValue(applyOperations(space, getValue(command(space, context, intent)).operations));
}

function show(space: AddressSpace, key: NodeKey): string {
  const node = space.requireNode(key);
  const types = new SpaceDataTypes(space);
  return hasValueAttributes(node) && node.value ? formatValue(getValue(readValue(node.value, types)), types) : "none";
}

const X: StructureFieldIntent = { name: "X", dataType: StandardDataType.Double };
const Y: StructureFieldIntent = { name: "Y", dataType: StandardDataType.Double };
const label: StructureFieldIntent = { name: "Label", dataType: StandardDataType.String, isOptional: true };

describe("an edit of a DataType", () => {
  it("names values that cannot be read any more, and makes them fit", () => {
    const after = run(before, setStructureFields, { dataType: pointType, fields: [X, label] });
    const misfits = listValueMisfits(before, after, pointType);
    expect(misfits).toEqual([{ node: aPoint, kind: "unreadable" }]);
    const converted = run(after, convertValues, { before, nodes: [aPoint] });
    expect(show(converted, aPoint)).toBe("{X: 1.5, Label: north}");
  });

  it("names values that lack a new field, which gets its default", () => {
    const fields = [X, Y, label, { name: "Count", dataType: StandardDataType.Int32 }];
    const after = run(before, setStructureFields, { dataType: pointType, fields });
    expect(listValueMisfits(before, after, pointType)).toEqual([{ node: aPoint, kind: "incomplete" }]);
    const converted = run(after, convertValues, { before, nodes: [aPoint] });
    expect(show(converted, aPoint)).toBe("{X: 1.5, Y: 2, Label: north, Count: 0}");
    const node = converted.requireNode(aPoint);
    expect(hasValueAttributes(node) && node.value?.xml).toMatch(/<Count>0<\/Count>/);
  });

  it("carries a renamed field and another DataType along", () => {
    const east: StructureFieldIntent = { name: "East", was: "X", dataType: StandardDataType.String };
    const after = run(before, setStructureFields, { dataType: pointType, fields: [east, Y, label] });
    const converted = run(after, convertValues, { before, nodes: [aPoint], renamed: new Map([["East", "X"]]) });
    expect(show(converted, aPoint)).toBe("{East: 1.5, Y: 2, Label: north}");
  });

  it("names numbers without a text and bits without a name", () => {
    const fields = [
      { name: "Red", value: 0 },
      { name: "Blue", value: 2 },
    ];
    const after = run(before, setEnumerationFields, { dataType: colour, fields });
    expect(listValueMisfits(before, after, colour)).toEqual([{ node: aColour, kind: "unnamed" }]);
    const bits = [{ name: "Warm", bit: 0 }];
    const cooler = run(before, setOptionSetBits, { dataType: health, bits });
    expect(listValueMisfits(before, cooler, health)).toEqual([{ node: aHealth, kind: "unnamed" }]);
    expect(show(run(cooler, convertValues, { before, nodes: [aHealth] }), aHealth)).toBe("1");
  });

  it("names nothing where nothing changes for a value", () => {
    const described = [{ ...X, description: [{ text: "East" }] }, Y, label];
    const after = run(before, setStructureFields, { dataType: pointType, fields: described });
    expect(listValueMisfits(before, after, pointType)).toEqual([]);
  });

  it("takes the encodings of a structure away and makes them again with ids never given before", () => {
    const first = listEncodings(before, pointType);
    const abstract = run(before, setAbstract, { dataType: pointType, isAbstract: true });
    expect(listEncodings(abstract, pointType)).toEqual([]);
    expect(listValueMisfits(before, abstract, pointType)).toEqual([{ node: aPoint, kind: "unreadable" }]);
    const again = listEncodings(run(abstract, setAbstract, { dataType: pointType, isAbstract: false }), pointType);
    expect(again).toHaveLength(3);
    expect(again.filter((key) => first.includes(key))).toEqual([]);
  });

  it("hangs a type below another one of its kind only", () => {
    expect(setBaseType(before, context, { dataType: pointType, supertype: shapeType }).ok).toBe(true);
    const problems = (supertype: NodeKey) => {
      const result = setBaseType(before, context, { dataType: pointType, supertype });
      return result.ok ? [] : result.problems.map((p) => p.code);
    };
    expect(problems(StandardDataType.Enumeration)).toEqual(["data-type.other-kind"]);
    expect(problems(union)).toEqual(["data-type.other-kind"]);
    expect(problems(pointType)).toEqual(["data-type.own-subtype"]);
  });
});

describe("a value that is read and set again", () => {
  it("keeps its text, to the last space", () => {
    const types = new SpaceDataTypes(before);
    let count = 0;
    for (const node of before.listOwnNodes()) {
      const read = hasValueAttributes(node) && node.value ? readValue(node.value, types) : undefined;
      if (!read?.ok) continue;
      count++;
      expect(getValue(setValue(before, context, { node: node.key, value: read.value })).operations).toEqual([]);
    }
    expect(count).toBe(7);
  });
});
