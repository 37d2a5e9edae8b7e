/**
 * What rules see of an address space, and the memory of what they saw.
 *
 * Every answer sits in a slot (slots.ts). After an edit, `update` drops the slots that the edit can have changed and
 * answers the checks that must run again, nothing else. Slots are fine where many nodes meet: edges are kept apart by
 * direction and by group (HasSubtype, other hierarchical, rest), so that a new instance does not disturb those who only
 * asked for its type's supertype.
 */
import type { AddressSpace, Layer } from "../address-space/address-space";
import { listDistinctEdges, type Edge } from "../address-space/edge-index";
import type { ModelHeader } from "../address-space/model-header";
import { isTypeNode, type Node } from "../address-space/node";
import { formatNodeId, parseNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { StandardReferenceType } from "../address-space/standard-ids";
import { getReferenceTypes } from "../address-space/type-hierarchy";
import { listMovedEdges } from "./moved-edges";
import { groupByNodeId, hasTwins } from "./twins";
import { dropSlot, Slot, type Computation, type Subject } from "./slots";
import { addTypeName, getTypeNames, makeTypeNames, removeTypeName, type TypeNames } from "./type-names";
import { usesNamespace } from "./namespace-use";
import { Answer, EdgeSlot, FROM, HIERARCHICAL, NodeSlot, OTHER, SUBTYPE, TO, View } from "./views";

const NO_EDGES: readonly Edge[] = [];

/** Up to this many edges all groups are sorted out in one go; of hubs (PropertyType, Mandatory) only what is asked for. */
const HUB = 64;

/** A lookup worth remembering; `makeLookup` makes it. */
export type Lookup<T> = { readonly number: number; readonly compute: (ctx: CheckContext, key: NodeKey) => T };

let lookups = 0;

/** `compute` walks in loops and never asks itself for another key, so that cycles end. Called while modules load only. */
export function makeLookup<T>(compute: Lookup<T>["compute"]): Lookup<T> {
  return { number: lookups++, compute };
}

export class CheckContext {
  #space: AddressSpace;
  readonly #views = new Map<NodeKey, View>();
  /** Checks ask for the same node many times in a row. */
  #lastKey: NodeKey | undefined;
  #lastView = new View();
  readonly #typeNames: TypeNames;
  /** Slots of questions that are not about one node: who has a name, who has an id, who uses a namespace. */
  readonly #slots = new Map<string, Slot>();
  readonly #witnesses = new Map<string, NodeKey>();
  #twins: ReadonlyMap<string, readonly NodeKey[]> | undefined;
  readonly #hierarchical: ReadonlySet<NodeKey>;
  readonly #required: readonly Layer[];
  readonly #requiredUris: ReadonlySet<string>;
  readonly #isTracked: boolean;
  #reader: Computation | undefined;

  /** Without tracking reads are not noted, which a single full run does not need; `update` then must not be called. */
  constructor(space: AddressSpace, isTracked = true) {
    this.#space = space;
    this.#isTracked = isTracked;
    this.#hierarchical = getReferenceTypes(space, StandardReferenceType.HierarchicalReferences);
    this.#required = space.layers.slice(0, -1);
    this.#requiredUris = new Set(this.#required.flatMap((l) => l.header.models.map((m) => m.modelUri)));
    this.#typeNames = makeTypeNames(space.own);
  }

  node(key: NodeKey): Node | undefined {
    const view = this.#view(key);
    const slot = (view.node ??= new NodeSlot(this.#space.getNode(key)));
    slot.note(this.#reader);
    return slot.node;
  }

  /** Edges from the node that are hierarchical, HasSubtype left out. */
  childEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, FROM, HIERARCHICAL);
  }

  /** Edges to the node that are hierarchical, HasSubtype left out. */
  parentEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, TO, HIERARCHICAL);
  }

  /** HasSubtype edges to the node; the supertypes are their sources. */
  supertypeEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, TO, SUBTYPE);
  }

  /** HasSubtype edges from the node; the subtypes are their targets. */
  subtypeEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, FROM, SUBTYPE);
  }

  /** Non-hierarchical edges from the node. */
  otherEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, FROM, OTHER);
  }

  /** Non-hierarchical edges to the node. */
  otherEdgesTo(key: NodeKey): readonly Edge[] {
    return this.#edges(key, TO, OTHER);
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
    return this.#hierarchical.has(referenceType);
  }

  get header(): ModelHeader {
    this.#note("header");
    return this.#space.own.header;
  }

  /** The layers of the required models; a change of these starts a new context. */
  get required(): readonly Layer[] {
    return this.#required;
  }

  isOwn(key: NodeKey): boolean {
    return this.node(key) !== undefined && this.#space.isOwn(key);
  }

  /** Keys of all types with the BrowseName, those of required models first. */
  listTypesNamed(browseName: QualifiedName): NodeKey[] {
    const name = formatQualifiedName(browseName);
    this.#note(`type ${name}`);
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
    this.#note(`id ${text}`);
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
    this.#note("any node");
    return false;
  }

  hasOwnDataTypes(): boolean {
    this.#note("data types");
    for (const keys of this.#typeNames.values()) {
      for (const key of keys) if (this.#space.own.nodes.get(key)?.nodeClass === "DataType") return true;
    }
    return false;
  }

  /** Whether a loaded model defines the namespace; the own model counts. */
  isNamespaceLoaded(namespaceUri: string): boolean {
    return this.#requiredUris.has(namespaceUri) || this.header.models.some((m) => m.modelUri === namespaceUri);
  }

  lookUp<T>(lookup: Lookup<T>, key: NodeKey): T {
    const { answers } = this.#view(key);
    const answer = answers[lookup.number] ?? this.#answer(lookup, key, answers);
    answer.note(this.#reader);
    return answer.value as T;
  }

  #answer(lookup: Lookup<unknown>, key: NodeKey, answers: (Answer | undefined)[]): Answer {
    const answer = new Answer();
    const { number } = lookup;
    const forget = (): void => void (answers[number] = undefined);
    answer.value = this.#isTracked
      ? this.#readAs({ answer, forget, isEnded: false }, () => lookup.compute(this, key))
      : lookup.compute(this, key);
    answers[number] = answer;
    return answer;
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
    return this.node(key)?.browseName.name ?? key;
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
      const node = this.node(at);
      if (!node || (names.length > 0 && isStartOwn && !this.isOwn(at))) break;
      names.unshift(node.browseName.name);
      at = isTypeNode(node) ? undefined : this.#parentOf(node);
    }
    return names.join("/");
  }

  #parentOf(node: Node): NodeKey | undefined {
    const edges = this.parentEdges(node.key);
    const declared = "parent" in node ? node.parent : undefined;
    return edges.some((e) => e.source === declared) ? declared : edges[0]?.source;
  }

  /** Runs the check of a subject; what it reads is noted for it. */
  runAs(subject: Subject, run: () => void): void {
    if (this.#isTracked) this.#readAs({ subject, isEnded: false }, run);
    else run();
  }

  /**
   * Moves on to the next state of the model. `changed` are the keys of all own nodes that differ; ReferenceTypes and
   * required models are the same. Answers the subjects whose checks must run again.
   */
  update(after: AddressSpace, changed: readonly NodeKey[]): Set<Subject> {
    const before = this.#space;
    const dirty = new Set<Subject>();
    if (hasTwins(before)) this.#dirtyTwins(before, after, changed, dirty);
    this.#space = after;
    this.#twins = undefined;
    if (hasTwins(after)) this.#dirtyTwins(before, after, changed, dirty);
    if (before.own.header !== after.own.header) this.#drop("header", dirty);
    if (changed.length > 0) this.#drop("any node", dirty);
    for (const key of changed) this.#touch(key, before.own.nodes.get(key), after.own.nodes.get(key), dirty);
    return dirty;
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
    const view = this.#views.get(key);
    if (view?.node) {
      dropSlot(view.node, dirty);
      view.node = undefined;
    }
    for (const state of [old, node]) {
      if (!state) continue;
      this.#drop(`id ${formatNodeId(state.nodeId)}`, dirty);
      if (isTypeNode(state)) this.#drop(`type ${formatQualifiedName(state.browseName)}`, dirty);
      if (state.nodeClass === "DataType") this.#drop("data types", dirty);
    }
    if (old) removeTypeName(this.#typeNames, old);
    if (node) addTypeName(this.#typeNames, node);
    for (const edge of listMovedEdges(old, node)) {
      const group = this.#groupOf(edge.type);
      this.#dropEdges(edge.source, FROM + group, dirty);
      this.#dropEdges(edge.target, TO + group, dirty);
    }
  }

  #dropEdges(key: NodeKey, index: number, dirty: Set<Subject>): void {
    const edges = this.#views.get(key)?.edges;
    const slot = edges?.[index];
    if (!edges || !slot) return;
    dropSlot(slot, dirty);
    edges[index] = undefined;
  }

  #drop(name: string, dirty: Set<Subject>): void {
    const slot = this.#slots.get(name);
    if (slot) dropSlot(slot, dirty);
  }

  #note(name: string): void {
    if (!this.#reader) return;
    let slot = this.#slots.get(name);
    if (!slot) this.#slots.set(name, (slot = new Slot()));
    slot.note(this.#reader);
  }

  #view(key: NodeKey): View {
    if (key === this.#lastKey) return this.#lastView;
    let view = this.#views.get(key);
    if (!view) this.#views.set(key, (view = new View()));
    this.#lastKey = key;
    this.#lastView = view;
    return view;
  }

  #edges(key: NodeKey, direction: number, group: number): readonly Edge[] {
    const { edges } = this.#view(key);
    const slot = edges[direction + group] ?? this.#fillEdges(edges, key, direction, group);
    slot.note(this.#reader);
    return slot.edges;
  }

  #fillEdges(slots: View["edges"], key: NodeKey, direction: number, group: number): EdgeSlot {
    const bundles = this.#listBundles(key, direction);
    const size = bundles.reduce((sum, bundle) => sum + bundle.length, 0);
    if (size > HUB) return (slots[direction + group] = new EdgeSlot(this.#pick(bundles, group)));
    for (const each of [SUBTYPE, HIERARCHICAL, OTHER])
      slots[direction + each] ??= new EdgeSlot(this.#pick(bundles, each));
    return slots[direction + group] ?? new EdgeSlot(NO_EDGES);
  }

  #listBundles(key: NodeKey, direction: number): (readonly Edge[])[] {
    const bundles: (readonly Edge[])[] = [];
    for (const layer of this.#space.layers) {
      const bundle = (direction === FROM ? layer.outgoing : layer.incoming).get(key);
      if (bundle) bundles.push(bundle.distinct);
    }
    return bundles;
  }

  #pick(bundles: readonly (readonly Edge[])[], group: number): readonly Edge[] {
    let found: Edge[] | undefined;
    for (const bundle of bundles) {
      for (const edge of bundle) {
        if (this.#groupOf(edge.type) !== group) continue;
        if (found) found.push(edge);
        else found = [edge];
      }
    }
    if (!found) return NO_EDGES;
    return bundles.length > 1 ? listDistinctEdges(found) : found;
  }

  #groupOf(type: NodeKey): number {
    if (type === StandardReferenceType.HasSubtype) return SUBTYPE;
    return this.#hierarchical.has(type) ? HIERARCHICAL : OTHER;
  }

  #readAs<T>(reader: Computation, run: () => T): T {
    const outer = this.#reader;
    this.#reader = reader;
    try {
      return run();
    } finally {
      this.#reader = outer;
    }
  }
}
