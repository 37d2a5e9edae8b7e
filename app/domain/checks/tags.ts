/**
 * Tags: the few questions that are asked of a whole model at once (who has this NodeId, this type name), answered from
 * an index that each edit moves by one node. Layers beneath are indexed once and shared.
 */
import type { Layer } from "../address-space/address-space";
import { isTypeNode, type Node } from "../address-space/node";
import { formatNodeId, OPC_UA_NAMESPACE, type NodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName, type QualifiedName } from "../address-space/qualified-name";

export type Tag = string;

export const tagOf = {
  nodeId: (id: NodeId): Tag => `id ${formatNodeId(id)}`,
  typeName: (name: QualifiedName): Tag => `type ${formatQualifiedName(name)}`,
  /** A namespace that the node uses beside that of its own NodeId. */
  namespace: (uri: string): Tag => `ns ${uri}`,
  dataTypes: "data types",
};

export function listTags(node: Node): Tag[] {
  const tags = [tagOf.nodeId(node.nodeId)];
  if (isTypeNode(node)) tags.push(tagOf.typeName(node.browseName));
  if (node.nodeClass === "DataType") tags.push(tagOf.dataTypes);
  for (const uri of listForeignNamespaces(node)) tags.push(tagOf.namespace(uri));
  return tags;
}

const NAMESPACE_IN_KEY = /^nsu=([^;]*);/;

/** Namespaces of ids, names and values, except namespace 0 and that of the node itself. Keys are NodeId texts when first seen. */
function listForeignNamespaces(node: Node): Set<string> {
  const found = new Set<string>([node.browseName.namespaceUri]);
  const add = (key: string | undefined): void => {
    const uri = key === undefined ? undefined : NAMESPACE_IN_KEY.exec(key)?.[1];
    if (uri !== undefined) found.add(uri);
  };
  for (const { type, target } of node.references) {
    add(type);
    add(target);
  }
  if ("dataType" in node) add(node.dataType);
  if ("value" in node && node.value) for (const [, uri = ""] of node.value.xml.matchAll(URI_IN_VALUE)) found.add(uri);
  if ("definition" in node) for (const field of node.definition?.fields ?? []) add(field.dataType);
  if ("methodDeclaration" in node) add(node.methodDeclaration);
  found.delete(OPC_UA_NAMESPACE);
  found.delete(node.nodeId.namespaceUri);
  return found;
}

/** `<Identifier>nsu=URI;…` and `<NamespaceIndex>URI<` in values. */
const URI_IN_VALUE = /(?:>\s*nsu=|<(?:\w+:)?NamespaceIndex>\s*)([^;<\s]+)/g;

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
