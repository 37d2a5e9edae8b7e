/** The index of edges answers the same whether it is asked key by key or made whole, and what a plain list answers. */
import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { buildLayer } from "~/domain/address-space/address-space";
import type { Edge } from "~/domain/address-space/edge-bundle";
import type { Node } from "~/domain/address-space/node";
import { standardKey, type NodeKey } from "~/domain/address-space/node-id";
import { nodes } from "../../../support/random-nodeset";

const header = { namespaceUris: ["urn:x"], models: [{ modelUri: "urn:x", requiredModels: [] }] };

/** References among the nodes themselves, back and forth, repeated, and to themselves. */
const linked = fc
  .tuple(nodes, fc.infiniteStream(fc.nat(1000)), fc.infiniteStream(fc.boolean()))
  .map(([list, numbers, flags]) => {
    const pick = (): number => numbers.next().value ?? 0;
    return list.map((node): Node => {
      const references = Array.from({ length: pick() % 5 }, () => ({
        type: standardKey(45 + (pick() % 3)),
        target: list[pick() % list.length]?.key ?? node.key,
        isForward: flags.next().value ?? true,
      }));
      return { ...node, references: [...node.references, ...references] };
    });
  });

function listPlainly(list: readonly Node[], end: "source" | "target", key: NodeKey): Edge[] {
  const edges = list.flatMap((node) =>
    node.references
      .filter(({ serverUri }) => serverUri === undefined)
      .map(({ type, target, isForward }) => ({
        source: isForward ? node.key : target,
        type,
        target: isForward ? target : node.key,
      })),
  );
  return edges.filter((edge) => edge[end] === key);
}

function distinct(edges: readonly Edge[]): Edge[] {
  const texts = new Map(edges.map((edge) => [JSON.stringify(edge), edge]));
  return [...texts.values()];
}

describe("edges of a layer", () => {
  it("are those that the nodes declare, in the order of the nodes, each once", () => {
    fc.assert(
      fc.property(linked, (list) => {
        const asked = buildLayer(header, list);
        const whole = buildLayer(header, list);
        const keys = new Set(list.flatMap((node) => [node.key, ...node.references.map(({ target }) => target)]));
        for (const [side, end] of [
          ["outgoing", "source"],
          ["incoming", "target"],
        ] as const) {
          const sizes = [
            whole[side].size,
            new Set([...keys].filter((key) => listPlainly(list, end, key).length > 0)).size,
          ];
          expect(sizes[0]).toBe(sizes[1]);
          for (const key of keys) {
            const plain = listPlainly(list, end, key);
            const lazy = asked[side].get(key);
            expect(lazy?.edges ?? []).toEqual(plain);
            expect(lazy?.distinct ?? []).toEqual(distinct(plain));
            expect(whole[side].get(key)?.edges ?? []).toEqual(plain);
            expect(whole[side].get(key)?.distinct ?? []).toEqual(distinct(plain));
            expect(whole[side].get(key)?.declarers).toEqual(lazy?.declarers);
            expect(asked[side].has(key)).toBe(plain.length > 0);
          }
        }
      }),
      { numRuns: 200 },
    );
  });

  it("stay the same objects when the rest is made", () => {
    fc.assert(
      fc.property(linked, (list) => {
        const layer = buildLayer(header, list);
        const before = list.map((node) => layer.outgoing.get(node.key)?.distinct);
        expect(layer.outgoing.size).toBeGreaterThanOrEqual(before.filter(Boolean).length);
        list.forEach((node, i) => expect(layer.outgoing.get(node.key)?.distinct).toBe(before[i]));
      }),
      { numRuns: 50 },
    );
  });
});
