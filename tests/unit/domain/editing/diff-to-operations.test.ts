import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import { numericNodeId, toNodeKey } from "~/domain/address-space/node-id";
import { applyOperation, applyOperations } from "~/domain/editing/apply-operation";
import { diffToOperations } from "~/domain/editing/diff-to-operations";
import type { NodeSetContent } from "~/domain/nodeset/nodeset-content";
import { listGivenNodeIds } from "~/domain/editing/given-node-ids";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { choice, makeOperation, type Choice } from "../../../support/random-operations";
import { makeNode, makeSpace, TEST_NAMESPACE } from "../../../support/small-standard";

const keyOf = (id: number) => toNodeKey(numericNodeId(TEST_NAMESPACE, id));
const start = makeSpace([1, 2, 3].map((id) => makeNode(id, "Object")));

function write(space: AddressSpace): string {
  return writeNodeSet({ header: space.own.header, nodes: space.listOwnNodes() }, { findNodeId: (key) => space.getNode(key)?.nodeId }).xml;
}

function read(xml: string): NodeSetContent {
  const content = readNodeSet(xml);
  if (!content.ok) throw new Error(JSON.stringify(content.problems));
  return content.value;
}

/** What a text says, with the orders taken out that mean nothing. */
function meaningOf(xml: string): unknown {
  const { header, nodes } = read(xml);
  const plain = nodes.map(({ order: _order, references, ...node }: Node) => ({
    ...node,
    references: references.map((reference) => JSON.stringify(reference)).sort(),
  }));
  return { header, nodes: new Map(plain.sort((a, b) => (a.key < b.key ? -1 : 1)).map((node) => [node.key, node])) };
}

function edit(space: AddressSpace, choices: readonly Choice[]): AddressSpace {
  return choices.reduce((current, made) => {
    const operation = makeOperation(current, made);
    // Another NodeId is another node in a text, which is told below.
    if (listGivenNodeIds(operation).some((given) => !given.node)) return current;
    const applied = applyOperation(current, operation);
    return applied.ok ? applied.value : current;
  }, space);
}

describe("diffToOperations", () => {
  it("makes the model say what the edited text says, by operations that apply one after the other", () => {
    fc.assert(
      fc.property(fc.array(choice, { maxLength: 25 }), fc.array(choice, { maxLength: 25 }), (made, edits) => {
        const before = edit(start, made);
        const xml = write(edit(before, edits));
        const difference = diffToOperations(before, read(xml));
        if (!difference.ok) throw new Error(JSON.stringify(difference.problems));
        const applied = applyOperations(before, difference.value.operations);
        if (!applied.ok) throw new Error(JSON.stringify(applied.problems));
        expect(meaningOf(write(applied.value))).toEqual(meaningOf(xml));
        for (const key of difference.value.added) expect(before.getNode(key)).toBeUndefined();
      }),
      { numRuns: 300 },
    );
  });

  it("finds nothing to do in a text that nobody edited, whatever the order of its nodes", () => {
    fc.assert(
      fc.property(fc.array(choice, { maxLength: 30 }), (made) => {
        const space = edit(start, made);
        const { header, nodes } = read(write(space));
        const difference = diffToOperations(space, { header, nodes: [...nodes].reverse() });
        expect(difference.ok && difference.value.operations).toEqual([]);
      }),
      { numRuns: 100 },
    );
  });

  it("keeps the key of a node that was renumbered, and follows references to it by its NodeId", () => {
    const renumbered = applyOperation(start, { kind: "setAttribute", key: keyOf(2), attribute: "nodeId", value: numericNodeId(TEST_NAMESPACE, 900) });
    if (!renumbered.ok) throw new Error("not renumbered");
    const xml = write(renumbered.value).replace("<DisplayName>Object2</DisplayName>", "<DisplayName>Second</DisplayName>");
    const difference = diffToOperations(renumbered.value, read(xml));
    expect(difference.ok && difference.value.added).toEqual([]);
    expect(difference.ok && difference.value.removed).toEqual([]);
    expect(difference.ok && difference.value.changed.every((key) => key === keyOf(2))).toBe(true);
  });

  it("takes a reference to nothing as a refusal, and leaves the model as it was", () => {
    const xml = write(start).replace(
      "</UANodeSet>",
      `<UAObject NodeId="ns=1;i=50" BrowseName="1:New"><DisplayName>New</DisplayName><References><Reference ReferenceType="i=47" IsForward="false">ns=1;i=777</Reference></References></UAObject></UANodeSet>`,
    );
    const difference = diffToOperations(start, read(xml));
    expect(!difference.ok && difference.problems.map((found) => [found.code, found.at?.node])).toEqual([["operation.node-missing", keyOf(50)]]);
  });

  it("keeps what the schema does not know of a reference, and takes its change over", () => {
    const reference = { type: toNodeKey(numericNodeId("http://opcfoundation.org/UA/", 47)), target: keyOf(2), isForward: true };
    const marked = (mark: string) => makeSpace([makeNode(1, "Object", { references: [{ ...reference, otherAttributes: { Mark: mark } }] }), makeNode(2, "Object")]);
    const difference = diffToOperations(marked("a"), read(write(marked("b"))));
    if (!difference.ok) throw new Error(JSON.stringify(difference.problems));
    expect(write(difference.value.space)).toBe(write(marked("b")));
  });

  it("refuses to remove a node that others name, to change a class, and to say a NodeId twice", () => {
    const owned = applyOperation(start, { kind: "addReference", source: keyOf(1), type: toNodeKey(numericNodeId("http://opcfoundation.org/UA/", 47)), target: keyOf(2), declaredAt: "source" });
    if (!owned.ok) throw new Error("not connected");
    const content = read(write(owned.value));
    const without = diffToOperations(owned.value, { ...content, nodes: content.nodes.filter((node) => node.key !== keyOf(2)) });
    expect(!without.ok && without.problems.map((found) => found.code)).toEqual(["operation.node-in-use"]);
    const other = diffToOperations(start, { ...content, nodes: read(write(makeSpace([1, 2, 3].map((id) => makeNode(id, "Variable"))))).nodes });
    expect(!other.ok && new Set(other.problems.map((found) => found.code))).toEqual(new Set(["source-text.class-changed"]));
    const twice = diffToOperations(start, { ...content, nodes: [...content.nodes, ...content.nodes.slice(0, 1)] });
    expect(!twice.ok && twice.problems.map((found) => found.code)).toEqual(["source-text.node-twice"]);
  });
});
