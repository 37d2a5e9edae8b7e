/**
 * Which nodes a merge keeps. A node that one side removed and the other left alone goes; where the other side changed it,
 * changed something below it or began to use it, the topmost removed owner is one conflict for all that hangs below.
 */
import { findParent } from "../../address-space/browse";
import type { AddressSpace } from "../../address-space/address-space";
import type { Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { toRowTarget } from "../../mapping/type-mapping";
import { conflictId, type ConflictList, type MergeSide } from "./merge-conflict";
import { isSameJson, type ModelState } from "./model-state";

export type MergeInput = {
  readonly spaces: { readonly base: AddressSpace; readonly ours: AddressSpace; readonly theirs: AddressSpace };
  readonly base: ModelState;
  readonly ours: ModelState;
  readonly theirs: ModelState;
  readonly conflicts: ConflictList;
  readonly pathOf: (key: NodeKey) => string;
};

export type Presence = {
  readonly kept: readonly NodeKey[];
  /** Nodes that one side removed and the merge keeps: what that side did to their edges does not count. */
  readonly overruled: ReadonlyMap<NodeKey, MergeSide>;
};

export function mergePresence(input: MergeInput): Presence {
  const { base, ours, theirs } = input;
  const kept: NodeKey[] = [];
  const overruled = new Map<NodeKey, MergeSide>();
  const gone = new Set<NodeKey>();
  for (const side of ["ours", "theirs"] as const) {
    for (const { keys, isKept } of decideRemovals(input, side)) {
      for (const key of keys) {
        if (isKept) overruled.set(key, side);
        else gone.add(key);
      }
    }
  }
  for (const key of new Set([...ours.nodes.keys(), ...theirs.nodes.keys(), ...base.nodes.keys()])) {
    const isThere = base.nodes.has(key) ? !gone.has(key) : true;
    if (isThere) kept.push(key);
  }
  return { kept, overruled };
}

type Removal = { readonly keys: readonly NodeKey[]; readonly isKept: boolean };

/** The removals of one side, grouped below their topmost removed owners. */
function decideRemovals(input: MergeInput, remover: MergeSide): Removal[] {
  const { base, conflicts } = input;
  const other = remover === "ours" ? "theirs" : "ours";
  const isRemoved = (key: NodeKey): boolean => base.nodes.has(key) && !input[remover].nodes.has(key);
  const groups = new Map<NodeKey, NodeKey[]>();
  for (const key of base.nodes.keys()) {
    if (!isRemoved(key)) continue;
    const top = findTop(input.spaces.base, key, isRemoved);
    groups.set(top, [...(groups.get(top) ?? []), key]);
  }
  const used = listNewMentions(base, input[other]);
  return [...groups].map(([top, keys]): Removal => {
    const touched = keys.filter((key) => used.has(key) || isChanged(input, other, key));
    // Removed by both sides: nothing to decide.
    if (touched.length === 0)
      return { keys: keys.filter((key) => !input[other].nodes.has(key) || isRemoved(key)), isKept: false };
    const names = touched.slice(0, 5).map(input.pathOf).join(", ") + (touched.length > 5 ? " …" : "");
    const texts = { [remover]: null, [other]: `changed or used: ${names}` } as Record<MergeSide, string | null>;
    const chosen = conflicts.decide({
      id: conflictId("node", top),
      key: top,
      path: input.pathOf(top),
      what: "node",
      base: base.nodes.get(top)?.browseName.name ?? null,
      ours: texts.ours,
      theirs: texts.theirs,
    });
    return { keys, isKept: chosen === other };
  });
}

function findTop(space: AddressSpace, key: NodeKey, isRemoved: (key: NodeKey) => boolean): NodeKey {
  const seen = new Set<NodeKey>([key]);
  let top = key;
  for (
    let at = findParent(space, key);
    at !== undefined && isRemoved(at) && !seen.has(at);
    at = findParent(space, at)
  ) {
    seen.add(at);
    top = at;
  }
  return top;
}

/** A node that the other side removed too has not changed, and cannot stay. */
function isChanged({ base, ...sides }: MergeInput, side: MergeSide, key: NodeKey): boolean {
  const now = sides[side].nodes.get(key);
  return now !== undefined && !isSameJson(withoutOrder(base.nodes.get(key)), withoutOrder(now));
}

function withoutOrder(node: Node | undefined): unknown {
  return node && { ...node, order: 0 };
}

/** Nodes that a side names at places where the base did not. */
function listNewMentions(base: ModelState, side: ModelState): ReadonlySet<NodeKey> {
  const found = new Set<NodeKey>();
  for (const node of side.nodes.values()) {
    const old = base.nodes.get(node.key);
    if (old === node) continue;
    const before = new Set(old ? listMentions(old) : []);
    for (const key of listMentions(node)) if (!before.has(key)) found.add(key);
  }
  for (const [id, { owner, id: name, value }] of side.mapping) {
    const old = base.mapping.get(id);
    // A row is named by the Variable that it feeds, with a path behind the line break where a type gives the member.
    if (!old || !isSameJson(old.value, value))
      for (const key of [owner, toRowTarget(name).split("\n")[0]]) found.add(key as NodeKey);
  }
  return found;
}

/** Every node that a node names: in references, as DataType, owner, declaration, in fields and in values. */
export function listMentions(node: Node): NodeKey[] {
  const keys: NodeKey[] = [];
  for (const reference of node.references) {
    keys.push(reference.type);
    if (reference.serverUri === undefined) keys.push(reference.target);
  }
  if ("dataType" in node && node.dataType !== undefined) keys.push(node.dataType);
  if ("parent" in node && node.parent !== undefined) keys.push(node.parent);
  if ("methodDeclaration" in node && node.methodDeclaration !== undefined) keys.push(node.methodDeclaration);
  if (node.nodeClass === "DataType") {
    for (const field of node.definition?.fields ?? []) if (field.dataType !== undefined) keys.push(field.dataType);
  }
  for (const { role } of node.rolePermissions ?? []) keys.push(role);
  if ("value" in node && node.value) {
    for (const [, id] of node.value.xml.matchAll(/<(?:\w+:)?Identifier>\s*([^<]+?)\s*</g)) keys.push(id as NodeKey);
  }
  return keys;
}
