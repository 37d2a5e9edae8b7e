/**
 * The address space: an immutable graph of layers.
 *
 * Each NodeSet is a layer; the last layer is the model that is worked on, the layers beneath are its required models.
 * Published layers are built once and shared by all models that require them. Only declarations of references are
 * stored, each at the node that a file declares it at; a layer indexes them at both ends, so that a question for
 * references never depends on which end a file chose. `withNode` and `withoutNode` answer a new address space that
 * shares all but a few shards with the old one, which makes undo, comparison and checks of "before" and "after" cheap.
 */
import { ShardedMap } from "../core/sharded-map";
import { formatNodeId, type NodeId, type NodeKey } from "./node-id";
import { compareRank, isSameEdge, listDistinctEdges, NO_EDGES, type Edge, type EdgeBundle } from "./edge-bundle";
import { buildEdgeIndex, updateEdgeIndex } from "./edge-index";
import { makeMappingEntries, toMappingKey, type MappingAddress, type MappingEntries, type MappingEntry } from "./mapping-entry";
import type { ModelHeader } from "./model-header";
import type { Node } from "./node";

export type { Edge } from "./edge-bundle";
export { isSameEdge } from "./edge-bundle";

export type Layer = {
  readonly header: ModelHeader;
  readonly nodes: ShardedMap<Node>;
  /** NodeId text → key. */
  readonly keysByNodeId: ShardedMap<NodeKey>;
  /** Edges declared in this layer, at their source and at their target; see edge-bundle.ts. */
  readonly outgoing: ShardedMap<EdgeBundle>;
  readonly incoming: ShardedMap<EdgeBundle>;
  /** The order number that the next new node gets. */
  readonly nextOrder: number;
  /** How machines are fed; absent while nothing is mapped. */
  readonly mapping?: MappingEntries;
};

/** Builds a layer in one go. Of two nodes with one key the later wins; the reader reports the pair. */
export function buildLayer(header: ModelHeader, nodes: readonly Node[], mapping: readonly MappingEntry[] = []): Layer {
  const byKey = ShardedMap.from(nodes.map((n) => [n.key, n] as const));
  const ranked = listRanked(nodes.length === byKey.size ? nodes : [...byKey.values()]);
  return {
    header,
    nodes: byKey,
    keysByNodeId: ShardedMap.lazy(() => new Map(ranked.map((n) => [formatNodeId(n.nodeId), n.key]))),
    ...buildEdgeIndex(byKey, ranked),
    nextOrder: (ranked.at(-1)?.order ?? -1) + 1,
    ...(mapping.length > 0 ? { mapping: makeMappingEntries(mapping) } : {}),
  };
}

/** The nodes by `order`; two windows may have chosen one number, then the key decides, so that all agree. */
function listRanked(nodes: readonly Node[]): readonly Node[] {
  const isRanked = nodes.every((n, i) => i === 0 || compareRank(nodes[i - 1] as Node, n) < 0);
  return isRanked ? nodes : [...nodes].sort(compareRank);
}

export class AddressSpace {
  /** Required models first, the own model last. */
  readonly layers: readonly Layer[];
  readonly own: Layer;
  /** Closures of reference types, kept while no ReferenceType changes; see type-hierarchy.ts. */
  readonly referenceTypeCache: Map<NodeKey, ReadonlySet<NodeKey>>;

  private constructor(layers: readonly Layer[], referenceTypeCache: Map<NodeKey, ReadonlySet<NodeKey>>) {
    const own = layers.at(-1);
    if (!own) throw new RangeError("An address space needs at least one layer");
    this.layers = layers;
    this.own = own;
    this.referenceTypeCache = referenceTypeCache;
  }

  static of(required: readonly Layer[], own: Layer): AddressSpace {
    return new AddressSpace([...required, own], new Map());
  }

  getNode(key: NodeKey): Node | undefined {
    for (let i = this.layers.length - 1; i >= 0; i--) {
      const node = this.layers[i]?.nodes.get(key);
      if (node) return node;
    }
    return undefined;
  }

  /** The node that must exist; throws RangeError when it does not. */
  requireNode(key: NodeKey): Node {
    const node = this.getNode(key);
    if (!node) throw new RangeError(`No node ${key}`);
    return node;
  }

  findByNodeId(id: NodeId): Node | undefined {
    const text = formatNodeId(id);
    for (let i = this.layers.length - 1; i >= 0; i--) {
      const key = this.layers[i]?.keysByNodeId.get(text);
      if (key) return this.layers[i]?.nodes.get(key);
    }
    return undefined;
  }

  isOwn(key: NodeKey): boolean {
    return this.own.nodes.has(key);
  }

  /** The nodes of the own model in their order. */
  listOwnNodes(): Node[] {
    return [...this.own.nodes.values()].sort(compareRank);
  }

  /** All edges that start at the node, each once: required models first, then in the order of the declaring nodes. */
  edgesFrom(key: NodeKey): readonly Edge[] {
    return collectEdges(this.layers, key, "outgoing");
  }

  /** All edges that end at the node, each once. */
  edgesTo(key: NodeKey): readonly Edge[] {
    return collectEdges(this.layers, key, "incoming");
  }

  /** The first edge of one type that ends at the node, without gathering the others. */
  findEdgeTo(key: NodeKey, type: NodeKey): Edge | undefined {
    for (const layer of this.layers) {
      const edge = layer.incoming.get(key)?.distinct.find((e) => e.type === type);
      if (edge) return edge;
    }
    return undefined;
  }

  hasEdge(edge: Edge): boolean {
    return this.layers.some((layer) => hasEdge(layer, edge));
  }

  /** Adds or replaces a node of the own model. */
  withNode(node: Node): AddressSpace {
    const old = this.own.nodes.get(node.key);
    const keysByNodeId = withoutId(this.own, old).with(formatNodeId(node.nodeId), node.key);
    const layer: Layer = {
      ...this.own,
      nodes: this.own.nodes.with(node.key, node),
      keysByNodeId,
      ...updateEdgeIndex(this.own, old, node),
      nextOrder: Math.max(this.own.nextOrder, node.order + 1),
    };
    return this.#withOwn(layer, node.nodeClass === "ReferenceType" || old?.nodeClass === "ReferenceType");
  }

  /** Removes a node of the own model and what it declares; declarations at other nodes that name it stay. */
  withoutNode(key: NodeKey): AddressSpace {
    const old = this.own.nodes.get(key);
    if (!old) return this;
    const layer: Layer = {
      ...this.own,
      nodes: this.own.nodes.without(key),
      keysByNodeId: withoutId(this.own, old),
      ...updateEdgeIndex(this.own, old, undefined),
    };
    return this.#withOwn(layer, old.nodeClass === "ReferenceType");
  }

  withHeader(header: ModelHeader): AddressSpace {
    return this.#withOwn({ ...this.own, header }, false);
  }

  /** Adds or replaces an entry of the own model's mapping. */
  withMapping(entry: MappingEntry): AddressSpace {
    const mapping = (this.own.mapping ?? makeMappingEntries([])).with(toMappingKey(entry), entry);
    return this.#withOwn({ ...this.own, mapping }, false);
  }

  withoutMapping(address: MappingAddress): AddressSpace {
    const { mapping, ...rest } = this.own;
    const left = mapping?.without(toMappingKey(address));
    return this.#withOwn(left && left.size > 0 ? { ...rest, mapping: left } : rest, false);
  }

  /** The same own model on other required models (one was added, or replaced by another version). */
  withRequired(required: readonly Layer[]): AddressSpace {
    return AddressSpace.of(required, this.own);
  }

  #withOwn(own: Layer, clearsCache: boolean): AddressSpace {
    return new AddressSpace([...this.layers.slice(0, -1), own], clearsCache ? new Map() : this.referenceTypeCache);
  }
}

/** Without the NodeId of a node, unless another node has it by now: nodes that exchange their ids are put there in turns. */
function withoutId({ keysByNodeId }: Layer, node: Node | undefined): ShardedMap<NodeKey> {
  const text = node && formatNodeId(node.nodeId);
  return text !== undefined && keysByNodeId.get(text) === node?.key ? keysByNodeId.without(text) : keysByNodeId;
}

/** The edges of a node that other nodes of the layer declare: what keeps it from being removed. */
export function listUses(layer: Layer, node: Node): Edge[] {
  const uses: Edge[] = [];
  for (const bundle of [layer.outgoing.get(node.key), layer.incoming.get(node.key)]) {
    const declarers = bundle?.declarers;
    bundle?.edges.forEach((edge, i) => {
      if (declarers?.[i] !== node.key) uses.push(edge);
    });
  }
  return uses;
}

/** Whether the layer declares the edge. Asks the smaller of the two bundles: hubs have tens of thousands of edges. */
export function hasEdge(layer: Layer, edge: Edge): boolean {
  const from = layer.outgoing.get(edge.source);
  const to = layer.incoming.get(edge.target);
  if (!from || !to) return false;
  return (from.size <= to.size ? from : to).distinct.some((e) => isSameEdge(e, edge));
}

/** One layer answers nearly always; its list is then shared, not copied. */
function collectEdges(layers: readonly Layer[], key: NodeKey, side: "outgoing" | "incoming"): readonly Edge[] {
  let found: readonly Edge[] = NO_EDGES;
  layers.forEach((layer, index) => {
    const edges = layer[side].get(key)?.distinct;
    if (!edges || found.length === 0) {
      found = edges ?? found;
      return;
    }
    const all = [...found, ...edges];
    found = canRepeat(layers.slice(0, index), key, edges) ? listDistinctEdges(all) : all;
  });
  return found;
}

/**
 * Whether one of a layer's edges may stand in a layer beneath as well. An edge is declared by its two ends only, so there
 * its other end must be known: as a node, or by what the key's own node declares.
 */
function canRepeat(beneath: readonly Layer[], key: NodeKey, edges: readonly Edge[]): boolean {
  const named = new Set(beneath.flatMap((layer) => layer.nodes.get(key)?.references.map((r) => r.target) ?? []));
  return edges.some((edge) => {
    const other = edge.source === key ? edge.target : edge.source;
    return named.has(other) || beneath.some((layer) => layer.nodes.has(other));
  });
}
