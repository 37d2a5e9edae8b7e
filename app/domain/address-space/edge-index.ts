/**
 * The edges of a layer, findable from both ends.
 *
 * The index that edits leave behind is the one that a new build makes, down to the order of every list: each window, the
 * server and a reload see members in one order, and an undo restores it.
 */
import { ShardedMap } from "../core/sharded-map";
import { DeclaredEdges, indexDeclarers, toEdge, type Declarers } from "./declared-edges";
import { EdgeBundle, isSameEdge, type Edge, type RankOf } from "./edge-bundle";
import type { Node } from "./node";
import type { NodeKey } from "./node-id";

export { compareRank, isSameEdge, listDistinctEdges, type Edge, type EdgeBundle } from "./edge-bundle";

export type EdgeIndex = { readonly outgoing: ShardedMap<EdgeBundle>; readonly incoming: ShardedMap<EdgeBundle> };

/** The edges that a node declares; references to other servers are no edges of this graph. */
export function listDeclaredEdges(node: Node): Edge[] {
  return node.references.filter(({ serverUri }) => serverUri === undefined).map((reference) => toEdge(node, reference));
}

/** The index of nodes that stand in rank order, made when the first edge is asked for. */
export function buildEdgeIndex(nodes: ShardedMap<Node>, ranked: readonly Node[]): EdgeIndex {
  let declarers: Declarers | undefined;
  const makeSide = (end: "source" | "target"): ShardedMap<EdgeBundle> =>
    ShardedMap.lazy<EdgeBundle, NodeKey>(
      () => new DeclaredEdges(end, nodes, ranked, (declarers ??= indexDeclarers(ranked))),
    );
  return { outgoing: makeSide("source"), incoming: makeSide("target") };
}

/** The index after one node was added (`old` undefined), replaced, or removed (`node` undefined). */
export function updateEdgeIndex(
  layer: EdgeIndex & { readonly nodes: ShardedMap<Node> },
  old: Node | undefined,
  node: Node | undefined,
): EdgeIndex {
  const { outgoing, incoming, nodes } = layer;
  if (old && node && old.references === node.references && old.order === node.order) return { outgoing, incoming };
  const before = old ? listDeclaredEdges(old) : [];
  const after = node ? listDeclaredEdges(node) : [];
  const rankOf = (key: NodeKey): number => nodes.get(key)?.order ?? node?.order ?? 0;
  return {
    outgoing: updateSide(outgoing, rankOf, { old, node, before, after, end: "source" }),
    incoming: updateSide(incoming, rankOf, { old, node, before, after, end: "target" }),
  };
}

type Change = {
  old: Node | undefined;
  node: Node | undefined;
  before: readonly Edge[];
  after: readonly Edge[];
  end: "source" | "target";
};

function updateSide(index: ShardedMap<EdgeBundle>, rankOf: RankOf, change: Change): ShardedMap<EdgeBundle> {
  const { old, node, before, after, end } = change;
  const keys = new Set<NodeKey>();
  for (const edge of before) keys.add(edge[end]);
  for (const edge of after) keys.add(edge[end]);
  for (const key of keys) {
    const gone = before.filter((e) => e[end] === key);
    const come = after.filter((e) => e[end] === key);
    const isSameRun = gone.length === come.length && gone.every((e, i) => isSameEdge(e, come[i] as Edge));
    if (isSameRun && old && node && old.order === node.order) continue;
    let bundle = index.get(key);
    if (old && gone.length > 0) bundle = bundle?.withoutRun(old, gone.length, rankOf);
    if (node && come.length > 0) bundle = addRun(bundle, key, node, come, rankOf);
    index = bundle ? index.with(key, bundle) : index.without(key);
  }
  return index;
}

/** What another node declares can repeat at most what the key's own node declares here. */
function addRun(
  bundle: EdgeBundle | undefined,
  key: NodeKey,
  node: Node,
  edges: readonly Edge[],
  rankOf: RankOf,
): EdgeBundle {
  const mayRepeat = key === node.key || edges.length > 1;
  if (!bundle)
    return EdgeBundle.of(
      edges,
      edges.map(() => node.key),
      mayRepeat,
    );
  return bundle.withRun(node, edges, rankOf, mayRepeat);
}
