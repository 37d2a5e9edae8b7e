import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { AddressSpace, buildLayer } from "~/domain/address-space/address-space";
import { standardKey, type NodeKey } from "~/domain/address-space/node-id";
import {
  isSameJson,
  listAttributeNames,
  listPlacedEdges,
  readAttribute,
  toState,
  type ModelState,
} from "~/domain/compare/merge/model-state";
import { mergeModels } from "~/domain/compare/merge/merge-models";
import { listStateOperations } from "~/domain/compare/merge/state-operations";
import { getValue } from "~/domain/core/result";
import { applyOperation, applyOperations } from "~/domain/editing/apply-operation";
import { collectConflictUnits, findConflict } from "~/domain/editing/conflict-units";
import type { Operation } from "~/domain/editing/operation";
import { choice, makeOperation, type Choice } from "../../../support/random-operations";
import { makeNode, smallStandard, TEST_NAMESPACE } from "../../../support/small-standard";

const HasComponent = standardKey(47);
const HasSubtype = standardKey(45);

function makeBase(): AddressSpace {
  const header = {
    namespaceUris: [TEST_NAMESPACE],
    models: [{ modelUri: TEST_NAMESPACE, version: "1.0.0", requiredModels: [] }],
  };
  const nodes = [1, 2, 3, 4, 5, 6].map((id) =>
    makeNode(id, id === 1 ? "ObjectType" : "Object", {
      references:
        id === 1
          ? [{ type: HasSubtype, target: standardKey(58), isForward: false }]
          : [{ type: HasComponent, target: keyOf(id === 4 ? 3 : 1), isForward: false }],
    }),
  );
  return AddressSpace.of([smallStandard], buildLayer(header, nodes));
}

function keyOf(id: number): NodeKey {
  return makeNode(id, "Object").key;
}

/** Those of the random edits that apply, one after the other. */
function edit(
  start: AddressSpace,
  choices: readonly Choice[],
  idBase: number,
): { space: AddressSpace; operations: Operation[] } {
  let space = start;
  const operations: Operation[] = [];
  for (const one of choices) {
    const operation = makeOperation(space, one, idBase);
    const applied = applyOperation(space, operation);
    if (!applied.ok) continue;
    space = applied.value;
    operations.push(operation);
  }
  return { space, operations };
}

/** Contents without the order of references and of nodes, which is layout, and without repeated declarations. */
function toMeaning(state: ModelState): unknown {
  const nodes = [...state.nodes.values()].map((node) => [
    node.key,
    {
      ...node,
      order: 0,
      references: [...new Set(node.references.map((r) => JSON.stringify([r.type, r.target, r.isForward])))].sort(),
    },
  ]);
  const sorted = nodes.sort(([a], [b]) => (String(a) < String(b) ? -1 : 1));
  return { header: state.header, nodes: sorted, mapping: [...state.mapping].sort() };
}

const edits = fc.array(choice, { minLength: 1, maxLength: 14 });
const RUNS = { numRuns: 300 };

describe("mergeModels", () => {
  test("disjoint edits give what both in either order give, without a conflict", () => {
    let compared = 0;
    fc.assert(
      fc.property(edits, edits, (left, right) => {
        const base = makeBase();
        const [ours, theirs] = [edit(base, left, 1000), edit(base, right, 5000)];
        if (findConflict(collectConflictUnits(ours.operations), collectConflictUnits(theirs.operations)) !== undefined)
          return;
        const [inOrder, reversed] = [
          applyOperations(ours.space, theirs.operations),
          applyOperations(theirs.space, ours.operations),
        ];
        if (!inOrder.ok || !reversed.ok) return;
        compared++;
        const merged = mergeModels(base, ours.space, theirs.space);
        const mirrored = mergeModels(base, theirs.space, ours.space);
        expect(merged.conflicts).toEqual([]);
        expect(toMeaning(merged.state)).toEqual(toMeaning(toState(inOrder.value)));
        expect(toMeaning(mirrored.state)).toEqual(toMeaning(toState(reversed.value)));
      }),
      RUNS,
    );
    expect(compared).toBeGreaterThan(50);
  });

  test("every change of either side is in the result or in the list of conflicts", () => {
    fc.assert(
      fc.property(edits, edits, (left, right) => {
        const base = makeBase();
        const [ours, theirs] = [edit(base, left, 1000).space, edit(base, right, 5000).space];
        const merged = mergeModels(base, ours, theirs);
        const told = new Set(merged.conflicts.map((c) => c.key));
        for (const side of [ours, theirs]) {
          for (const lost of listLost(toState(base), toState(side), merged.state)) {
            expect(
              lost.keys.some((key) => told.has(key) || isBelowTold(base, key, told)),
              lost.text,
            ).toBe(true);
          }
        }
      }),
      RUNS,
    );
  });

  test("the chosen side holds at a conflict", () => {
    const base = makeBase();
    const ours = getValue(
      applyOperation(base, { kind: "setAttribute", key: keyOf(2), attribute: "documentation", value: "ours" }),
    );
    const theirs = getValue(
      applyOperation(base, { kind: "setAttribute", key: keyOf(2), attribute: "documentation", value: "theirs" }),
    );
    const open = mergeModels(base, ours, theirs);
    expect(open.conflicts).toMatchObject([
      { key: keyOf(2), what: "documentation", base: null, ours: "ours", theirs: "theirs" },
    ]);
    expect(open.state.nodes.get(keyOf(2))?.documentation).toBe("ours");
    const id = open.conflicts[0]?.id ?? "";
    expect(mergeModels(base, ours, theirs, new Map([[id, "theirs"]])).state.nodes.get(keyOf(2))?.documentation).toBe(
      "theirs",
    );
  });

  test("a node that one side removed and the other hung something below is one conflict at the node", () => {
    const base = makeBase();
    const ours = getValue(
      applyOperations(base, [
        { kind: "removeNode", key: keyOf(4) },
        { kind: "removeNode", key: keyOf(3) },
      ]),
    );
    const child = makeNode(9, "Object", { references: [{ type: HasComponent, target: keyOf(4), isForward: false }] });
    const theirs = getValue(applyOperation(base, { kind: "addNode", node: child }));
    const { conflicts, state } = mergeModels(base, ours, theirs);
    expect(conflicts.map((c) => [c.key, c.what, c.ours])).toEqual([[keyOf(3), "node", null]]);
    expect(state.nodes.has(keyOf(4))).toBe(false);
    const kept = mergeModels(base, ours, theirs, new Map([[conflicts[0]?.id ?? "", "theirs"]])).state;
    expect([3, 4, 9].map((id) => kept.nodes.has(keyOf(id)))).toEqual([true, true, true]);
    expect(kept.nodes.get(keyOf(4))?.references).toEqual(base.getNode(keyOf(4))?.references);
  });

  test("two owners for one node are a conflict, not two owners", () => {
    const base = makeBase();
    const move = (target: number): AddressSpace =>
      getValue(
        applyOperations(base, [
          { kind: "removeReference", source: keyOf(1), type: HasComponent, target: keyOf(2) },
          { kind: "addReference", source: keyOf(target), type: HasComponent, target: keyOf(2), declaredAt: "target" },
        ]),
      );
    const { conflicts, state } = mergeModels(base, move(5), move(6));
    expect(conflicts).toMatchObject([{ key: keyOf(2), what: "owner", ours: "Node5", theirs: "Node6" }]);
    expect(state.nodes.get(keyOf(2))?.references.map((r) => r.target)).toEqual([keyOf(5)]);
  });

  test("two versions of the model are a conflict of the model", () => {
    const base = makeBase();
    const name = (version: string): AddressSpace =>
      base.withHeader({ ...base.own.header, models: [{ modelUri: TEST_NAMESPACE, version, requiredModels: [] }] });
    expect(mergeModels(base, name("1.1.0"), name("2.0.0")).conflicts).toMatchObject([
      { what: "version", ours: "1.1.0", theirs: "2.0.0" },
    ]);
  });
});

function isBelowTold(space: AddressSpace, key: NodeKey, told: ReadonlySet<NodeKey | undefined>): boolean {
  for (let at = space.getNode(key), steps = 0; at && steps < 20; steps++) {
    if (told.has(at.key)) return true;
    at = space.getNode(at.references.find((r) => !r.isForward)?.target ?? ("" as NodeKey));
  }
  return false;
}

type Lost = { readonly keys: readonly NodeKey[]; readonly text: string };

/** What the side changed against the base and the result does not have. Written apart from the merge, unit by unit. */
function listLost(base: ModelState, side: ModelState, result: ModelState): Lost[] {
  const lost: Lost[] = [];
  for (const key of new Set([...base.nodes.keys(), ...side.nodes.keys()])) {
    const [old, now, made] = [base.nodes.get(key), side.nodes.get(key), result.nodes.get(key)];
    if ((old === undefined) !== (now === undefined) && (now === undefined) !== (made === undefined))
      lost.push({ keys: [key], text: `presence of ${key}` });
    if (!old || !now) continue;
    for (const name of listAttributeNames(old, now)) {
      if (name === "order" || isSameJson(readAttribute(old, name), readAttribute(now, name))) continue;
      if (!isSameJson(readAttribute(now, name), readAttribute(made, name)))
        lost.push({ keys: [key], text: `${name} of ${key}` });
    }
  }
  const [b, s, r] = [base, side, result].map((state) => listPlacedEdges(state.nodes.values())) as [Edges, Edges, Edges];
  for (const [id, { edge }] of new Map([...b, ...s])) {
    if (b.has(id) !== s.has(id) && s.has(id) !== r.has(id))
      lost.push({ keys: [edge.source, edge.target], text: `edge ${id}` });
  }
  return lost;
}
type Edges = ReturnType<typeof listPlacedEdges>;

describe("listStateOperations", () => {
  test("lead from any state to any other of the same model", () => {
    fc.assert(
      fc.property(edits, edits, (left, right) => {
        const base = makeBase();
        const from = edit(base, left, 1000).space;
        const to = toState(edit(base, right, 5000).space);
        const applied = applyOperations(from, listStateOperations(from, to));
        // A number by which a renumbered node is known stays its own (operation.node-id-taken); that is refused, not done by halves.
        if (!applied.ok) {
          expect(applied.problems.map((p) => p.code)).toEqual(["operation.node-id-taken"]);
          return;
        }
        expect(toMeaning(toState(applied.value))).toEqual(toMeaning(to));
      }),
      RUNS,
    );
  });

  test("are none where nothing differs", () => {
    const base = makeBase();
    expect(listStateOperations(base, toState(base))).toEqual([]);
  });
});
