/**
 * The edges of a layer as its nodes declare them, findable from both ends before any list of edges is made.
 *
 * All that is indexed at once is which nodes declare a reference that touches a key. The list of a key is made when it is
 * asked for, from the declarations of these few nodes: most nodes of a published NodeSet are never asked for.
 */
import type { ShardedMap } from "../core/sharded-map";
import { compareRank, EdgeBundle, type Edge } from "./edge-bundle";
import type { DeclaredReference, Node } from "./node";
import type { NodeKey } from "./node-id";

/** The nodes, beside the key's own node, that declare a reference to or from the key, in rank order. */
export type Declarers = ReadonlyMap<NodeKey, Node | readonly Node[]>;

/** `ranked` stands in rank order. */
export function indexDeclarers(ranked: readonly Node[]): Declarers {
  const declarers = new Map<NodeKey, Node | Node[]>();
  for (const node of ranked) {
    for (const { target, serverUri } of node.references) {
      if (target === node.key || serverUri !== undefined) continue;
      const known = declarers.get(target);
      if (known === undefined) declarers.set(target, node);
      else if (!Array.isArray(known)) {
        if (known !== node) declarers.set(target, [known, node]);
      } else if (known[known.length - 1] !== node) known.push(node);
    }
  }
  return declarers;
}

export function toEdge(node: Node, { type, target, isForward }: DeclaredReference): Edge {
  return isForward ? { source: node.key, type, target } : { source: target, type, target: node.key };
}

/** One side of the index: bundles by the key of the edges' source, or of their target. Each is made once. */
export class DeclaredEdges implements ReadonlyMap<NodeKey, EdgeBundle> {
  readonly #end: "source" | "target";
  readonly #nodes: ShardedMap<Node>;
  readonly #ranked: readonly Node[];
  readonly #declarers: Declarers;
  #made = new Map<NodeKey, EdgeBundle | undefined>();
  #isComplete = false;

  constructor(end: "source" | "target", nodes: ShardedMap<Node>, ranked: readonly Node[], declarers: Declarers) {
    this.#end = end;
    this.#nodes = nodes;
    this.#ranked = ranked;
    this.#declarers = declarers;
  }

  get(key: NodeKey): EdgeBundle | undefined {
    const known = this.#made.get(key);
    if (known !== undefined || this.#isComplete || this.#made.has(key)) return known;
    const made = this.#make(key);
    this.#made.set(key, made);
    return made;
  }

  has(key: NodeKey): boolean {
    return this.get(key) !== undefined;
  }

  get size(): number {
    return this.#complete().size;
  }

  keys(): MapIterator<NodeKey> {
    return this.#complete().keys();
  }

  values(): MapIterator<EdgeBundle> {
    return this.#complete().values();
  }

  entries(): MapIterator<[NodeKey, EdgeBundle]> {
    return this.#complete().entries();
  }

  [Symbol.iterator](): MapIterator<[NodeKey, EdgeBundle]> {
    return this.entries();
  }

  forEach(callback: (value: EdgeBundle, key: NodeKey, map: ReadonlyMap<NodeKey, EdgeBundle>) => void): void {
    for (const [key, value] of this) callback(value, key, this);
  }

  #make(key: NodeKey): EdgeBundle | undefined {
    const edges: Edge[] = [];
    const declarers: NodeKey[] = [];
    let mayRepeat = false;
    for (const node of this.#listDeclarers(key)) {
      const before = edges.length;
      for (const reference of node.references) {
        if (reference.serverUri !== undefined || (node.key !== key && reference.target !== key)) continue;
        const edge = toEdge(node, reference);
        if (edge[this.#end] !== key) continue;
        edges.push(edge);
        declarers.push(node.key);
      }
      // An edge is declared by its two ends only: it can stand twice if the key's node, or one node twice, declares here.
      if (edges.length > before && (node.key === key || edges.length > before + 1)) mayRepeat = true;
    }
    return edges.length === 0 ? undefined : EdgeBundle.of(edges, declarers, mayRepeat);
  }

  #listDeclarers(key: NodeKey): readonly Node[] {
    const own = this.#nodes.get(key);
    const found = this.#declarers.get(key);
    const others: readonly Node[] = found === undefined ? [] : isList(found) ? found : [found];
    if (own === undefined || own.references.length === 0) return others;
    const place = others.findIndex((other) => compareRank(own, other) < 0);
    return place < 0 ? [...others, own] : others.toSpliced(place, 0, own);
  }

  /** Makes all in one pass; those that somebody holds already stay the same objects. */
  #complete(): ReadonlyMap<NodeKey, EdgeBundle> {
    if (this.#isComplete) return this.#made as ReadonlyMap<NodeKey, EdgeBundle>;
    const drafts = new Map<NodeKey, Draft>();
    for (const node of this.#ranked) {
      for (const reference of node.references) {
        if (reference.serverUri !== undefined) continue;
        const edge = toEdge(node, reference);
        addTo(drafts, edge[this.#end], edge, node.key);
      }
    }
    const bundles = new Map<NodeKey, EdgeBundle>();
    for (const [key, { edges, declarers, mayRepeat }] of drafts) {
      bundles.set(key, this.#made.get(key) ?? EdgeBundle.of(edges, declarers, mayRepeat));
    }
    this.#made = bundles;
    this.#isComplete = true;
    return bundles;
  }
}

type Draft = { edges: Edge[]; declarers: NodeKey[]; mayRepeat: boolean };

function addTo(drafts: Map<NodeKey, Draft>, key: NodeKey, edge: Edge, declarer: NodeKey): void {
  const draft = drafts.get(key);
  if (draft) {
    draft.mayRepeat ||= declarer === key || draft.declarers[draft.declarers.length - 1] === declarer;
    draft.edges.push(edge);
    draft.declarers.push(declarer);
  } else {
    drafts.set(key, { edges: [edge], declarers: [declarer], mayRepeat: declarer === key });
  }
}

function isList(found: Node | readonly Node[]): found is readonly Node[] {
  return Array.isArray(found);
}
