/**
 * The edges at one end of one node: an immutable list in chunks, so that a hub with tens of thousands of edges (a
 * modelling rule, PropertyType) gains or loses one by copying a few hundred entries.
 *
 * Entries are ordered by the nodes that declare them (`order`, then key), within one of these by its list of references.
 * Reading answers each edge once: what both ends declare stands twice in the list and once in `distinct`.
 */
import type { Node } from "./node";
import type { NodeKey } from "./node-id";

/** A reference seen from nowhere in particular: always source → target. */
export type Edge = { readonly source: NodeKey; readonly type: NodeKey; readonly target: NodeKey };

type Chunk = { readonly edges: readonly Edge[]; readonly declarers: readonly NodeKey[] };

const CHUNK = 256;

export const NO_EDGES: readonly Edge[] = [];

export function isSameEdge(a: Edge, b: Edge): boolean {
  return a.source === b.source && a.target === b.target && a.type === b.type;
}

/** The order of nodes in a model: by `order`, of equals by key. */
export function compareRank(a: Pick<Node, "order" | "key">, b: Pick<Node, "order" | "key">): number {
  return a.order - b.order || (a.key < b.key ? -1 : a.key > b.key ? 1 : 0);
}

export class EdgeBundle {
  readonly size: number;
  readonly #chunks: readonly Chunk[];
  readonly #mayRepeat: boolean;
  #distinct: readonly Edge[] | undefined;

  private constructor(chunks: readonly Chunk[], size: number, mayRepeat: boolean) {
    this.#chunks = chunks;
    this.size = size;
    this.#mayRepeat = mayRepeat;
  }

  /** A bundle of entries in rank order; `mayRepeat: false` promises that no edge stands twice. */
  static of(edges: readonly Edge[], declarers: readonly NodeKey[], mayRepeat: boolean): EdgeBundle {
    return new EdgeBundle(toChunks({ edges, declarers }), edges.length, mayRepeat);
  }

  /** Each edge once, in order. The same array every time. */
  get distinct(): readonly Edge[] {
    this.#distinct ??= this.#mayRepeat ? listDistinctEdges(this.edges) : this.edges;
    return this.#distinct;
  }

  /** Each declaration, in order. */
  get edges(): readonly Edge[] {
    return this.#chunks.length === 1 ? (this.#chunks[0] as Chunk).edges : this.#chunks.flatMap((c) => c.edges);
  }

  /** The node that declares the edge of the same place in `edges`. */
  get declarers(): readonly NodeKey[] {
    return this.#chunks.flatMap((c) => c.declarers);
  }

  /** Takes the run of `count` entries away that `node` declares; undefined when nothing is left. */
  withoutRun(node: Node, count: number, rankOf: RankOf): EdgeBundle | undefined {
    if (this.size === count) return undefined;
    const chunks = [...this.#chunks];
    let [index, offset] = this.#findPlace(node, rankOf);
    for (let left = count; left > 0;) {
      const chunk = chunks[index] as Chunk;
      const taken = Math.min(left, chunk.edges.length - offset);
      left -= taken;
      if (taken === chunk.edges.length) chunks.splice(index, 1);
      else chunks[index++] = spliced(chunk, offset, taken, NO_EDGES, node.key);
      offset = 0;
    }
    return new EdgeBundle(chunks, this.size - count, this.#mayRepeat);
  }

  /** Puts in what `node` declares, all of it in one run. */
  withRun(node: Node, edges: readonly Edge[], rankOf: RankOf, mayRepeat: boolean): EdgeBundle {
    const [index, offset] = this.#findPlace(node, rankOf);
    const chunks = [...this.#chunks];
    const at = Math.min(index, chunks.length - 1);
    const chunk = chunks[at] as Chunk;
    chunks.splice(at, 1, ...toChunks(spliced(chunk, at === index ? offset : chunk.edges.length, 0, edges, node.key)));
    return new EdgeBundle(chunks, this.size + edges.length, mayRepeat || this.#mayRepeat);
  }

  /** The first place whose declaring node ranks at or behind `node`: new nodes mostly stand behind all others. */
  #findPlace(node: Node, rankOf: RankOf): [chunk: number, offset: number] {
    const isBefore = (declarer: NodeKey): boolean =>
      declarer !== node.key && compareRank({ order: rankOf(declarer), key: declarer }, node) < 0;
    const index = lowerBound(this.#chunks.length, (i) => isBefore(this.#chunks[i]?.declarers.at(-1) as NodeKey));
    const declarers = this.#chunks[index]?.declarers ?? [];
    return [index, lowerBound(declarers.length, (i) => isBefore(declarers[i] as NodeKey))];
  }
}

/** The `order` of a declaring node. */
export type RankOf = (key: NodeKey) => number;

function lowerBound(length: number, isBefore: (index: number) => boolean): number {
  if (length > 0 && isBefore(length - 1)) return length;
  let low = 0;
  let high = length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if (isBefore(middle)) low = middle + 1;
    else high = middle;
  }
  return low;
}

function spliced(chunk: Chunk, at: number, gone: number, come: readonly Edge[], declarer: NodeKey): Chunk {
  const edges = chunk.edges.slice();
  edges.splice(at, gone, ...come);
  const declarers = chunk.declarers.slice();
  declarers.splice(at, gone, ...come.map(() => declarer));
  return { edges, declarers };
}

function toChunks(whole: Chunk): Chunk[] {
  if (whole.edges.length <= 2 * CHUNK) return [whole];
  const chunks: Chunk[] = [];
  for (let at = 0; at < whole.edges.length; at += CHUNK) {
    chunks.push({ edges: whole.edges.slice(at, at + CHUNK), declarers: whole.declarers.slice(at, at + CHUNK) });
  }
  return chunks;
}

/** Each edge once, first come first kept. */
export function listDistinctEdges(edges: readonly Edge[]): readonly Edge[] {
  if (edges.length < 2) return edges;
  if (edges.length < 12) {
    const distinct = edges.filter((e, i) => edges.findIndex((o) => isSameEdge(o, e)) === i);
    return distinct.length === edges.length ? edges : distinct;
  }
  const seen = new Set<string>();
  const distinct = edges.filter((e) => {
    const id = `${e.source}\n${e.type}\n${e.target}`;
    if (seen.has(id)) return false;
    seen.add(id);
    return true;
  });
  return distinct.length === edges.length ? edges : distinct;
}
