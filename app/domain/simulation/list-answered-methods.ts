import type { AddressSpace, Layer } from "../address-space/address-space";
import { findParent } from "../address-space/browse";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { isInstance } from "./is-instance";

/**
 * NodeIds (`nsu=`) of the Methods of instances in these layers: a test server answers them, since a client that is tried out
 * should get typed results and not a refusal. Methods of types are left alone.
 */
export function listAnsweredMethods(space: AddressSpace, layers: readonly Layer[]): string[] {
  const known = new Map<NodeKey, boolean>();
  const found: string[] = [];
  for (const layer of layers) {
    for (const node of layer.nodes.values()) {
      const owner = node.nodeClass === "Method" ? findParent(space, node.key) : undefined;
      if (owner !== undefined && isInstance(space, owner, known)) found.push(formatNodeId(node.nodeId));
    }
  }
  return found.sort();
}
