import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { applyOperation } from "~/domain/editing/apply-operation";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import type { Operation } from "~/domain/editing/operation";
import { expectFreshIndexes, expectJsonForm, expectOperation, snapshotOwn } from "../../../support/expect-operation";
import { choice, makeOperation } from "../../../support/random-operations";
import { makeNode, makeSpace } from "../../../support/small-standard";

const start = makeSpace([1, 2, 3].map((id) => makeNode(id, "Object")));

describe("laws of operations", () => {
  it("invert ∘ apply is exact, indexes are those of a fresh build, JSON and schema keep each operation", () => {
    fc.assert(
      fc.property(fc.array(choice, { minLength: 1, maxLength: 30 }), (choices) => {
        let space = start;
        for (const made of choices) {
          const operation = makeOperation(space, made);
          expectJsonForm(operation);
          if (applyOperation(space, operation).ok) space = expectOperation(space, operation);
        }
      }),
      { numRuns: 120 },
    );
  });

  it("a list of operations and its inverse restore the model, also through another order of references", () => {
    fc.assert(
      fc.property(fc.array(choice, { minLength: 5, maxLength: 40 }), (choices) => {
        let space = start;
        const done: Operation[] = [];
        for (const made of choices) {
          const operation = makeOperation(space, made);
          const result = applyOperation(space, operation);
          if (!result.ok) continue;
          done.push(operation);
          space = result.value;
        }
        const applied = applyWithInverse(start, done);
        if (!applied.ok) throw new Error("what applied one by one did not apply as a list");
        expect(snapshotOwn(applied.value.space.own)).toEqual(snapshotOwn(space.own));
        const undone = applyWithInverse(applied.value.space, applied.value.inverse);
        if (!undone.ok) throw new Error(JSON.stringify(undone.problems));
        expect(snapshotOwn(undone.value.space.own)).toEqual(snapshotOwn(start.own));
        expectFreshIndexes(undone.value.space);
      }),
      { numRuns: 150 },
    );
  });
});
