/**
 * Tags: the few questions that are asked of a whole model at once (who has this NodeId, this type name), answered from
 * an index that each edit moves by one node. Layers beneath are indexed once and shared.
 */
import type { Layer } from "../address-space/address-space";
import { isTypeNode, type Node } from "../address-space/node";
import { formatNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName, type QualifiedName } from "../address-space/qualified-name";

export type Tag = string;

export const tagOf = {
  nodeId: (id: NodeId): Tag => `id ${formatNodeId(id)}`,
  typeName: (name: QualifiedName): Tag => `type ${formatQualifiedName(name)}`,
};

export function listTags(node: Node): Tag[] {
  const tags = [tagOf.nodeId(node.nodeId)];
  if (isTypeNode(node)) tags.push(tagOf.typeName(node.browseName));
  return tags;
}

/** A layer finds NodeIds by itself, so that only names of types are gathered here. */
const layerTags = new WeakMap<Layer, ReadonlyMap<Tag, readonly NodeKey[]>>();

export function getLayerTags(layer: Layer): ReadonlyMap<Tag, readonly NodeKey[]> {
  const known = layerTags.get(layer);
  if (known) return known;
  const index = new Map<Tag, NodeKey[]>();
  for (const node of layer.nodes.values()) {
    if (!isTypeNode(node)) continue;
    const tag = tagOf.typeName(node.browseName);
    const keys = index.get(tag);
    if (keys) keys.push(node.key);
    else index.set(tag, [node.key]);
  }
  layerTags.set(layer, index);
  return index;
}
