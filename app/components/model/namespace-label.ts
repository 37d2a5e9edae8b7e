/** Short names of namespaces for labels: the standard says that namespaces are told apart by a prefix, not by colour. */
import { OPC_UA_NAMESPACE, type NodeId } from "~/domain/address-space/node-id";

/** `UA` for namespace 0, else the last part of the URI's path: `http://example.org/UA/DI/` → `DI`. */
export function getNamespaceLabel(namespaceUri: string): string {
  if (namespaceUri === OPC_UA_NAMESPACE) return "UA";
  const parts = namespaceUri.split(/[/:#]+/).filter((part) => part !== "");
  return parts.at(-1) ?? namespaceUri;
}

/** The identifier without its namespace: `i=6012`. */
export function formatLocalNodeId(id: NodeId): string {
  return `${id.type}=${id.identifier}`;
}
