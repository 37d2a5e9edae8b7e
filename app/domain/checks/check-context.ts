/**
 * What rules see of an address space, and the memory of what they saw.
 *
 * Every answer sits in a slot (slots.ts). After an edit, `update` drops the slots that the edit can have changed and
 * answers the checks that must run again, nothing else. Slots are fine where many nodes meet: edges are kept apart by
 * direction and by group (HasSubtype, other hierarchical, rest), so that a new instance does not disturb those who only
 * asked for its type's supertype.
 */
import type { AddressSpace, Layer } from "../address-space/address-space";
import { isSameEdge, listDeclaredEdges, listDistinctEdges, type Edge } from "../address-space/edge-index";
import type { ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import { formatNodeId, parseNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import type { QualifiedName } from "../address-space/qualified-name";
import { StandardReferenceType } from "../address-space/standard-ids";
import { getReferenceTypes } from "../address-space/type-hierarchy";
import { dropSlot, newSlot, noteRead, type Computation, type Slot, type Subject } from "./slots";
import { getLayerTags, listTags, tagOf, type Tag } from "./tags";

/** HasSubtype, other hierarchical references, the rest. */
type EdgeGroup = 0 | 1 | 2;
const SUBTYPE: EdgeGroup = 0;
const HIERARCHICAL: EdgeGroup = 1;
const OTHER: EdgeGroup = 2;

type Direction = "outgoing" | "incoming";
class NodeSlot implements Slot {
  readers: Computation[] = [];
  lastReader: Computation | undefined = undefined;
  readonly node: Node | undefined;

  constructor(node: Node | undefined) {
    this.node = node;
  }
}

class EdgeSlot implements Slot {
  readers: Computation[] = [];
  lastReader: Computation | undefined = undefined;
  readonly edges: readonly Edge[];

  constructor(edges: readonly Edge[]) {
    this.edges = edges;
  }
}

class Answer implements Slot {
  readers: Computation[] = [];
  lastReader: Computation | undefined = undefined;
  value: unknown = undefined;
}

/** All slots of one node. */
class View {
  node: NodeSlot | undefined = undefined;
  readonly outgoing: [EdgeSlot | undefined, EdgeSlot | undefined, EdgeSlot | undefined] = [
    undefined,
    undefined,
    undefined,
  ];
  readonly incoming: [EdgeSlot | undefined, EdgeSlot | undefined, EdgeSlot | undefined] = [
    undefined,
    undefined,
    undefined,
  ];
  readonly answers = new Map<object, Answer>();
}

const NO_EDGES: readonly Edge[] = [];

/** Up to this many edges all groups are sorted out in one go; of hubs (PropertyType, Mandatory) only what is asked for. */
const HUB = 64;

/** A lookup worth remembering. `compute` walks in loops and never asks itself for another key, so that cycles end. */
export type Lookup<T> = { readonly compute: (ctx: CheckContext, key: NodeKey) => T };

export class CheckContext {
  #space: AddressSpace;
  readonly #views = new Map<NodeKey, View>();
  /** Checks ask for the same node many times in a row. */
  #lastKey: NodeKey | undefined;
  #lastView = new View();
  readonly #ownTags = new Map<Tag, Set<NodeKey>>();
  readonly #tagSlots = new Map<Tag, Slot>();
  readonly #headerSlot = newSlot();
  readonly #hierarchical: ReadonlySet<NodeKey>;
  readonly #required: readonly Layer[];
  readonly #requiredUris: ReadonlySet<string>;
  #reader: Computation | undefined;

  readonly #isTracked: boolean;

  /** Without tracking reads are not noted, which a single full run does not need; `update` then must not be called. */
  constructor(space: AddressSpace, isTracked = true) {
    this.#space = space;
    this.#isTracked = isTracked;
    this.#hierarchical = getReferenceTypes(space, StandardReferenceType.HierarchicalReferences);
    this.#required = space.layers.slice(0, -1);
    this.#requiredUris = new Set(this.#required.flatMap((l) => l.header.models.map((m) => m.modelUri)));
    for (const node of space.own.nodes.values()) this.#retag(undefined, node);
  }

  node(key: NodeKey): Node | undefined {
    const view = this.#view(key);
    const slot = (view.node ??= new NodeSlot(this.#space.getNode(key)));
    noteRead(slot, this.#reader);
    return slot.node;
  }

  /** Edges from the node that are hierarchical, HasSubtype left out. */
  childEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, "outgoing", HIERARCHICAL);
  }

  /** Edges to the node that are hierarchical, HasSubtype left out. */
  parentEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, "incoming", HIERARCHICAL);
  }

  /** HasSubtype edges to the node; the supertypes are their sources. */
  supertypeEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, "incoming", SUBTYPE);
  }

  /** HasSubtype edges from the node; the subtypes are their targets. */
  subtypeEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, "outgoing", SUBTYPE);
  }

  /** Non-hierarchical edges from the node. */
  otherEdges(key: NodeKey): readonly Edge[] {
    return this.#edges(key, "outgoing", OTHER);
  }

  /** Non-hierarchical edges to the node. */
  otherEdgesTo(key: NodeKey): readonly Edge[] {
    return this.#edges(key, "incoming", OTHER);
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
    noteRead(this.#headerSlot, this.#reader);
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
  listTypesNamed(name: QualifiedName): NodeKey[] {
    const tag = tagOf.typeName(name);
    return [...this.#required.flatMap((layer) => getLayerTags(layer).get(tag) ?? []), ...this.#listOwnTagged(tag)];
  }

  /** Keys of all nodes with the NodeId, those of required models first. */
  listWithNodeId(id: NodeId): NodeKey[] {
    const text = formatNodeId(id);
    return [
      ...this.#required.flatMap((layer) => layer.keysByNodeId.get(text) ?? []),
      ...this.#listOwnTagged(tagOf.nodeId(id)),
    ];
  }

  #listOwnTagged(tag: Tag): NodeKey[] {
    let slot = this.#tagSlots.get(tag);
    if (!slot) this.#tagSlots.set(tag, (slot = newSlot()));
    noteRead(slot, this.#reader);
    const keys = this.#ownTags.get(tag);
    return !keys || keys.size === 0 ? [] : [...keys].sort();
  }

  /** Whether an id, a name or a value of an own node is in the namespace. */
  isNamespaceUsed(namespaceUri: string): boolean {
    return this.#listOwnTagged(tagOf.namespace(namespaceUri)).length > 0;
  }

  hasOwnDataTypes(): boolean {
    return this.#listOwnTagged(tagOf.dataTypes).length > 0;
  }

  /** Whether a loaded model defines the namespace; the own model counts. */
  isNamespaceLoaded(namespaceUri: string): boolean {
    return this.#requiredUris.has(namespaceUri) || this.header.models.some((m) => m.modelUri === namespaceUri);
  }

  lookUp<T>(lookup: Lookup<T>, key: NodeKey): T {
    const { answers } = this.#view(key);
    let answer = answers.get(lookup);
    if (!answer) {
      answer = this.#answer(lookup, key, answers);
      answers.set(lookup, answer);
    }
    noteRead(answer, this.#reader);
    return answer.value as T;
  }

  #answer(lookup: Lookup<unknown>, key: NodeKey, answers: Map<object, Answer>): Answer {
    const answer = new Answer();
    const computation: Computation = { answer, forget: () => void answers.delete(lookup), isEnded: false };
    answer.value = this.#readAs(computation, () => lookup.compute(this, key));
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

  /** Runs the check of a subject; what it reads is noted for it. */
  runAs(subject: Subject, run: () => void): void {
    this.#readAs({ subject, isEnded: false }, run);
  }

  /**
   * Moves on to the next state of the model. `changed` are the keys of all own nodes that differ; ReferenceTypes and
   * required models are the same. Answers the subjects whose checks must run again.
   */
  update(after: AddressSpace, changed: readonly NodeKey[]): Set<Subject> {
    const before = this.#space;
    this.#space = after;
    const dirty = new Set<Subject>();
    if (before.own.header !== after.own.header) dropSlot(this.#headerSlot, dirty);
    for (const key of changed) this.#touch(key, before.own.nodes.get(key), after.own.nodes.get(key), dirty);
    return dirty;
  }

  #touch(key: NodeKey, old: Node | undefined, node: Node | undefined, dirty: Set<Subject>): void {
    const view = this.#views.get(key);
    if (view?.node) {
      dropSlot(view.node, dirty);
      view.node = undefined;
    }
    for (const tag of this.#retag(old, node)) {
      const slot = this.#tagSlots.get(tag);
      if (slot) dropSlot(slot, dirty);
    }
    for (const edge of listMovedEdges(old, node)) {
      const group = this.#groupOf(edge.type);
      this.#dropEdges(edge.source, "outgoing", group, dirty);
      this.#dropEdges(edge.target, "incoming", group, dirty);
    }
  }

  #dropEdges(key: NodeKey, direction: Direction, group: EdgeGroup, dirty: Set<Subject>): void {
    const slots = this.#views.get(key)?.[direction];
    const slot = slots?.[group];
    if (!slots || !slot) return;
    dropSlot(slot, dirty);
    slots[group] = undefined;
  }

  /** Moves a node's tags and answers those that it gained or lost. */
  #retag(old: Node | undefined, node: Node | undefined): Tag[] {
    const before = old ? listTags(old) : [];
    const after = node ? listTags(node) : [];
    const lost = before.filter((t) => !after.includes(t));
    const gained = after.filter((t) => !before.includes(t));
    for (const tag of lost) if (old) this.#ownTags.get(tag)?.delete(old.key);
    for (const tag of gained) {
      let keys = this.#ownTags.get(tag);
      if (!keys) this.#ownTags.set(tag, (keys = new Set()));
      if (node) keys.add(node.key);
    }
    return [...lost, ...gained];
  }

  #view(key: NodeKey): View {
    if (key === this.#lastKey) return this.#lastView;
    let view = this.#views.get(key);
    if (!view) this.#views.set(key, (view = new View()));
    this.#lastKey = key;
    this.#lastView = view;
    return view;
  }

  #edges(key: NodeKey, direction: Direction, group: EdgeGroup): readonly Edge[] {
    const slots = this.#view(key)[direction];
    const slot = slots[group] ?? this.#fillEdges(slots, key, direction, group);
    noteRead(slot, this.#reader);
    return slot.edges;
  }

  #fillEdges(slots: View[Direction], key: NodeKey, direction: Direction, group: EdgeGroup): EdgeSlot {
    const all: Edge[] = [];
    for (const layer of this.#space.layers) {
      const bundle = layer[direction].get(key);
      if (bundle) for (const edge of bundle.distinct) all.push(edge);
    }
    const groups = all.length > HUB ? [group] : ([SUBTYPE, HIERARCHICAL, OTHER] as const);
    for (const each of groups) {
      slots[each] ??= new EdgeSlot(
        all.length === 0 ? NO_EDGES : listDistinctEdges(all.filter((e) => this.#groupOf(e.type) === each)),
      );
    }
    return slots[group] as EdgeSlot;
  }

  #groupOf(type: NodeKey): EdgeGroup {
    if (type === StandardReferenceType.HasSubtype) return SUBTYPE;
    return this.#hierarchical.has(type) ? HIERARCHICAL : OTHER;
  }

  #readAs<T>(reader: Computation, run: () => T): T {
    if (!this.#isTracked) return run();
    const outer = this.#reader;
    this.#reader = reader;
    try {
      return run();
    } finally {
      this.#reader = outer;
    }
  }
}

/** The edges that a node's change can have moved: gained, lost, or all where their order may differ. */
function listMovedEdges(old: Node | undefined, node: Node | undefined): Edge[] {
  if (old && node && old.references === node.references && old.order === node.order) return [];
  const before = old ? listDeclaredEdges(old) : [];
  const after = node ? listDeclaredEdges(node) : [];
  const isReordered =
    old !== undefined && node !== undefined && (old.order !== node.order || !keepsOrder(before, after));
  if (isReordered) return [...before, ...after];
  return [
    ...before.filter((e) => !after.some((o) => isSameEdge(o, e))),
    ...after.filter((e) => !before.some((o) => isSameEdge(o, e))),
  ];
}

/** Whether the edges that both lists hold stand in one order. */
function keepsOrder(before: readonly Edge[], after: readonly Edge[]): boolean {
  const kept = before.filter((e) => after.some((o) => isSameEdge(o, e)));
  const keptAfter = after.filter((e) => before.some((o) => isSameEdge(o, e)));
  return (
    kept.length === keptAfter.length &&
    kept.every((e, i) => isSameEdge(e, keptAfter[i] ?? e) && keptAfter[i] !== undefined)
  );
}
