/**
 * The memory of what was read of an address space. Every answer sits in a slot (slots.ts); after an edit `update` drops the
 * slots that the edit can have changed and answers the subjects that must be checked again, nothing else. Slots are fine
 * where many nodes meet: edges are kept apart by direction and by group (HasSubtype, other hierarchical, rest), so that a
 * new instance does not disturb those who only asked for its type's supertype.
 */
import type { AddressSpace } from "../address-space/address-space";
import { listDistinctEdges, type Edge } from "../address-space/edge-index";
import type { Node, NodeClass } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";
import { getReferenceTypes } from "../address-space/type-hierarchy";
import { listMovedEdges } from "./moved-edges";
import { Answer, dropSlot, Slot, SubjectReader, type Reader, type Subject } from "./slots";
import { ClassSlot, EdgeSlot, FROM, HIERARCHICAL, NodeSlot, OTHER, SUBTYPE, TO, View } from "./views";

const NO_EDGES: readonly Edge[] = [];
const GROUPS: readonly number[] = [SUBTYPE, HIERARCHICAL, OTHER];
const NOTHING_THERE = new EdgeSlot(NO_EDGES);

/** Up to this many edges all groups are sorted out in one go; of hubs (PropertyType, Mandatory) only what is asked for. */
const HUB = 64;

/** A question worth remembering about one node, asked of a `C`. */
export type Lookup<C, T> = { readonly number: number; readonly compute: (context: C, key: NodeKey) => T };

export class GraphMemory {
  space: AddressSpace;
  readonly #views = new Map<NodeKey, View>();
  /** Checks ask for the same node many times in a row. */
  #lastKey: NodeKey | undefined;
  #lastView = new View();
  /** Slots of questions that are not about one node: who has a name, who has an id, who uses a namespace. */
  readonly #slots = new Map<string, Slot>();
  readonly #groups: ReadonlyMap<NodeKey, number>;
  readonly #isTracked: boolean;
  #reader: Reader | undefined;

  /** Without tracking reads are not noted, which a single full run does not need; `update` then must not be called. */
  constructor(space: AddressSpace, isTracked: boolean) {
    this.space = space;
    this.#isTracked = isTracked;
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
    const view = this.#view(key);
    const slot = (view.nodeClass ??= new ClassSlot(this.space.getNode(key)?.nodeClass));
    if (this.#reader) slot.note(this.#reader);
    return slot.nodeClass;
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
    const answer = answers[lookup.number] ?? this.#answer(lookup, context, key, answers);
    if (this.#reader) answer.note(this.#reader);
    return answer.value as T;
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
    if (view?.node) {
      dropSlot(view.node, dirty);
      view.node = undefined;
    }
    if (view?.nodeClass && old?.nodeClass !== node?.nodeClass) {
      dropSlot(view.nodeClass, dirty);
      view.nodeClass = undefined;
    }
    for (const edge of listMovedEdges(old, node)) {
      const group = this.#groupOf(edge.type);
      this.#dropEdges(edge.source, FROM + group, dirty);
      this.#dropEdges(edge.target, TO + group, dirty);
    }
  }

  #answer<C, T>(lookup: Lookup<C, T>, context: C, key: NodeKey, answers: (Answer | undefined)[]): Answer {
    const { number } = lookup;
    const answer = new Answer(answers, number);
    answer.value = this.#isTracked
      ? this.#readAs(answer, () => lookup.compute(context, key))
      : lookup.compute(context, key);
    answers[number] = answer;
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
    let view = this.#views.get(key);
    if (!view) this.#views.set(key, (view = new View()));
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
    for (const layer of this.space.layers) {
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
