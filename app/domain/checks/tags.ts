/**
 * Tags: the few questions that are asked of a whole model at once (who has this NodeId, this type name), answered from
 * an index that each edit moves by one node. Layers beneath are indexed once and shared.
 */
import type { Layer } from "../address-space/address-space";
import { isTypeNode, type Node, type XmlText } from "../address-space/node";
import { formatNodeId, OPC_UA_NAMESPACE, parseNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { walkValue } from "./value-element";
import { findValueRoot } from "./value-xml";

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

/** Namespaces of ids, names and values, except namespace 0 and that of the node itself. Keys are NodeId texts when first seen. */
function listForeignNamespaces(node: Node): Set<string> {
  const found = new Set<string>([node.browseName.namespaceUri]);
  for (const { type, target } of node.references) {
    addNamespace(found, type);
    addNamespace(found, target);
  }
  if ("dataType" in node) addNamespace(found, node.dataType);
  if ("value" in node && node.value && MAY_NAME.test(node.value.xml)) addNamespacesOfValue(found, node.value);
  if ("definition" in node) for (const field of node.definition?.fields ?? []) addNamespace(found, field.dataType);
  if ("methodDeclaration" in node) addNamespace(found, node.methodDeclaration);
  found.delete(OPC_UA_NAMESPACE);
  found.delete(node.nodeId.namespaceUri);
  return found;
}

/** Most values name no namespace but 0 and need not be read for this. */
const MAY_NAME = /Identifier>[^<;]*;|NamespaceIndex/;

function addNamespace(found: Set<string>, nodeIdText: string | undefined): void {
  if (!nodeIdText?.includes(";")) return;
  const parsed = parseNodeId(nodeIdText, []);
  if (parsed.ok) found.add(parsed.value.namespaceUri);
}

function addNamespacesOfValue(found: Set<string>, value: XmlText): void {
  for (const element of walkValue(findValueRoot(value))) {
    if (element.name === "Identifier") addNamespace(found, element.text.trim());
    if (element.name === "NamespaceIndex") found.add(element.text.trim());
  }
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
