import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { numericNodeId, standardKey, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { applyOperation, applyOperations } from "~/domain/editing/apply-operation";
import { collectConflictUnits, findConflict } from "~/domain/editing/conflict-units";
import type { Operation } from "~/domain/editing/operation";
import { rebase } from "~/domain/editing/rebase";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { snapshotOwn } from "../../../support/expect-operation";
import { choice, makeOperation } from "../../../support/random-operations";
import { makeNode, makeSpace, TEST_NAMESPACE } from "../../../support/small-standard";

const keyOf = (id: number): NodeKey => toNodeKey(numericNodeId(TEST_NAMESPACE, id));
const start = makeSpace([1, 2, 3].map((id) => makeNode(id, "Object")));
const rename = (id: number, text: string): Operation => ({
  kind: "setAttribute",
  key: keyOf(id),
  attribute: "displayName",
  value: [{ text }],
});
const addChild = (id: number, parent: number): Operation => ({
  kind: "addNode",
  node: makeNode(id, "Variable", { references: [{ type: standardKey(47), target: keyOf(parent), isForward: false }] }),
});

function after(operations: readonly Operation[]): AddressSpace {
  const result = applyOperations(start, operations);
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return result.value;
}

describe("rebase", () => {
  it("keeps edits of other attributes and other nodes", () => {
    const foreign = { operations: [rename(1, "theirs"), addChild(10, 2)], author: "Priya" };
    const mine = { operations: [rename(2, "mine"), addChild(11, 2)] };
    const result = rebase(after(foreign.operations), [foreign], [mine]);
    expect(result.refused).toEqual([]);
    expect(result.space.getNode(keyOf(2))?.displayName).toEqual([{ text: "mine" }]);
    expect(result.space.edgesFrom(keyOf(2)).map((e) => e.target)).toEqual([keyOf(10), keyOf(11)]);
  });

  it("refuses an edit of the same attribute and says whose edit it met", () => {
    const foreign = { operations: [rename(1, "theirs")], author: "Priya", seq: 7 };
    const result = rebase(after(foreign.operations), [foreign], [{ operations: [rename(1, "mine")] }]);
    expect(result.kept).toEqual([]);
    expect(result.refused[0]).toMatchObject({
      problems: [
        { code: "operation.stale", at: { node: keyOf(1), attribute: "displayName" }, data: { author: "Priya" } },
      ],
      conflictsWith: { seq: 7 },
    });
    expect(result.space.getNode(keyOf(1))?.displayName).toEqual([{ text: "theirs" }]);
  });

  it("refuses to edit below a node that somebody removed, and to remove one that somebody edited", () => {
    const removal = { operations: [{ kind: "removeNode", key: keyOf(3) } as const] };
    expect(rebase(after(removal.operations), [removal], [{ operations: [addChild(12, 3)] }]).refused).toHaveLength(1);
    const edit = { operations: [rename(3, "theirs")] };
    expect(rebase(after(edit.operations), [edit], [removal]).refused[0]?.problems[0]?.code).toBe("operation.stale");
    const use = { operations: [addChild(13, 3)] };
    expect(rebase(after(use.operations), [use], [removal]).refused).toHaveLength(1);
  });

  it("refuses what builds on a refused edit and keeps the rest", () => {
    const foreign = { operations: [{ kind: "removeNode", key: keyOf(3) } as const] };
    const pending = [
      { operations: [addChild(12, 3)] },
      { operations: [rename(12, "deep")] },
      { operations: [rename(1, "mine")] },
    ];
    const result = rebase(after(foreign.operations), [foreign], pending);
    expect(result.refused.map((r) => r.problems[0]?.code)).toEqual(["operation.stale", "rebase.builds-on-refused"]);
    expect(result.kept.map((k) => k.pending)).toEqual([pending[2]]);
  });

  it("keeps intent: edits that do not conflict mean the same in either order", () => {
    fc.assert(
      fc.property(fc.array(choice, { maxLength: 8 }), fc.array(choice, { maxLength: 8 }), (theirChoices, myChoices) => {
        const theirs = collectApplying(theirChoices, 0);
        const mine = collectApplying(myChoices, 1000);
        const isFree = findConflict(collectConflictUnits(theirs), collectConflictUnits(mine)) === undefined;
        const result = rebase(after(theirs), [{ operations: theirs }], [{ operations: mine }]);
        if (!isFree) {
          expect(result.refused).toHaveLength(1);
          return;
        }
        expect(result.refused).toEqual([]);
        const otherWay = rebase(after(mine), [{ operations: mine }], [{ operations: theirs }]);
        expect(otherWay.refused).toEqual([]);
        expect(sortedReferences(result.space)).toEqual(sortedReferences(otherWay.space));
      }),
      { numRuns: 300 },
    );
  });
});

function collectApplying(choices: Parameters<typeof makeOperation>[1][], idBase: number): Operation[] {
  let space = start;
  const operations: Operation[] = [];
  for (const made of choices) {
    const operation = makeOperation(space, made, idBase);
    const result = applyOperation(space, operation);
    if (!result.ok) continue;
    operations.push(operation);
    space = result.value;
  }
  return operations;
}

/** Two windows that add references to one node at one time may list them in either order; all else must be equal. */
function sortedReferences(space: AddressSpace): unknown {
  const plain = space
    .listOwnNodes()
    .map((n) => ({ ...n, references: n.references.map((r) => JSON.stringify(r)).sort() }));
  return { header: (snapshotOwn(space.own) as { header: unknown }).header, plain };
}
