/**
 * The operations that lead from one state of a model to another: restoring a revision and taking a merge over are edits
 * like any other, so that they can be undone and are seen by every open window.
 */
import type { AddressSpace } from "../../address-space/address-space";
import type { DeclaredReference, Node } from "../../address-space/node";
import { isSameNodeId, type NodeId, type NodeKey } from "../../address-space/node-id";
import type { AttributeName, DeclaredAt, Operation } from "../../editing/operation";
import {
  isSameJson,
  listAttributeNames,
  listOddReferences,
  listPlacedEdges,
  readAttribute,
  toEdge,
  toEdgeId,
  toState,
  type ModelState,
  type PlacedEdge,
} from "./model-state";

type Plan = {
  readonly space: AddressSpace;
  readonly wanted: ModelState;
  /** Nodes that go, among them those that come back in another form. */
  readonly gone: ReadonlySet<NodeKey>;
  readonly added: readonly Node[];
  readonly kept: readonly { readonly old: Node; readonly now: Node }[];
};

/** Empty when the model is in the wanted state already. */
export function listStateOperations(space: AddressSpace, wanted: ModelState): Operation[] {
  const plan = makePlan(space, wanted);
  const present = listPlacedEdges(toState(space).nodes.values());
  const wantedEdges = listPlacedEdges(wanted.nodes.values());
  const additions = listAdditions(plan);
  return [
    ...listReferenceRemovals(plan, present, wantedEdges),
    ...[...plan.gone].map((key): Operation => ({ kind: "removeNode", key })),
    ...listAttributeChanges(plan),
    ...additions.operations,
    ...listReferenceAdditions(plan, present, wantedEdges, additions.covered),
    ...listHeaderChanges(space, wanted),
    ...listMappingChanges(space, wanted),
  ];
}

function makePlan(space: AddressSpace, wanted: ModelState): Plan {
  const gone = new Set<NodeKey>();
  const added: Node[] = [];
  const kept: { old: Node; now: Node }[] = [];
  for (const old of space.listOwnNodes()) {
    const now = wanted.nodes.get(old.key);
    if (now && isSameForm(old, now)) kept.push({ old, now });
    else gone.add(old.key);
  }
  for (const now of wanted.nodes.values()) if (gone.has(now.key) || !space.isOwn(now.key)) added.push(now);
  return { space, wanted, gone, added, kept };
}

/** Whether operations on the node can lead from one to the other; else it is taken away and added anew. */
function isSameForm(old: Node, now: Node): boolean {
  return old.nodeClass === now.nodeClass && isSameJson(listOddReferences(old), listOddReferences(now));
}

function isSamePlace(a: PlacedEdge, b: PlacedEdge | undefined): boolean {
  return b !== undefined && a.atSource === b.atSource && a.atTarget === b.atTarget;
}

type Edges = ReadonlyMap<string, PlacedEdge>;

/** A node may go when nobody else declares a reference to it any more; its own declarations go with it. */
function listReferenceRemovals({ gone }: Plan, present: Edges, wanted: Edges): Operation[] {
  const operations: Operation[] = [];
  for (const [id, placed] of present) {
    const { edge, atSource, atTarget } = placed;
    const touchesGone = gone.has(edge.source) || gone.has(edge.target);
    const mustGo = touchesGone
      ? edge.source !== edge.target && ((atSource && gone.has(edge.target)) || (atTarget && gone.has(edge.source)))
      : !isSamePlace(placed, wanted.get(id));
    if (mustGo) operations.push({ kind: "removeReference", ...pickEnds(placed) });
  }
  return operations;
}

function pickEnds({ edge: { source, type, target } }: PlacedEdge) {
  return { source, type, target };
}

function listAttributeChanges({ kept }: Plan): Operation[] {
  const operations: Operation[] = [];
  const changes: { key: NodeKey; nodeId: NodeId }[] = [];
  for (const { old, now } of kept) {
    if (!isSameNodeId(old.nodeId, now.nodeId)) changes.push({ key: old.key, nodeId: now.nodeId });
    for (const name of listAttributeNames(old, now)) {
      const value = readAttribute(now, name);
      if (name === "nodeId" || isSameJson(readAttribute(old, name), value)) continue;
      operations.push({
        kind: "setAttribute",
        key: old.key,
        attribute: name as AttributeName,
        ...(value === undefined ? {} : { value }),
      });
    }
  }
  // All numbers at once: two nodes may have exchanged theirs.
  return changes.length > 0 ? [{ kind: "renumber", changes }, ...operations] : operations;
}

/** Nodes with those of their references that can stand at once; the others are added when all nodes are there. */
function listAdditions({ space, wanted, gone, added }: Plan): { operations: Operation[]; covered: Set<string> } {
  const operations: Operation[] = [];
  const covered = new Set<string>();
  const there = new Set<NodeKey>([...wanted.nodes.keys()].filter((key) => space.isOwn(key) && !gone.has(key)));
  for (const node of added) {
    const standsAtOnce = (reference: DeclaredReference): boolean => {
      const other = wanted.nodes.get(reference.target);
      if (reference.serverUri !== undefined || !other || other === node) return true;
      if (!there.has(other.key)) return false;
      return !other.references.some(
        (r) => r.type === reference.type && r.target === node.key && r.isForward !== reference.isForward,
      );
    };
    const references = node.references.filter(standsAtOnce);
    for (const reference of references) {
      const edge = toEdge(node.key, reference);
      if (edge) covered.add(toEdgeId(edge));
    }
    there.add(node.key);
    const isDangling = references.some((r) => !isKnown(space, wanted, r.type) || !isKnown(space, wanted, r.target));
    operations.push({ kind: "addNode", node: { ...node, references }, ...(isDangling ? { isDangling: true } : {}) });
  }
  return { operations, covered };
}

function isKnown(space: AddressSpace, wanted: ModelState, key: NodeKey): boolean {
  return wanted.nodes.has(key) || (!space.isOwn(key) && space.getNode(key) !== undefined);
}

function listReferenceAdditions(plan: Plan, present: Edges, wanted: Edges, covered: ReadonlySet<string>): Operation[] {
  const { space, gone } = plan;
  const missing: { operation: Operation; rank: number }[] = [];
  for (const [id, placed] of wanted) {
    const { edge, atSource, atTarget } = placed;
    const wasTaken = gone.has(edge.source) || gone.has(edge.target);
    if (covered.has(id)) continue;
    if (!wasTaken && present.has(id) && isSamePlace(placed, present.get(id))) continue;
    const sourceIndex = atSource ? placeOf(plan.wanted, edge.source, id) : undefined;
    const targetIndex = atTarget ? placeOf(plan.wanted, edge.target, id) : undefined;
    const declaredAt: DeclaredAt = atSource && atTarget ? "both" : atSource ? "source" : "target";
    const isDangling = [edge.source, edge.type, edge.target].some((key) => !isKnown(space, plan.wanted, key));
    missing.push({
      rank: Math.max(sourceIndex ?? 0, targetIndex ?? 0),
      operation: {
        kind: "addReference",
        ...pickEnds(placed),
        declaredAt,
        ...(sourceIndex === undefined ? {} : { sourceIndex }),
        ...(targetIndex === undefined ? {} : { targetIndex }),
        ...(isDangling ? { isDangling: true } : {}),
      },
    });
  }
  return missing.sort((a, b) => a.rank - b.rank).map(({ operation }) => operation);
}

function placeOf(wanted: ModelState, key: NodeKey, id: string): number | undefined {
  const references = wanted.nodes.get(key)?.references ?? [];
  const at = references.findIndex((reference) => {
    const edge = toEdge(key, reference);
    return edge !== undefined && toEdgeId(edge) === id;
  });
  return at < 0 ? undefined : at;
}

function listHeaderChanges(space: AddressSpace, wanted: ModelState): Operation[] {
  const [old, now] = [space.own.header, wanted.header];
  const fields = new Set([...Object.keys(old), ...Object.keys(now)]) as Set<keyof typeof old>;
  return [...fields].flatMap((field): Operation[] => {
    if (isSameJson(old[field], now[field])) return [];
    return [{ kind: "setHeader", field, ...(now[field] === undefined ? {} : { value: now[field] }) }];
  });
}

function listMappingChanges(space: AddressSpace, wanted: ModelState): Operation[] {
  const present = toState(space).mapping;
  const operations: Operation[] = [];
  for (const [id, { part, owner, id: name }] of present) {
    if (!wanted.mapping.has(id)) operations.push({ kind: "setMapping", part, owner, id: name });
  }
  for (const [id, { part, owner, id: name, value }] of wanted.mapping) {
    const old = present.get(id);
    if (old && isSameJson(old.value, value)) continue;
    const isDangling = !wanted.nodes.has(owner);
    operations.push({ kind: "setMapping", part, owner, id: name, value, ...(isDangling ? { isDangling: true } : {}) });
  }
  return operations;
}
