/** Types by BrowseName. Layers beneath a model are indexed once and shared; the own model's index moves with each edit. */
import type { Layer } from "../address-space/address-space";
import { isTypeNode, type Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { formatQualifiedName } from "../address-space/qualified-name";

export type TypeNames = Map<string, Set<NodeKey>>;

const shared = new WeakMap<Layer, TypeNames>();

export function getTypeNames(layer: Layer): TypeNames {
  let names = shared.get(layer);
  if (!names) shared.set(layer, (names = makeTypeNames(layer)));
  return names;
}

export function makeTypeNames(layer: Layer): TypeNames {
  const names: TypeNames = new Map();
  for (const node of layer.nodes.values()) addTypeName(names, node);
  return names;
}

export function addTypeName(names: TypeNames, node: Node): void {
  if (!isTypeNode(node)) return;
  const name = formatQualifiedName(node.browseName);
  const keys = names.get(name);
  if (keys) keys.add(node.key);
  else names.set(name, new Set([node.key]));
}

export function removeTypeName(names: TypeNames, node: Node): void {
  if (isTypeNode(node)) names.get(formatQualifiedName(node.browseName))?.delete(node.key);
}
