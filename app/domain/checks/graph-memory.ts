/**
 * The memory of what was read of an address space. Every answer sits in a slot (slots.ts); after an edit `update` drops the
 * slots that the edit can have changed and answers the subjects that must be checked again, nothing else. Slots are fine
 * where many nodes meet: edges are kept apart by direction and by group (HasSubtype, other hierarchical, rest), so that a
 * new instance does not disturb those who only asked for its type's supertype.
 */
import type { AddressSpace, Layer } from "../address-space/address-space";
import { listDistinctEdges, type Edge } from "../address-space/edge-index";
import type { Node, NodeClass } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";
import { getReferenceTypes } from "../address-space/type-hierarchy";
import { listMovedEdges } from "./moved-edges";
import { Answer, dropSlot, Slot, SubjectReader, type Reader, type Subject } from "./slots";
import {
  ClassSlot,
  EdgeSlot,
  FROM,
  HeadSlot,
  HIERARCHICAL,
  NodeSlot,
  OTHER,
  SUBTYPE,
  TO,
  View,
  type NodeHead,
} from "./views";

const NO_EDGES: readonly Edge[] = [];
const GROUPS: readonly number[] = [SUBTYPE, HIERARCHICAL, OTHER];
const NOTHING_THERE = new EdgeSlot(NO_EDGES);

/** Up to this many edges all groups are sorted out in one go; of hubs (PropertyType, Mandatory) only what is asked for. */
const HUB = 64;

/** What is remembered where nothing is tracked, and the answer is undefined. */
const NO_ANSWER = Symbol("no answer");

/** A question worth remembering about one node, asked of a `C`. */
export type Lookup<C, T> = { readonly number: number; readonly compute: (context: C, key: NodeKey) => T };

export class GraphMemory {
  space: AddressSpace;
  readonly #views = new Map<NodeKey, View>();
  /** Checks ask for the same two nodes, a child and its parent, many times in turn. */
  #lastKey: NodeKey | undefined;
  #lastView = new View();
  #otherKey: NodeKey | undefined;
  #otherView = this.#lastView;
  /** Slots of questions that are not about one node: who has a name, who has an id, who uses a namespace. */
  readonly #slots = new Map<string, Slot>();
  readonly #groups: ReadonlyMap<NodeKey, number>;
  readonly #isTracked: boolean;
  /** Keys that required models name and do not have. */
  readonly #named: ReadonlySet<NodeKey>;
  #reader: Reader | undefined;

  /** Without tracking reads are not noted, which a single full run does not need; `update` then must not be called. */
  constructor(space: AddressSpace, isTracked: boolean) {
    this.space = space;
    this.#isTracked = isTracked;
    this.#named = new Set(space.layers.slice(0, -1).flatMap((layer) => listDangling(layer)));
    const hierarchical = getReferenceTypes(space, StandardReferenceType.HierarchicalReferences);
    this.#groups = new Map([
      ...[...hierarchical].map((type) => [type, HIERARCHICAL] as const),
      [StandardReferenceType.HasSubtype, SUBTYPE],
    ]);
  }

  node(key: NodeKey): Node | undefined {
    const view = this.#view(key);
    const slot = (view.node ??= new NodeSlot(this.space.getNode(key)));
    if (this.#reader) slot.note(this.#reader);
    return slot.node;
  }

  /** The NodeClass; undefined where there is no node. */
  classOf(key: NodeKey): NodeClass | undefined {
    if (!this.#isTracked) return this.node(key)?.nodeClass;
    const view = this.#view(key);
    const slot = (view.nodeClass ??= new ClassSlot(this.space.getNode(key)?.nodeClass));
    if (this.#reader) slot.note(this.#reader);
    return slot.nodeClass;
  }

  /** NodeClass and BrowseName of the node. */
  head(key: NodeKey): NodeHead | undefined {
    if (!this.#isTracked) return this.node(key);
    const view = this.#view(key);
    const slot = (view.head ??= new HeadSlot(this.space.getNode(key)));
    if (this.#reader) slot.note(this.#reader);
    return slot.head;
  }

  edges(key: NodeKey, direction: number, group: number): readonly Edge[] {
    const { edges } = this.#view(key);
    const slot = edges[direction + group] ?? this.#fillEdges(edges, key, direction, group);
    if (this.#reader) slot.note(this.#reader);
    return slot.edges;
  }

  isHierarchical(referenceType: NodeKey): boolean {
    return this.#groups.has(referenceType);
  }

  /** The answer for the key, remembered until something changes that it was made from. */
  lookUp<C, T>(lookup: Lookup<C, T>, context: C, key: NodeKey): T {
    const { answers } = this.#view(key);
    const { number } = lookup;
    let answer = answers[number];
    if (answer === undefined) {
      if (this.#isTracked) return this.#answer(lookup, context, key, answers).value as T;
      answer = lookup.compute(context, key) ?? NO_ANSWER;
      answers[number] = answer;
    }
    if (answer instanceof Answer) {
      if (this.#reader) answer.note(this.#reader);
      return answer.value as T;
    }
    return (answer === NO_ANSWER ? undefined : answer) as T;
  }

  /** Notes that the running check depends on something that has a name of its own; `drop` ends it. */
  note(name: string): void {
    if (!this.#reader) return;
    let slot = this.#slots.get(name);
    if (!slot) this.#slots.set(name, (slot = new Slot()));
    slot.note(this.#reader);
  }

  drop(name: string, dirty: Set<Subject>): void {
    const slot = this.#slots.get(name);
    if (slot) dropSlot(slot, dirty);
  }

  /** Runs the check of a subject; what it reads is noted for it. */
  runAs(subject: Subject, run: () => void): void {
    if (this.#isTracked) this.#readAs(new SubjectReader(subject), run);
    else run();
  }

  /** Drops what hangs on a node that changed: itself and the lists of edges at both ends that it moved. */
  touch(key: NodeKey, old: Node | undefined, node: Node | undefined, dirty: Set<Subject>): void {
    const view = this.#views.get(key);
    if (view) dropHead(view, old, node, dirty);
    for (const edge of listMovedEdges(old, node)) {
      const group = this.#groupOf(edge.type);
      this.#dropEdges(edge.source, FROM + group, dirty);
      this.#dropEdges(edge.target, TO + group, dirty);
    }
  }

  #answer<C, T>(lookup: Lookup<C, T>, context: C, key: NodeKey, answers: unknown[]): Answer {
    const answer = new Answer(answers, lookup.number);
    answer.value = this.#readAs(answer, () => lookup.compute(context, key));
    answers[lookup.number] = answer;
    if (this.#reader) answer.note(this.#reader);
    return answer;
  }

  #dropEdges(key: NodeKey, index: number, dirty: Set<Subject>): void {
    const edges = this.#views.get(key)?.edges;
    const slot = edges?.[index];
    if (!edges || !slot) return;
    dropSlot(slot, dirty);
    edges[index] = undefined;
  }

  #view(key: NodeKey): View {
    if (key === this.#lastKey) return this.#lastView;
    let view = key === this.#otherKey ? this.#otherView : this.#views.get(key);
    if (!view) this.#views.set(key, (view = new View()));
    this.#otherKey = this.#lastKey;
    this.#otherView = this.#lastView;
    this.#lastKey = key;
    this.#lastView = view;
    return view;
  }

  #fillEdges(slots: View["edges"], key: NodeKey, direction: number, group: number): EdgeSlot {
    const bundles = this.#listBundles(key, direction);
    const isHub = bundles.reduce((sum, bundle) => sum + bundle.length, 0) > HUB;
    const sorted: (Edge[] | undefined)[] = [undefined, undefined, undefined];
    for (const bundle of bundles) {
      for (const edge of bundle) {
        const its = this.#groupOf(edge.type);
        if (isHub && its !== group) continue;
        const list = sorted[its];
        if (list) list.push(edge);
        else sorted[its] = [edge];
      }
    }
    for (const each of isHub ? [group] : GROUPS) {
      slots[direction + each] ??= this.#toSlot(sorted[each], bundles.length > 1);
    }
    return slots[direction + group] ?? NOTHING_THERE;
  }

  /** An edge may be declared in two layers, at its two ends. */
  #toSlot(edges: readonly Edge[] | undefined, mayRepeat: boolean): EdgeSlot {
    if (edges) return new EdgeSlot(mayRepeat ? listDistinctEdges(edges) : edges);
    return this.#isTracked ? new EdgeSlot(NO_EDGES) : NOTHING_THERE;
  }

  #listBundles(key: NodeKey, direction: number): (readonly Edge[])[] {
    const bundles: (readonly Edge[])[] = [];
    const { layers, own } = this.space;
    // Required models hardly ever name nodes of models that require them.
    for (const layer of own.nodes.has(key) && !this.#named.has(key) ? [own] : layers) {
      const bundle = (direction === FROM ? layer.outgoing : layer.incoming).get(key);
      if (bundle) bundles.push(bundle.distinct);
    }
    return bundles;
  }

  #groupOf(type: NodeKey): number {
    return this.#groups.get(type) ?? OTHER;
  }

  #readAs<T>(reader: Reader, run: () => T): T {
    const outer = this.#reader;
    this.#reader = reader;
    try {
      return run();
    } finally {
      this.#reader = outer;
    }
  }
}

const dangling = new WeakMap<Layer, readonly NodeKey[]>();

/** Keys in the edges of a layer that are no nodes of it; layers beneath a model are shared, so each is asked once. */
function listDangling(layer: Layer): readonly NodeKey[] {
  let keys = dangling.get(layer);
  if (!keys) {
    const named = new Set([...layer.outgoing.keys(), ...layer.incoming.keys()]);
    dangling.set(layer, (keys = ([...named] as NodeKey[]).filter((key) => !layer.nodes.has(key))));
  }
  return keys;
}

/** Drops what was read of the node itself, as far as it differs. */
function dropHead(view: View, old: Node | undefined, node: Node | undefined, dirty: Set<Subject>): void {
  if (view.node) dropSlot(view.node, dirty);
  view.node = undefined;
  const isSameClass = old?.nodeClass === node?.nodeClass;
  if (view.nodeClass && !isSameClass) {
    dropSlot(view.nodeClass, dirty);
    view.nodeClass = undefined;
  }
  const isSameName =
    old?.browseName.name === node?.browseName.name && old?.browseName.namespaceUri === node?.browseName.namespaceUri;
  if (view.head && !(isSameClass && isSameName)) {
    dropSlot(view.head, dirty);
    view.head = undefined;
  }
}
