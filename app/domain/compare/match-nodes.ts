/**
 * Which node of the later state is which node of the earlier one. First by NodeId, then by key (renumbered inside
 * Ferrule), then by path and kind below matched owners (renumbered elsewhere), then by the last name that fits alone
 * (moved and renumbered at once is recognised only when it is unambiguous).
 */
import type { AddressSpace } from "../address-space/address-space";
import { findParent, findTypeDefinition } from "../address-space/browse";
import { isTypeNode, type Node } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName } from "../address-space/qualified-name";
import { StandardReferenceType } from "../address-space/standard-ids";

export type NodePair = { readonly before: Node; readonly after: Node };

export type NodeMatch = {
  readonly pairs: readonly NodePair[];
  /** NodeIds that stand for another node now; either node may also be among the pairs, the removed or the added ones. */
  readonly reused: readonly NodePair[];
  readonly removed: readonly Node[];
  readonly added: readonly Node[];
  /** Key in the earlier state → key in the later one, also for nodes of required models (which keep theirs). */
  readonly toAfter: (key: NodeKey) => NodeKey;
};

export function matchNodes(before: AddressSpace, after: AddressSpace): NodeMatch {
  const earlier = before.listOwnNodes();
  const later = after.listOwnNodes();
  const byKey = new Map<NodeKey, NodeKey>();
  const taken = new Set<NodeKey>();
  const pairs: NodePair[] = [];
  const join = (old: Node, now: Node): void => {
    byKey.set(old.key, now.key);
    taken.add(now.key);
    pairs.push({ before: old, after: now });
  };

  const laterById = new Map(later.map((n) => [formatNodeId(n.nodeId), n]));
  for (const old of earlier) {
    const now = laterById.get(formatNodeId(old.nodeId));
    if (now && isSameKind(before, old, after, now)) join(old, now);
  }
  for (const old of earlier) {
    const now = byKey.has(old.key) ? undefined : after.own.nodes.get(old.key);
    if (now && !taken.has(now.key) && now.nodeClass === old.nodeClass) join(old, now);
  }
  const restByPlace = new Map<string, Node | undefined>();
  for (const now of later) {
    if (taken.has(now.key)) continue;
    const place = placeOf(after, now, (key) => key);
    restByPlace.set(place, restByPlace.has(place) ? undefined : now);
  }
  // Owners come before members in a model's order nearly always; a second round catches the rest.
  for (let round = 0; round < 2; round++) {
    for (const old of earlier) {
      if (byKey.has(old.key)) continue;
      const now = restByPlace.get(placeOf(before, old, (key) => byKey.get(key) ?? key));
      if (now && !taken.has(now.key)) join(old, now);
    }
  }
  // A node that kept its NodeId and little else is another node that took the number.
  const reused: NodePair[] = [];
  for (const old of earlier) {
    const now = laterById.get(formatNodeId(old.nodeId));
    if (now && byKey.get(old.key) !== now.key) reused.push({ before: old, after: now });
  }
  return {
    pairs,
    reused,
    removed: earlier.filter((n) => !byKey.has(n.key)),
    added: later.filter((n) => !taken.has(n.key)),
    toAfter: (key) => byKey.get(key) ?? key,
  };
}

/** One NodeId, one class: the same node, unless its name and its type are both others (a number that was used again). */
function isSameKind(before: AddressSpace, old: Node, after: AddressSpace, now: Node): boolean {
  if (old.nodeClass !== now.nodeClass) return false;
  if (formatQualifiedName(old.browseName) === formatQualifiedName(now.browseName)) return true;
  const sameType = findTypeDefinition(before, old.key) === findTypeDefinition(after, now.key);
  return sameType || findParent(before, old.key) === findParent(after, now.key);
}

/** A type is found by its name alone, since its supertype may change; an encoding belongs to its DataType. */
function placeOf(space: AddressSpace, node: Node, toAfter: (key: NodeKey) => NodeKey): string {
  const name = `${node.nodeClass}\n${formatQualifiedName(node.browseName)}`;
  if (isTypeNode(node)) return name;
  const owner =
    findParent(space, node.key) ??
    space.edgesTo(node.key).find((e) => e.type === StandardReferenceType.HasEncoding)?.source;
  return `${name}\n${owner === undefined ? "" : toAfter(owner)}`;
}
