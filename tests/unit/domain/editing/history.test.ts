import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { applyOperation, applyOperations } from "~/domain/editing/apply-operation";
import { EMPTY_HISTORY, recordForeign, recordOwn, redo, undo, type History } from "~/domain/editing/history";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import type { Operation } from "~/domain/editing/operation";
import { snapshotOwn } from "../../../support/expect-operation";
import { choice, makeOperation } from "../../../support/random-operations";
import { makeNode, makeSpace, TEST_NAMESPACE } from "../../../support/small-standard";

const keyOf = (id: number): NodeKey => toNodeKey(numericNodeId(TEST_NAMESPACE, id));
const start = makeSpace([1, 2].map((id) => makeNode(id, "Object")));
const rename = (id: number, text: string): Operation => ({
  kind: "setAttribute",
  key: keyOf(id),
  attribute: "displayName",
  value: [{ text }],
});
const nameOf = (space: AddressSpace, id: number): unknown => space.getNode(keyOf(id))?.displayName;

function edit(history: History, space: AddressSpace, operations: Operation[], id: number): [History, AddressSpace] {
  const applied = applyWithInverse(space, operations);
  if (!applied.ok) throw new Error("did not apply");
  return [recordOwn(history, { id, label: "edit", operations, inverse: applied.value.inverse }), applied.value.space];
}

describe("undo and redo", () => {
  it("takes edits back one by one and does them again", () => {
    const [history1, space1] = edit(EMPTY_HISTORY, start, [rename(1, "A")], 1);
    const [history2, space2] = edit(history1, space1, [rename(1, "B")], 2);
    const back = undo(history2, space2, 3);
    if (!back.outcome.ok) throw new Error("refused");
    expect(nameOf(back.outcome.value.space, 1)).toEqual([{ text: "A" }]);
    const again = redo(back.history, back.outcome.value.space, 4);
    if (!again.outcome.ok) throw new Error("refused");
    expect(nameOf(again.outcome.value.space, 1)).toEqual([{ text: "B" }]);
    expect(again.history.undoable).toHaveLength(2);
  });

  it("refuses where somebody else touched the same since, then offers the edit before it", () => {
    const [history1, space1] = edit(EMPTY_HISTORY, start, [rename(2, "mine")], 1);
    const [history2, space2] = edit(history1, space1, [rename(1, "mine")], 2);
    const foreign = { operations: [rename(1, "theirs")], author: "Priya" };
    const result = applyOperations(space2, foreign.operations);
    if (!result.ok) throw new Error("did not apply");
    const refused = undo(recordForeign(history2, foreign), result.value, 3);
    expect(refused.outcome.ok).toBe(false);
    expect(refused.outcome.problems[0]).toMatchObject({ code: "operation.stale", data: { author: "Priya" } });
    const next = undo(refused.history, result.value, 4);
    if (!next.outcome.ok) throw new Error("refused");
    expect(nameOf(next.outcome.value.space, 2)).toEqual([{ text: "Node2" }]);
    expect(nameOf(next.outcome.value.space, 1)).toEqual([{ text: "theirs" }]);
  });

  it("says when there is nothing to take back or to do again; a new edit forgets what was undone", () => {
    expect(undo(EMPTY_HISTORY, start, 1).outcome.problems[0]?.code).toBe("history.nothing-to-undo");
    const [history, space] = edit(EMPTY_HISTORY, start, [rename(1, "A")], 1);
    const back = undo(history, space, 2);
    if (!back.outcome.ok) throw new Error("refused");
    const [fresh, next] = edit(back.history, back.outcome.value.space, [rename(2, "C")], 3);
    expect(redo(fresh, next, 4).outcome.problems[0]?.code).toBe("history.nothing-to-redo");
  });

  it("any run of edits, all undone, is the start again; all redone, the end", () => {
    fc.assert(
      fc.property(fc.array(choice, { minLength: 1, maxLength: 20 }), (choices) => {
        let history = EMPTY_HISTORY;
        let space = start;
        for (const made of choices) {
          const operation = makeOperation(space, made);
          if (applyOperation(space, operation).ok) [history, space] = edit(history, space, [operation], 0);
        }
        const end = snapshotOwn(space.own);
        const count = history.undoable.length;
        [history, space] = repeat(undo, history, space, count);
        expect(snapshotOwn(space.own)).toEqual(snapshotOwn(start.own));
        [history, space] = repeat(redo, history, space, count);
        expect(snapshotOwn(space.own)).toEqual(end);
      }),
      { numRuns: 100 },
    );
  });
});

function repeat(move: typeof undo, history: History, space: AddressSpace, count: number): [History, AddressSpace] {
  for (let i = 0; i < count; i++) {
    const result = move(history, space, i);
    if (!result.outcome.ok) throw new Error(JSON.stringify(result.outcome.problems));
    history = result.history;
    space = result.outcome.value.space;
  }
  return [history, space];
}
