import { describe, expect, it } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { numericNodeId, OPC_UA_NAMESPACE, standardKey, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { operationSchema } from "~/domain/editing/operation-schema";
import { expectOperation, expectRefused } from "../../../support/expect-operation";
import { makeNode, makeSpace, smallStandard, TEST_NAMESPACE } from "../../../support/small-standard";

const HasComponent = standardKey(47);
const keyOf = (id: number): NodeKey => toNodeKey(numericNodeId(TEST_NAMESPACE, id));
const parent = makeNode(1, "ObjectType");
const child = makeNode(2, "Variable", {
  references: [
    { type: HasComponent, target: parent.key, isForward: false },
    { type: standardKey(40), target: standardKey(63), isForward: true },
    { type: standardKey(37), target: standardKey(78), isForward: true },
  ],
});

describe("addNode", () => {
  it("adds a node with what it declares and takes it away again", () => {
    const space = expectOperation(makeSpace([parent]), { kind: "addNode", node: child });
    expect(space.edgesFrom(parent.key)).toEqual([{ source: parent.key, type: HasComponent, target: child.key }]);
  });

  it("refuses a key and a NodeId of another node", () => {
    const renumbered = makeNode(5, "Object", { nodeId: numericNodeId(TEST_NAMESPACE, 6) });
    const space = makeSpace([parent, renumbered]);
    expectRefused(space, { kind: "addNode", node: parent }, "operation.node-exists");
    expectRefused(space, { kind: "addNode", node: makeNode(6, "Object") }, "operation.node-id-taken");
    const standard = makeNode(8, "Object", { nodeId: numericNodeId(OPC_UA_NAMESPACE, 58) });
    expectRefused(space, { kind: "addNode", node: standard }, "operation.node-id-taken");
  });

  it("refuses references to nodes that are not there, unless the node was like that before", () => {
    expectRefused(makeSpace([]), { kind: "addNode", node: child }, "operation.node-missing");
    expectOperation(makeSpace([]), { kind: "addNode", node: child, isDangling: true });
  });
});

describe("removeNode", () => {
  it("refuses a node that others still refer to, a foreign one and one that is gone", () => {
    const space = makeSpace([parent, child]);
    expectRefused(space, { kind: "removeNode", key: parent.key }, "operation.node-in-use");
    expectRefused(space, { kind: "removeNode", key: standardKey(58) }, "operation.node-foreign");
    expectRefused(space, { kind: "removeNode", key: keyOf(99) }, "operation.node-missing");
  });

  it("restores a node with references to what was never loaded", () => {
    const orphan = makeNode(3, "Object", { references: [{ type: HasComponent, target: keyOf(77), isForward: false }] });
    expectOperation(makeSpace([orphan]), { kind: "removeNode", key: orphan.key });
  });

  it("keeps a reference to another server", () => {
    const far = makeNode(4, "Object", {
      references: [{ type: HasComponent, target: keyOf(5), isForward: true, serverUri: "urn:elsewhere" }],
    });
    expectOperation(makeSpace([far]), { kind: "removeNode", key: far.key });
  });
});

describe("setAttribute", () => {
  const space = makeSpace([parent, child]);

  it("sets, changes and takes away", () => {
    const named = expectOperation(space, {
      kind: "setAttribute",
      key: child.key,
      attribute: "dataType",
      value: standardKey(11),
    });
    const without = expectOperation(named, { kind: "setAttribute", key: child.key, attribute: "dataType" });
    expect(without.getNode(child.key)).not.toHaveProperty("dataType");
  });

  it("refuses an attribute that the class has not, and taking away what every node has", () => {
    expectRefused(
      space,
      { kind: "setAttribute", key: parent.key, attribute: "dataType", value: standardKey(11) },
      "operation.attribute-class",
    );
    expectRefused(
      space,
      { kind: "setAttribute", key: parent.key, attribute: "displayName" },
      "operation.attribute-required",
    );
    expectRefused(
      space,
      { kind: "setAttribute", key: standardKey(58), attribute: "isAbstract", value: true },
      "operation.node-foreign",
    );
  });

  it("renumbers a node and finds it by its new NodeId only", () => {
    const nodeId = numericNodeId(TEST_NAMESPACE, 4711);
    const next = expectOperation(space, { kind: "setAttribute", key: child.key, attribute: "nodeId", value: nodeId });
    expect(next.findByNodeId(nodeId)?.key).toBe(child.key);
    expect(next.findByNodeId(child.nodeId)).toBeUndefined();
    expectOperation(next, { kind: "setAttribute", key: child.key, attribute: "nodeId", value: child.nodeId });
  });
});

describe("addReference and removeReference", () => {
  const other = makeNode(3, "Object");
  const space = makeSpace([parent, child, other]);
  const edge = { source: parent.key, type: HasComponent, target: other.key };

  it("declares at the end that is asked for", () => {
    const atSource = expectOperation(space, { kind: "addReference", ...edge, declaredAt: "source" });
    expect(atSource.getNode(parent.key)?.references).toHaveLength(1);
    const atBoth = expectOperation(space, { kind: "addReference", ...edge, declaredAt: "both" });
    expect(atBoth.getNode(parent.key)?.references).toHaveLength(1);
    expect(atBoth.getNode(other.key)?.references).toHaveLength(1);
    expect(atBoth.edgesFrom(parent.key).filter((e) => e.target === other.key)).toHaveLength(1);
    expectOperation(atBoth, { kind: "removeReference", ...edge });
  });

  it("skips the foreign end, refuses two foreign ends, missing nodes and doubles", () => {
    const toFolder = { source: standardKey(85), type: standardKey(35), target: other.key };
    const organised = expectOperation(space, { kind: "addReference", ...toFolder, declaredAt: "both" });
    expectRefused(organised, { kind: "addReference", ...toFolder, declaredAt: "target" }, "operation.reference-exists");
    expectRefused(space, { kind: "addReference", ...toFolder, declaredAt: "source" }, "operation.node-foreign");
    const foreign = { source: standardKey(85), type: standardKey(35), target: standardKey(58) };
    expectRefused(space, { kind: "addReference", ...foreign, declaredAt: "both" }, "operation.node-foreign");
    expectRefused(
      space,
      { kind: "addReference", ...edge, target: keyOf(9), declaredAt: "both" },
      "operation.node-missing",
    );
    expectRefused(space, { kind: "removeReference", ...edge }, "operation.reference-missing");
    const standard = { source: standardKey(31), type: standardKey(45), target: standardKey(32) };
    expectRefused(space, { kind: "removeReference", ...standard }, "operation.node-foreign");
  });

  it("restores places in both lists, repeated declarations and a reference of a node to itself", () => {
    const reference = { type: HasComponent, target: parent.key, isForward: false };
    const filler = { type: standardKey(37), target: standardKey(80), isForward: true };
    const messy = makeNode(3, "Object", { references: [filler, reference, filler, reference] });
    expectOperation(makeSpace([parent, messy]), { kind: "removeReference", ...edge });
    const self = makeNode(6, "Object", {
      references: [
        { type: HasComponent, target: keyOf(6), isForward: false },
        filler,
        { type: HasComponent, target: keyOf(6), isForward: true },
      ],
    });
    expectOperation(makeSpace([self]), {
      kind: "removeReference",
      source: self.key,
      type: HasComponent,
      target: self.key,
    });
  });
});

describe("setHeader", () => {
  it("sets version, required models and namespace table, and refuses to take the table away", () => {
    const models = [{ modelUri: TEST_NAMESPACE, version: "2.0.0", requiredModels: [] }];
    expectOperation(makeSpace(), { kind: "setHeader", field: "models", value: models });
    expectOperation(makeSpace(), { kind: "setHeader", field: "namespaceUris", value: [TEST_NAMESPACE, "urn:b"] });
    expectOperation(makeSpace(), { kind: "setHeader", field: "lastModified", value: "2024-01-01T00:00:00Z" });
    expectRefused(makeSpace(), { kind: "setHeader", field: "models" }, "operation.header-required");
  });
});

describe("applyOperations", () => {
  it("does all or nothing and names the operation that failed", () => {
    const result = applyOperations(makeSpace([parent]), [
      { kind: "addNode", node: child },
      { kind: "removeNode", key: parent.key },
    ]);
    expect(result.ok).toBe(false);
    expect(result.problems[0]).toMatchObject({ code: "operation.node-in-use", data: { operation: 1 } });
  });
});

describe("operationSchema", () => {
  const refuses = (operation: unknown): void => expect(operationSchema.safeParse(operation).success).toBe(false);

  it("is strict: unknown members, wrong types of attributes, ids out of range", () => {
    refuses({ kind: "removeNode", key: "i=1", more: 1 });
    refuses({ kind: "removeNode", key: "one" });
    refuses({ kind: "setAttribute", key: "i=1", attribute: "valueRank", value: "1" });
    refuses({ kind: "setAttribute", key: "i=1", attribute: "displayName", value: "Name" });
    refuses({ kind: "setAttribute", key: "i=1", attribute: "displayName" });
    refuses({ kind: "setAttribute", key: "i=1", attribute: "references", value: [] });
    refuses({
      kind: "setAttribute",
      key: "i=1",
      attribute: "nodeId",
      value: { namespaceUri: "u", type: "i", identifier: 4294967296 },
    });
    refuses({ kind: "addNode", node: { ...child, dataTypes: 1 } });
    refuses({ kind: "addNode", node: { ...parent, dataType: "i=1" } });
    refuses({ kind: "setHeader", field: "models", value: [{ modelUri: "u" }] });
    refuses({ kind: "explode" });
  });
});

describe("indexes", () => {
  it("give one order of members, whichever way the model came about", () => {
    const nodes = [
      parent,
      makeNode(9, "Object", { order: 9, references: [{ type: HasComponent, target: parent.key, isForward: false }] }),
    ];
    const late = { ...child, order: 5 };
    const built = AddressSpace.of([smallStandard], buildLayer(makeSpace().own.header, [...nodes, late]));
    const edited = makeSpace(nodes).withNode(late);
    expect(edited.edgesFrom(parent.key)).toEqual(built.edgesFrom(parent.key));
    expect(edited.edgesFrom(parent.key).map((e) => e.target)).toEqual([late.key, keyOf(9)]);
  });
});

describe("renumber", () => {
  const [one, two, three] = [1, 2, 3].map((id) => makeNode(id, "Object"));
  if (!one || !two || !three) throw new Error("No nodes");
  const space = makeSpace([one, two, three]);
  const idOf = (number: number) => numericNodeId(TEST_NAMESPACE, number);

  it("lets nodes exchange their NodeIds and pass them on in a circle", () => {
    const swapped = expectOperation(space, {
      kind: "renumber",
      changes: [
        { key: one.key, nodeId: idOf(2) },
        { key: two.key, nodeId: idOf(1) },
      ],
    });
    expect([1, 2, 3].map((number) => swapped.findByNodeId(idOf(number))?.key)).toEqual([two.key, one.key, three.key]);
    const turned = expectOperation(swapped, {
      kind: "renumber",
      changes: [
        { key: one.key, nodeId: idOf(3) },
        { key: three.key, nodeId: idOf(1) },
        { key: two.key, nodeId: idOf(9) },
      ],
    });
    expect([1, 2, 3, 9].map((number) => turned.findByNodeId(idOf(number))?.key)).toEqual([
      three.key,
      undefined,
      one.key,
      two.key,
    ]);
  });

  it("refuses a NodeId that another node keeps, or that two would get", () => {
    const to = (key: NodeKey, number: number) => ({ key, nodeId: idOf(number) });
    expectRefused(space, { kind: "renumber", changes: [to(one.key, 2)] }, "operation.node-id-taken");
    expectRefused(space, { kind: "renumber", changes: [to(one.key, 9), to(two.key, 9)] }, "operation.node-id-taken");
    const foreign = { kind: "renumber" as const, changes: [to(standardKey(58), 9)] };
    expectRefused(space, foreign, "operation.node-foreign");
  });
});
