/**
 * What rules see of an address space: questions to the graph, all of them noted, so that an edit finds the checks that must
 * run again (graph-memory.ts).
 */
import type { AddressSpace, Layer } from "../address-space/address-space";
import type { Edge } from "../address-space/edge-index";
import type { ModelHeader } from "../address-space/model-header";
import { isTypeNode, type Node, type NodeClass } from "../address-space/node";
import { formatNodeId, parseNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { getReferenceTypes } from "../address-space/type-hierarchy";
import { GraphMemory, type Lookup as LookupOf } from "./graph-memory";
import { usesNamespace } from "./namespace-use";
import type { Subject } from "./slots";
import { groupByNodeId, hasTwins } from "./twins";
import { addTypeName, getTypeNames, makeTypeNames, removeTypeName, type TypeNames } from "./type-names";
import { FROM, HIERARCHICAL, OTHER, SUBTYPE, TO, type NodeHead } from "./views";
import { TYPE_CLASSES } from "./node-classes";

/** A lookup worth remembering; `makeLookup` makes it. */
export type Lookup<T> = LookupOf<CheckContext, T>;

let lookups = 0;

/** `compute` walks in loops and never asks itself for another key, so that cycles end. Called while modules load only. */
export function makeLookup<T>(compute: Lookup<T>["compute"]): Lookup<T> {
  return { number: lookups++, compute };
}

export class CheckContext {
  readonly #memory: GraphMemory;
  readonly #typeNames: TypeNames;
  #uris: Uris;
  readonly #witnesses = new Map<string, NodeKey>();
  #twins: ReadonlyMap<string, readonly NodeKey[]> | undefined;
  readonly #required: readonly Layer[];
  readonly #requiredUris: ReadonlySet<string>;

  /** Without tracking reads are not noted, which a single full run does not need; `update` then must not be called. */
  constructor(space: AddressSpace, isTracked = true) {
    this.#memory = new GraphMemory(space, isTracked);
    this.#required = space.layers.slice(0, -1);
    this.#requiredUris = new Set(this.#required.flatMap((l) => l.header.models.map((m) => m.modelUri)));
    this.#typeNames = makeTypeNames(space.own);
    this.#uris = listUris(space.own.header);
  }

  get #space(): AddressSpace {
    return this.#memory.space;
  }

  node(key: NodeKey): Node | undefined {
    return this.#memory.node(key);
  }

  /** The NodeClass; undefined where there is no node. Who asks no more is not disturbed by other changes of the node. */
  classOf(key: NodeKey): NodeClass | undefined {
    return this.#memory.classOf(key);
  }

  /** NodeClass and BrowseName of the node, likewise. */
  head(key: NodeKey): NodeHead | undefined {
    return this.#memory.head(key);
  }

  /** Edges from the node that are hierarchical, HasSubtype left out. */
  childEdges(key: NodeKey): readonly Edge[] {
    return this.#memory.edges(key, FROM, HIERARCHICAL);
  }

  /** Edges to the node that are hierarchical, HasSubtype left out. */
  parentEdges(key: NodeKey): readonly Edge[] {
    return this.#memory.edges(key, TO, HIERARCHICAL);
  }

  /** HasSubtype edges to the node; the supertypes are their sources. */
  supertypeEdges(key: NodeKey): readonly Edge[] {
    return this.#memory.edges(key, TO, SUBTYPE);
  }

  /** HasSubtype edges from the node; the subtypes are their targets. */
  subtypeEdges(key: NodeKey): readonly Edge[] {
    return this.#memory.edges(key, FROM, SUBTYPE);
  }

  /** Non-hierarchical edges from the node. */
  otherEdges(key: NodeKey): readonly Edge[] {
    return this.#memory.edges(key, FROM, OTHER);
  }

  /** Non-hierarchical edges to the node. */
  otherEdgesTo(key: NodeKey): readonly Edge[] {
    return this.#memory.edges(key, TO, OTHER);
  }

  edgesFrom(key: NodeKey): Edge[] {
    return [...this.subtypeEdges(key), ...this.childEdges(key), ...this.otherEdges(key)];
  }

  edgesTo(key: NodeKey): Edge[] {
    return [...this.supertypeEdges(key), ...this.parentEdges(key), ...this.otherEdgesTo(key)];
  }

  /** A reference type with all its subtypes. A change of ReferenceTypes starts a new context. */
  closure(referenceType: NodeKey): ReadonlySet<NodeKey> {
    return getReferenceTypes(this.#space, referenceType);
  }

  isHierarchical(referenceType: NodeKey): boolean {
    return this.#memory.isHierarchical(referenceType);
  }

  get header(): ModelHeader {
    this.#memory.note("header");
    return this.#space.own.header;
  }

  /** URIs of the models and of the whole namespace table: what rules about nodes ask of the header. */
  get modelUris(): readonly string[] {
    this.#memory.note("uris");
    return this.#uris.models;
  }

  get namespaceUris(): readonly string[] {
    this.#memory.note("uris");
    return this.#uris.namespaces;
  }

  /** The layers of the required models; a change of these starts a new context. */
  get required(): readonly Layer[] {
    return this.#required;
  }

  isOwn(key: NodeKey): boolean {
    return this.#memory.classOf(key) !== undefined && this.#space.isOwn(key);
  }

  /** Keys of all types with the BrowseName, those of required models first. */
  listTypesNamed(browseName: QualifiedName): NodeKey[] {
    const name = formatQualifiedName(browseName);
    this.#memory.note(`type ${name}`);
    const keys = this.#required.flatMap((layer) => [...(getTypeNames(layer).get(name) ?? [])]);
    return [...keys, ...[...(this.#typeNames.get(name) ?? [])].sort()];
  }

  /** The key of the node with the NodeId, of required models before the own one. */
  findWithNodeId(id: NodeId): NodeKey | undefined {
    const text = formatNodeId(id);
    for (const layer of this.#required) {
      const key = layer.keysByNodeId.get(text);
      if (key !== undefined) return key;
    }
    this.#memory.note(`id ${text}`);
    return this.#space.own.keysByNodeId.get(text);
  }

  /** Keys of other nodes with the NodeId of an own node. */
  listTwins({ key, nodeId }: Node): NodeKey[] {
    const isForeign = this.#requiredUris.has(nodeId.namespaceUri);
    if (!isForeign && !hasTwins(this.#space)) return [];
    const text = formatNodeId(nodeId);
    const twins = this.#required.flatMap((layer) => layer.keysByNodeId.get(text) ?? []);
    if (hasTwins(this.#space)) twins.push(...(this.#getTwins().get(text) ?? []));
    return twins.filter((twin) => twin !== key);
  }

  #getTwins(): ReadonlyMap<string, readonly NodeKey[]> {
    this.#twins ??= groupByNodeId(this.#space);
    return this.#twins;
  }

  /** Whether an id, a name or a value of an own node is in the namespace. One node that uses it is remembered. */
  isNamespaceUsed(namespaceUri: string): boolean {
    const known = this.#witnesses.get(namespaceUri);
    const witness = known === undefined ? undefined : this.node(known);
    if (witness && usesNamespace(witness, namespaceUri)) return true;
    for (const node of this.#space.own.nodes.values()) {
      if (!usesNamespace(node, namespaceUri)) continue;
      this.#witnesses.set(namespaceUri, node.key);
      this.node(node.key);
      return true;
    }
    this.#memory.note("any node");
    return false;
  }

  hasOwnDataTypes(): boolean {
    this.#memory.note("data types");
    for (const keys of this.#typeNames.values()) {
      for (const key of keys) if (this.#space.own.nodes.get(key)?.nodeClass === "DataType") return true;
    }
    return false;
  }

  /** Whether a loaded model defines the namespace; the own model counts. */
  isNamespaceLoaded(namespaceUri: string): boolean {
    return this.#requiredUris.has(namespaceUri) || this.modelUris.includes(namespaceUri);
  }

  lookUp<T>(lookup: Lookup<T>, key: NodeKey): T {
    return this.#memory.lookUp(lookup, this, key);
  }

  /** NodeId text with `nsu=` of a node, loaded or not. */
  nodeIdOf(key: NodeKey): string {
    const node = this.node(key);
    return node ? formatNodeId(node.nodeId) : key;
  }

  /** `Speed (nsu=…;i=5001)`, for facts. */
  describe(key: NodeKey): string {
    const node = this.node(key);
    return node ? `${node.browseName.name} (${formatNodeId(node.nodeId)})` : `${key} (not loaded)`;
  }

  nameOf(key: NodeKey): string {
    return this.head(key)?.browseName.name ?? key;
  }

  /** The namespace of a node, loaded or not; undefined when the key is no NodeId text. */
  namespaceOf(key: NodeKey): string | undefined {
    const node = this.node(key);
    if (node) return node.nodeId.namespaceUri;
    const parsed = parseNodeId(key, []);
    return parsed.ok ? parsed.value.namespaceUri : undefined;
  }

  /** Names from the topmost owner down to the node, as `getPath` makes them. */
  pathOf(key: NodeKey): string {
    const names: string[] = [];
    const seen = new Set<NodeKey>();
    const isStartOwn = this.isOwn(key);
    for (let at: NodeKey | undefined = key; at !== undefined && !seen.has(at);) {
      seen.add(at);
      const head = this.head(at);
      if (!head || (names.length > 0 && isStartOwn && !this.isOwn(at))) break;
      names.unshift(head.browseName.name);
      at = TYPE_CLASSES.includes(head.nodeClass) ? undefined : this.#parentOf(at);
    }
    return names.join("/");
  }

  #parentOf(key: NodeKey): NodeKey | undefined {
    const edges = this.parentEdges(key);
    if (edges.length < 2) return edges[0]?.source;
    const node = this.node(key);
    const declared = node && "parent" in node ? node.parent : undefined;
    return edges.some((e) => e.source === declared) ? declared : edges[0]?.source;
  }

  /** Runs the check of a subject; what it reads is noted for it. */
  runAs(subject: Subject, run: () => void): void {
    this.#memory.runAs(subject, run);
  }

  /**
   * Moves on to the next state of the model. `changed` are the keys of all own nodes that differ; ReferenceTypes and
   * required models are the same. Answers the subjects whose checks must run again.
   */
  update(after: AddressSpace, changed: readonly NodeKey[]): Set<Subject> {
    const before = this.#space;
    const dirty = new Set<Subject>();
    if (hasTwins(before)) this.#dirtyTwins(before, after, changed, dirty);
    this.#memory.space = after;
    this.#twins = undefined;
    if (hasTwins(after)) this.#dirtyTwins(before, after, changed, dirty);
    if (before.own.header !== after.own.header) this.#moveHeader(after.own.header, dirty);
    if (changed.length > 0) this.#memory.drop("any node", dirty);
    for (const key of changed) this.#touch(key, before.own.nodes.get(key), after.own.nodes.get(key), dirty);
    return dirty;
  }

  #moveHeader(header: ModelHeader, dirty: Set<Subject>): void {
    this.#memory.drop("header", dirty);
    const uris = listUris(header);
    if (JSON.stringify(uris) === JSON.stringify(this.#uris)) return;
    this.#uris = uris;
    this.#memory.drop("uris", dirty);
  }

  /** Of two nodes with one NodeId both are told, so both are checked again when one of them changes. */
  #dirtyTwins(before: AddressSpace, after: AddressSpace, changed: readonly NodeKey[], dirty: Set<Subject>): void {
    for (const key of changed) {
      for (const node of [before.own.nodes.get(key), after.own.nodes.get(key)]) {
        if (node) for (const twin of this.#getTwins().get(formatNodeId(node.nodeId)) ?? []) dirty.add(twin);
      }
    }
  }

  #touch(key: NodeKey, old: Node | undefined, node: Node | undefined, dirty: Set<Subject>): void {
    this.#memory.touch(key, old, node, dirty);
    for (const state of [old, node]) {
      if (!state) continue;
      this.#memory.drop(`id ${formatNodeId(state.nodeId)}`, dirty);
      if (isTypeNode(state)) this.#memory.drop(`type ${formatQualifiedName(state.browseName)}`, dirty);
      if (state.nodeClass === "DataType") this.#memory.drop("data types", dirty);
    }
    if (old) removeTypeName(this.#typeNames, old);
    if (node) addTypeName(this.#typeNames, node);
  }
}

type Uris = { readonly models: readonly string[]; readonly namespaces: readonly string[] };

function listUris({ models, namespaceUris }: ModelHeader): Uris {
  return { models: models.map((m) => m.modelUri), namespaces: namespaceUris };
}
