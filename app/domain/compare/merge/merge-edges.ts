/**
 * Edges of a merge: what either side added comes in, what either removed goes. Of a node's type definition, modelling rule
 * and owner there is one each, so two different changes to one of these are a conflict.
 */
import type { AddressSpace, Edge } from "../../address-space/address-space";
import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType } from "../../address-space/standard-ids";
import { isHierarchical } from "../../address-space/type-hierarchy";
import { conflictId, type MergeSide } from "./merge-conflict";
import type { MergeInput, Presence } from "./merge-presence";
import { listPlacedEdges, type PlacedEdge } from "./model-state";

type EdgeMap = ReadonlyMap<string, PlacedEdge>;

/** The edges of the merged model, by id, with the ends that declare them. */
export function mergeEdges(input: MergeInput, { kept, overruled }: Presence): Map<string, PlacedEdge> {
  const base = listPlacedEdges(input.base.nodes.values());
  const ours = listPlacedEdges(input.ours.nodes.values());
  const theirs = listPlacedEdges(input.theirs.nodes.values());
  const isThere = makePresenceTest(input, kept);
  const slots = decideSlots(input, base, ours, theirs, overruled);
  const merged = new Map<string, PlacedEdge>();
  for (const id of new Set([...ours.keys(), ...theirs.keys(), ...base.keys()])) {
    const edge = (ours.get(id) ?? theirs.get(id) ?? base.get(id))?.edge;
    if (!edge || !isThere(edge.source) || !isThere(edge.target)) continue;
    const slot = slotOf(input.spaces, edge);
    const side = slot === undefined ? undefined : slots.get(slot);
    const placed = side
      ? (side === "ours" ? ours : theirs).get(id)
      : mergeOne(id, base, ours, theirs, listOverruled(edge, overruled));
    if (placed) merged.set(id, placed);
  }
  return merged;
}

/** A node of another model counts as there; one of the own model as the merge decided. */
function makePresenceTest({ base, ours, theirs }: MergeInput, kept: readonly NodeKey[]): (key: NodeKey) => boolean {
  const keys = new Set(kept);
  return (key) => keys.has(key) || !(base.nodes.has(key) || ours.nodes.has(key) || theirs.nodes.has(key));
}

function listOverruled({ source, target }: Edge, overruled: Presence["overruled"]): ReadonlySet<MergeSide> {
  return new Set([overruled.get(source), overruled.get(target)].filter((side) => side !== undefined));
}

function mergeOne(
  id: string,
  base: EdgeMap,
  ours: EdgeMap,
  theirs: EdgeMap,
  ignored: ReadonlySet<MergeSide>,
): PlacedEdge | undefined {
  const b = base.get(id);
  const o = ignored.has("ours") ? (ours.get(id) ?? b) : ours.get(id);
  const t = ignored.has("theirs") ? (theirs.get(id) ?? b) : theirs.get(id);
  if (!b) return o && t ? { ...o, atSource: o.atSource || t.atSource, atTarget: o.atTarget || t.atTarget } : (o ?? t);
  if (!o || !t) return undefined;
  const isOursAsBefore = o.atSource === b.atSource && o.atTarget === b.atTarget;
  return isOursAsBefore ? t : o;
}

const { HasTypeDefinition, HasModellingRule } = StandardReferenceType;

type Spaces = MergeInput["spaces"];

/** The single place that an edge fills, undefined for edges of which there may be many. */
function slotOf({ base, ours, theirs }: Spaces, { source, type, target }: Edge): string | undefined {
  if (type === HasTypeDefinition) return conflictId("reference", source, "type definition");
  if (type === HasModellingRule) return conflictId("reference", source, "modelling rule");
  const space = [ours, theirs, base].find((s) => s.getNode(type));
  return space && isHierarchical(space, type) ? conflictId("reference", target, "owner") : undefined;
}

/** The slots that both sides filled anew in different ways, each with the side that holds. */
function decideSlots(
  input: MergeInput,
  base: EdgeMap,
  ours: EdgeMap,
  theirs: EdgeMap,
  overruled: Presence["overruled"],
): Map<string, MergeSide> {
  const { spaces, conflicts } = input;
  const [b, o, t] = [base, ours, theirs].map((edges) => groupBySlot(spaces, edges)) as [Slots, Slots, Slots];
  const decided = new Map<string, MergeSide>();
  for (const [slot, before] of b) {
    const [left, right] = [o.get(slot) ?? [], t.get(slot) ?? []];
    const [, key = "", what = ""] = slot.split("\u001f");
    if (overruled.has(key as NodeKey) || !isReplaced(before, left) || !isReplaced(before, right)) continue;
    if (isSameList(left, right)) continue;
    const nodeKey = key as NodeKey;
    const describe = (space: AddressSpace, edges: readonly Edge[]) =>
      edges.map((e) => nameOf(space, what, e)).join(", ") || null;
    decided.set(
      slot,
      conflicts.decide({
        id: slot,
        key: nodeKey,
        path: input.pathOf(nodeKey),
        what,
        base: describe(spaces.base, before),
        ours: describe(spaces.ours, left),
        theirs: describe(spaces.theirs, right),
      }),
    );
  }
  return decided;
}

type Slots = Map<string, Edge[]>;

function groupBySlot(spaces: Spaces, edges: EdgeMap): Slots {
  const slots: Slots = new Map();
  for (const { edge } of edges.values()) {
    const slot = slotOf(spaces, edge);
    if (slot === undefined) continue;
    const list = slots.get(slot);
    if (list) list.push(edge);
    else slots.set(slot, [edge]);
  }
  return slots;
}

/** Whether what filled the slot is gone and something else came. */
function isReplaced(before: readonly Edge[], now: readonly Edge[]): boolean {
  const has = (list: readonly Edge[], edge: Edge) =>
    list.some((e) => e.source === edge.source && e.type === edge.type && e.target === edge.target);
  return before.some((edge) => !has(now, edge)) && now.some((edge) => !has(before, edge));
}

function isSameList(a: readonly Edge[], b: readonly Edge[]): boolean {
  return a.length === b.length && !isReplaced(a, b);
}

function nameOf(space: AddressSpace, what: string, { source, target }: Edge): string {
  const key = what === "owner" ? source : target;
  return space.getNode(key)?.browseName.name ?? key;
}
