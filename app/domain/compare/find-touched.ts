/** Which matched nodes can differ at all: comparing the others would only find that nothing changed. */
import type { AddressSpace } from "../address-space/address-space";
import { findParent } from "../address-space/browse";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { isSameJson } from "./merge/model-state";
import type { NodeMatch } from "./match-nodes";

/**
 * Keys of the later state. What a node is depends on itself, on what others declare at it, and on its Properties; so a
 * node is touched when it changed, or when one that changed, came or went names it or belongs to it. Undefined when a
 * ReferenceType changed, which may touch every node.
 */
export function findTouched(
  before: AddressSpace,
  after: AddressSpace,
  match: NodeMatch,
): ReadonlySet<NodeKey> | undefined {
  const touched = new Set<NodeKey>();
  const touch = (space: AddressSpace, node: Node): void => {
    touched.add(match.toAfter(node.key));
    const owner = findParent(space, node.key);
    if (owner !== undefined) touched.add(match.toAfter(owner));
    for (const { target, serverUri } of node.references)
      if (serverUri === undefined) touched.add(match.toAfter(target));
  };
  let changesReferenceType = false;
  const note = (space: AddressSpace, node: Node): void => {
    changesReferenceType ||= node.nodeClass === "ReferenceType";
    touch(space, node);
  };
  for (const { before: old, after: now } of match.pairs) {
    if (isSameNode(old, now)) continue;
    note(before, old);
    note(after, now);
  }
  for (const node of match.removed) note(before, node);
  for (const node of match.added) note(after, node);
  for (const pair of match.reused) {
    touch(before, pair.before);
    touch(after, pair.after);
  }
  return changesReferenceType ? undefined : touched;
}

/** The place in the file says nothing (OPC 10000-6 §F.1). */
function isSameNode(a: Node, b: Node): boolean {
  return a === b || (a.key === b.key && isSameJson({ ...a, order: 0 }, { ...b, order: 0 }));
}
