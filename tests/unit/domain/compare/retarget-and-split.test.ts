import { describe, expect, test } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { standardKey, type NodeKey } from "~/domain/address-space/node-id";
import { compareModels } from "~/domain/compare/compare-models";
import { AffectedFinder } from "~/domain/compare/find-affected";
import { listRetargetBreaks } from "~/domain/compare/list-retarget-breaks";
import { splitModel } from "~/domain/compare/split-model";
import { takeBackChange } from "~/domain/compare/take-back-change";
import { getValue } from "~/domain/core/result";
import { applyOperation, applyOperations } from "~/domain/editing/apply-operation";
import { getStandardLayer } from "../../../support/published-layers";
import { makeNode, makeSpace, smallStandard, TEST_NAMESPACE } from "../../../support/small-standard";

const [HasComponent, HasSubtype, HasTypeDefinition] = [standardKey(47), standardKey(45), standardKey(40)];
const keyOf = (id: number): NodeKey => makeNode(id, "Object").key;

function makeModel(): AddressSpace {
  return makeSpace([
    makeNode(1, "ObjectType", { references: [{ type: HasSubtype, target: standardKey(58), isForward: false }] }),
    makeNode(2, "Variable", {
      dataType: standardKey(11),
      parent: keyOf(1),
      references: [
        { type: HasComponent, target: keyOf(1), isForward: false },
        { type: HasTypeDefinition, target: standardKey(63), isForward: true },
      ],
    } as never),
    makeNode(3, "ObjectType", { references: [{ type: HasSubtype, target: keyOf(1), isForward: false }] }),
    makeNode(4, "Object", {
      references: [
        { type: standardKey(35), target: standardKey(85), isForward: false },
        { type: HasTypeDefinition, target: keyOf(3), isForward: true },
      ],
    }),
    makeNode(5, "Variable", {
      dataType: standardKey(11),
      browseName: { namespaceUri: TEST_NAMESPACE, name: "Node2" },
      parent: keyOf(4),
      references: [
        { type: HasComponent, target: keyOf(4), isForward: false },
        { type: HasTypeDefinition, target: standardKey(63), isForward: true },
      ],
    } as never),
  ]);
}

describe("whom a change touches", () => {
  test("subtypes, instances, and the reader of an instance's member by browse path", () => {
    const before = makeModel();
    const after = getValue(
      applyOperation(before, { kind: "setAttribute", key: keyOf(2), attribute: "dataType", value: standardKey(12) }),
    );
    const readers = [
      { id: "r", name: "Planner", nodeIds: [keyOf(5)] },
      { id: "b", name: "Board of the whole machine", nodeIds: [keyOf(4)] },
      { id: "s", name: "Other", nodeIds: ["nsu=urn:x;i=1"] },
    ];
    const [change] = compareModels(before, after).changes;
    const found = change && new AffectedFinder({ before, after }, { name: "M", dependents: [], readers }).find(change);
    expect(found?.subtypes.map((place) => place.path)).toEqual(["Node3"]);
    expect(found?.instances.map((place) => place.path)).toEqual(["Node4"]);
    expect(found?.readers).toMatchObject([
      { id: "r", name: "Planner", effect: "stops", nodeIds: [keyOf(5)] },
      { id: "b", effect: "stops", nodeIds: [keyOf(4)] },
    ]);
    expect(
      change && compareModels(before, getValue(applyOperations(after, takeBackChange(before, after, change)))).changes,
    ).toEqual([]);
  });
});

describe("another version of a required model", () => {
  test("tells the own nodes that use what is gone or breaks", () => {
    const kept = [...smallStandard.nodes.values()].filter((node) => node.key !== standardKey(63));
    const other = buildLayer(
      smallStandard.header,
      kept.map((node) => (node.key === standardKey(11) ? ({ ...node, isAbstract: true } as typeof node) : node)),
    );
    const breaks = listRetargetBreaks(makeModel(), [other]);
    expect(new Set(breaks.map((row) => `${row.path} ${row.uses} ${row.kind}`))).toEqual(
      new Set(
        ["Node1/Node2", "Node4/Node2"].flatMap((path) => [
          `${path} BaseDataVariableType gone`,
          `${path} Double abstract-changed`,
        ]),
      ),
    );
    expect(listRetargetBreaks(makeModel(), [smallStandard])).toEqual([]);
  });
});

/** A new model has the metadata of its namespace, whose types only the whole namespace 0 has. */
const onStandard = (space: AddressSpace): AddressSpace => AddressSpace.of([getStandardLayer()], space.own);

describe("splitModel", () => {
  const intent = {
    namespaceUri: "http://example.test/UA/Part/",
    version: "1.0.0",
    publicationDate: "2026-12-01T00:00:00Z",
  };

  test("moves types with their members and lets the rest name them by their new ids", () => {
    const space = onStandard(makeModel());
    const { content, operations, moved } = getValue(splitModel(space, { ...intent, types: [keyOf(1)] }));
    expect(moved).toBe(2);
    expect(content.nodes.filter((node) => node.browseName.name.startsWith("Node")).map((node) => node.key)).toEqual([
      `nsu=${intent.namespaceUri};i=1`,
      `nsu=${intent.namespaceUri};i=2`,
    ]);
    const required = AddressSpace.of([getStandardLayer(), buildLayer(content.header, content.nodes)], space.own);
    const rest = getValue(applyOperations(required, operations));
    expect([...rest.own.nodes.keys()].sort()).toEqual([keyOf(3), keyOf(4), keyOf(5)]);
    expect(rest.getNode(keyOf(3))?.references).toEqual([
      { type: HasSubtype, target: `nsu=${intent.namespaceUri};i=1`, isForward: false },
    ]);
    expect(rest.own.header.namespaceUris).toContain(intent.namespaceUri);
  });

  test("refuses a part that would need what it leaves", () => {
    const refused = splitModel(onStandard(makeModel()), { ...intent, types: [keyOf(3)] });
    expect(refused.problems.map((p) => p.code)).toEqual(["split.depends-on-rest"]);
  });
});
