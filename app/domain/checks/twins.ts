/** Own nodes that share a NodeId, which only broken files have. */
import type { AddressSpace } from "../address-space/address-space";
import { formatNodeId, type NodeKey } from "../address-space/node-id";

/** Whether two own nodes share a NodeId: then there are fewer NodeIds than nodes. */
export function hasTwins({ own }: AddressSpace): boolean {
  return own.keysByNodeId.size !== own.nodes.size;
}

export function groupByNodeId({ own }: AddressSpace): Map<string, NodeKey[]> {
  const groups = new Map<string, NodeKey[]>();
  for (const { key, nodeId } of own.nodes.values()) {
    const text = formatNodeId(nodeId);
    const keys = groups.get(text);
    if (keys) keys.push(key);
    else groups.set(text, [key]);
  }
  for (const keys of groups.values()) keys.sort();
  return groups;
}
