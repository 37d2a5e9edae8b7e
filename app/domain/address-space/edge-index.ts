/**
 * The edges of a layer, findable from both ends.
 *
 * The index that edits leave behind is the one that a new build makes, down to the order of every list: each window, the
 * server and a reload see members in one order, and an undo restores it.
 */
import { ShardedMap } from "../core/sharded-map";
import { EdgeBundle, isSameEdge, type Edge, type RankOf } from "./edge-bundle";
import type { Node } from "./node";
import type { NodeKey } from "./node-id";

export { compareRank, isSameEdge, listDistinctEdges, type Edge, type EdgeBundle } from "./edge-bundle";

export type EdgeIndex = { readonly outgoing: ShardedMap<EdgeBundle>; readonly incoming: ShardedMap<EdgeBundle> };

/** The edges that a node declares; references to other servers are no edges of this graph. */
export function listDeclaredEdges(node: Node): Edge[] {
  const edges: Edge[] = [];
  for (const reference of node.references) {
    if (reference.serverUri !== undefined) continue;
    edges.push(
      reference.isForward
        ? { source: node.key, type: reference.type, target: reference.target }
        : { source: reference.target, type: reference.type, target: node.key },
    );
  }
  return edges;
}

type Draft = { edges: Edge[]; declarers: NodeKey[]; mayRepeat: boolean };

/** Builds the index of nodes that stand in rank order. */
export function buildEdgeIndex(ranked: readonly Node[]): EdgeIndex {
  const outgoing = new Map<NodeKey, Draft>();
  const incoming = new Map<NodeKey, Draft>();
  for (const node of ranked) {
    for (const edge of listDeclaredEdges(node)) {
      pushTo(outgoing, edge.source, edge, node.key);
      pushTo(incoming, edge.target, edge, node.key);
    }
  }
  return { outgoing: seal(outgoing), incoming: seal(incoming) };
}

/** An edge is declared by its two ends only, so one stands twice only if the key's node or one node twice declares here. */
function pushTo(map: Map<NodeKey, Draft>, key: NodeKey, edge: Edge, declarer: NodeKey): void {
  const draft = map.get(key);
  if (draft) {
    draft.mayRepeat ||= declarer === key || draft.declarers.at(-1) === declarer;
    draft.edges.push(edge);
    draft.declarers.push(declarer);
  } else {
    map.set(key, { edges: [edge], declarers: [declarer], mayRepeat: declarer === key });
  }
}

function seal(map: Map<NodeKey, Draft>): ShardedMap<EdgeBundle> {
  return ShardedMap.from(listBundles(map));
}

function* listBundles(map: Map<NodeKey, Draft>): Iterable<readonly [string, EdgeBundle]> {
  for (const [key, { edges, declarers, mayRepeat }] of map) yield [key, EdgeBundle.of(edges, declarers, mayRepeat)];
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
  if (!bundle) return EdgeBundle.of(edges, edges.map(() => node.key), mayRepeat);
  return bundle.withRun(node, edges, rankOf, mayRepeat);
}
