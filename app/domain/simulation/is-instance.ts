import type { AddressSpace } from "../address-space/address-space";
import { findParent } from "../address-space/browse";
import { isTypeNode } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";

/**
 * Whether no type and no Method stands above the node: only then a client finds it as part of a machine. `known` is shared by
 * the questions of one walk.
 */
export function isInstance(space: AddressSpace, key: NodeKey, known: Map<NodeKey, boolean>): boolean {
  const trail = new Set<NodeKey>();
  let answer = true;
  for (let at: NodeKey | undefined = key; at !== undefined && !trail.has(at); at = findParent(space, at)) {
    const cached = known.get(at);
    const node = space.getNode(at);
    if (cached !== undefined) answer = cached;
    else if (node && (isTypeNode(node) || node.nodeClass === "Method")) answer = false;
    else if (node) {
      trail.add(at);
      continue;
    }
    break;
  }
  for (const visited of trail) known.set(visited, answer);
  return answer;
}
