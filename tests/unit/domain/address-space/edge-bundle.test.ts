import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { listUses } from "~/domain/address-space/address-space";
import type { Node } from "~/domain/address-space/node";
import { standardKey } from "~/domain/address-space/node-id";
import { expectFreshIndexes } from "../../../support/expect-operation";
import { makeNode, makeSpace } from "../../../support/small-standard";

const hub = makeNode(0, "ObjectType");

function makeMember(id: number, order: number): Node {
  return makeNode(id, "Variable", { order, references: [{ type: standardKey(47), target: hub.key, isForward: false }] });
}

describe("edges of a hub", () => {
  it("stay in the order of a fresh build through additions, removals and changes of order in many chunks", () => {
    let space = makeSpace([hub, ...Array.from({ length: 2000 }, (_, i) => makeMember(i + 1, (i * 7) % 3000))]);
    fc.assert(
      fc.property(fc.array(fc.tuple(fc.nat(2600), fc.nat(3000)), { minLength: 20, maxLength: 60 }), (edits) => {
        for (const [id, order] of edits) {
          const member = makeMember(id + 1, order);
          space = order % 3 === 0 ? space.withoutNode(member.key) : space.withNode(member);
        }
        expectFreshIndexes(space);
      }),
      { numRuns: 15 },
    );
  });

  it("are uses of the hub where others declare them, and none of a member", () => {
    const space = makeSpace([hub, makeMember(1, 1), makeMember(2, 2)]);
    expect(listUses(space.own, hub)).toHaveLength(2);
    expect(listUses(space.own, makeMember(1, 1))).toEqual([]);
  });
});
