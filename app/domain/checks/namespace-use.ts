/** Whether a node uses a namespace, in an id, a name or its value. Keys are the NodeId texts of first sight. */
import type { Node } from "../address-space/node";
import { formatNodeId, numericNodeId } from "../address-space/node-id";

export function usesNamespace(node: Node, namespaceUri: string): boolean {
  const id = formatNodeId(numericNodeId(namespaceUri, 0));
  const prefix = id.slice(0, id.lastIndexOf("i=0"));
  const isIn = (key: string | undefined): boolean => key?.startsWith(prefix) ?? false;
  if (node.browseName.namespaceUri === namespaceUri || node.nodeId.namespaceUri === namespaceUri) return true;
  if (node.references.some((r) => isIn(r.target) || isIn(r.type))) return true;
  if ("dataType" in node && isIn(node.dataType)) return true;
  if ("value" in node && node.value?.xml.includes(namespaceUri)) return true;
  if ("definition" in node && node.definition?.fields.some((f) => isIn(f.dataType))) return true;
  return "methodDeclaration" in node && isIn(node.methodDeclaration);
}
