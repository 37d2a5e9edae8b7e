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
import type { ModelHeader } from "./model-header";
import type { Node } from "./node";

/** A reference seen from nowhere in particular: always source → target. */
export type Edge = { readonly source: NodeKey; readonly type: NodeKey; readonly target: NodeKey };

export type Layer = {
  readonly header: ModelHeader;
  readonly nodes: ShardedMap<Node>;
  /** NodeId text → key. */
  readonly keysByNodeId: ShardedMap<NodeKey>;
  /** Edges declared in this layer, at their source and at their target; one that is declared twice stands twice. */
  readonly outgoing: ShardedMap<readonly Edge[]>;
  readonly incoming: ShardedMap<readonly Edge[]>;
  /** The order number that the next new node gets. */
  readonly nextOrder: number;
};

const NO_EDGES: readonly Edge[] = [];

/** Builds a layer in one go. Of two nodes with one key the later wins; the reader reports the pair. */
export function buildLayer(header: ModelHeader, nodes: readonly Node[]): Layer {
  const outgoing = new Map<NodeKey, Edge[]>();
  const incoming = new Map<NodeKey, Edge[]>();
  let nextOrder = 0;
  for (const node of nodes) {
    if (node.order >= nextOrder) nextOrder = node.order + 1;
    for (const edge of declaredEdges(node)) {
      pushTo(outgoing, edge.source, edge);
      pushTo(incoming, edge.target, edge);
    }
  }
  return {
    header,
    nodes: ShardedMap.from(nodes.map((n) => [n.key, n] as const)),
    keysByNodeId: ShardedMap.from(nodes.map((n) => [formatNodeId(n.nodeId), n.key] as const)),
    outgoing: ShardedMap.from(outgoing),
    incoming: ShardedMap.from(incoming),
    nextOrder,
  };
}

function pushTo(map: Map<NodeKey, Edge[]>, key: NodeKey, edge: Edge): void {
  const list = map.get(key);
  if (list) list.push(edge);
  else map.set(key, [edge]);
}

/** The edges that a node declares; references to other servers are no edges of this graph. */
function declaredEdges(node: Node): Edge[] {
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

export function isSameEdge(a: Edge, b: Edge): boolean {
  return a.source === b.source && a.target === b.target && a.type === b.type;
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
    return [...this.own.nodes.values()].sort((a, b) => a.order - b.order);
  }

  /** All edges that start at the node, each once, in the order of declaration. */
  edgesFrom(key: NodeKey): readonly Edge[] {
    return collectEdges(this.layers, (layer) => layer.outgoing.get(key));
  }

  /** All edges that end at the node, each once. */
  edgesTo(key: NodeKey): readonly Edge[] {
    return collectEdges(this.layers, (layer) => layer.incoming.get(key));
  }

  hasEdge(edge: Edge): boolean {
    return this.layers.some((layer) => layer.outgoing.get(edge.source)?.some((e) => isSameEdge(e, edge)) ?? false);
  }

  /** Adds or replaces a node of the own model. */
  withNode(node: Node): AddressSpace {
    const old = this.own.nodes.get(node.key);
    let { keysByNodeId } = this.own;
    if (old) keysByNodeId = keysByNodeId.without(formatNodeId(old.nodeId));
    keysByNodeId = keysByNodeId.with(formatNodeId(node.nodeId), node.key);
    const layer: Layer = {
      ...this.own,
      nodes: this.own.nodes.with(node.key, node),
      keysByNodeId,
      ...reindexed(this.own, old, node),
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
      keysByNodeId: this.own.keysByNodeId.without(formatNodeId(old.nodeId)),
      ...reindexed(this.own, old, undefined),
    };
    return this.#withOwn(layer, old.nodeClass === "ReferenceType");
  }

  withHeader(header: ModelHeader): AddressSpace {
    return this.#withOwn({ ...this.own, header }, false);
  }

  /** The same own model on other required models (one was added, or replaced by another version). */
  withRequired(required: readonly Layer[]): AddressSpace {
    return AddressSpace.of(required, this.own);
  }

  #withOwn(own: Layer, clearsCache: boolean): AddressSpace {
    return new AddressSpace([...this.layers.slice(0, -1), own], clearsCache ? new Map() : this.referenceTypeCache);
  }
}

function collectEdges(layers: readonly Layer[], pick: (layer: Layer) => readonly Edge[] | undefined): readonly Edge[] {
  const found: Edge[] = [];
  for (const layer of layers) {
    const edges = pick(layer);
    if (edges) found.push(...edges);
  }
  if (found.length < 2) return found.length === 0 ? NO_EDGES : found;
  return found.length < 16 ? found.filter((e, i) => found.findIndex((o) => isSameEdge(o, e)) === i) : dedupe(found);
}

function dedupe(edges: readonly Edge[]): Edge[] {
  const seen = new Set<string>();
  return edges.filter((e) => {
    const id = `${e.source}\n${e.type}\n${e.target}`;
    if (seen.has(id)) return false;
    seen.add(id);
    return true;
  });
}

function reindexed(layer: Layer, old: Node | undefined, node: Node | undefined): Pick<Layer, "outgoing" | "incoming"> {
  let { outgoing, incoming } = layer;
  if (old?.references === node?.references) return { outgoing, incoming };
  const before = old ? declaredEdges(old) : [];
  const after = node ? declaredEdges(node) : [];
  const gone = before.filter((e) => !after.some((o) => isSameEdge(o, e)));
  const come = after.filter((e) => !before.some((o) => isSameEdge(o, e)));
  for (const edge of gone) {
    outgoing = withoutEdge(outgoing, edge.source, edge);
    incoming = withoutEdge(incoming, edge.target, edge);
  }
  for (const edge of come) {
    outgoing = outgoing.with(edge.source, [...(outgoing.get(edge.source) ?? NO_EDGES), edge]);
    incoming = incoming.with(edge.target, [...(incoming.get(edge.target) ?? NO_EDGES), edge]);
  }
  return { outgoing, incoming };
}

/** Takes one declaration away: a reference that both ends declare stands twice and loses one. */
function withoutEdge(index: ShardedMap<readonly Edge[]>, key: NodeKey, edge: Edge): ShardedMap<readonly Edge[]> {
  const edges = index.get(key) ?? NO_EDGES;
  const at = edges.findIndex((e) => isSameEdge(e, edge));
  if (at < 0) return index;
  if (edges.length === 1) return index.without(key);
  return index.with(key, [...edges.slice(0, at), ...edges.slice(at + 1)]);
}
