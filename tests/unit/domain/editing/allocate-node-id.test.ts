import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { numericNodeId } from "~/domain/address-space/node-id";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { makeNode, makeSpace, TEST_NAMESPACE } from "../../../support/small-standard";

describe("BlockAllocator", () => {
  it("never gives an id twice and never one outside its blocks, whatever is taken and leased between", () => {
    fc.assert(
      fc.property(
        fc.uniqueArray(fc.nat(20), { minLength: 1, maxLength: 8 }),
        fc.array(fc.nat(220), { maxLength: 60 }),
        fc.nat(120),
        (starts, taken, wanted) => {
          const blocks = starts.map((s) => ({ from: s * 10, to: s * 10 + 9 }));
          const allocator = new BlockAllocator(TEST_NAMESPACE, blocks.slice(0, 1), (id) =>
            taken.includes(id.identifier as number),
          );
          const given: number[] = [];
          for (let i = 0; i < wanted; i++) {
            const block = blocks[i + 1];
            if (block) allocator.addBlock(block);
            const result = allocator.allocate("Object");
            if (result.ok) given.push(result.value.identifier as number);
          }
          expect(new Set(given).size).toBe(given.length);
          for (const id of given) {
            expect(taken).not.toContain(id);
            expect(blocks.some((b) => b.from <= id && id <= b.to)).toBe(true);
          }
        },
      ),
    );
  });

  it("skips what the model has and says when the block is empty", () => {
    const space = makeSpace([
      makeNode(5, "Object"),
      makeNode(6, "Object", { nodeId: numericNodeId(TEST_NAMESPACE, 7) }),
    ]);
    const allocator = BlockAllocator.forModel(() => space, [{ from: 5, to: 8 }]);
    expect(allocator.remaining).toBe(4);
    const first = allocator.allocate("Variable");
    expect(first.ok && first.value.identifier).toBe(8);
    expect(allocator.allocate("Variable").problems[0]?.code).toBe("node-id.block-empty");
    expect(allocator.remaining).toBe(0);
  });
});
