/** NodeIds on the wire carry an index into the server's table of namespaces; everywhere else in Ferrule they carry the URI. */
import { coerceNodeId, NodeId, NodeIdType } from "node-opcua";
import { ok, fail, problem, type Result } from "~/domain/core/result";
import { formatNodeId, OPC_UA_NAMESPACE, parseNodeId, type IdentifierType } from "~/domain/address-space/node-id";

const TYPE_OF: Readonly<Record<NodeIdType, IdentifierType>> = {
  [NodeIdType.NUMERIC]: "i",
  [NodeIdType.STRING]: "s",
  [NodeIdType.GUID]: "g",
  [NodeIdType.BYTESTRING]: "b",
};

/** The wire form of `nsu=` text. Problems: those of parseNodeId, and `endpoint.namespace-unknown` when the server has no such namespace. */
export function toWireNodeId(text: string, namespaceArray: readonly string[]): Result<NodeId> {
  const parsed = parseNodeId(text, namespaceArray);
  if (!parsed.ok) return parsed;
  const { namespaceUri, type, identifier } = parsed.value;
  const index = namespaceUri === OPC_UA_NAMESPACE ? 0 : namespaceArray.indexOf(namespaceUri);
  if (index < 0) return fail(problem("endpoint.namespace-unknown", { namespaceUri }));
  switch (type) {
    case "i":
      return ok(new NodeId(NodeIdType.NUMERIC, identifier, index));
    case "s":
      return ok(new NodeId(NodeIdType.STRING, identifier, index));
    case "b":
      return ok(new NodeId(NodeIdType.BYTESTRING, Buffer.from(String(identifier), "base64"), index));
    case "g":
      return ok(coerceNodeId(`ns=${index};g=${String(identifier).toUpperCase()}`));
  }
}

/** The `nsu=` text of a NodeId from the wire; an index beyond the table stays an index, so that nothing wrong is claimed. */
export function fromWireNodeId(id: NodeId, namespaceArray: readonly string[]): string {
  const type = TYPE_OF[id.identifierType];
  const identifier =
    type === "b" ? Buffer.from(id.value as Buffer).toString("base64") : type === "g" ? String(id.value).toLowerCase() : (id.value as number | string);
  if (id.namespace === 0) return formatNodeId({ namespaceUri: OPC_UA_NAMESPACE, type, identifier });
  const namespaceUri = namespaceArray[id.namespace];
  return namespaceUri === undefined ? `ns=${id.namespace};${type}=${identifier}` : formatNodeId({ namespaceUri, type, identifier });
}
