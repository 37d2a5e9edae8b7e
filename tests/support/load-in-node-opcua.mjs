/**
 * A process that loads NodeSets by node-opcua, the reference, and says which NodeIds it then finds. It prints nothing
 * itself, so that all that stands on its standard streams comes from node-opcua; the answer goes over the IPC channel.
 */
import { AddressSpace, generateAddressSpace, NodeId, NodeIdType } from "node-opcua";

process.once("message", async ({ files, nodeIds }) => {
  const addressSpace = AddressSpace.create();
  await generateAddressSpace(addressSpace, files);
  const missing = nodeIds.filter((id) => !find(addressSpace, id));
  addressSpace.dispose();
  process.send({ missing }, () => process.disconnect());
});

function find(addressSpace, { namespaceUri, type, identifier }) {
  const index = addressSpace.getNamespaceIndex(namespaceUri);
  const types = { i: NodeIdType.NUMERIC, s: NodeIdType.STRING, g: NodeIdType.GUID, b: NodeIdType.BYTESTRING };
  const value = type === "b" ? Buffer.from(identifier, "base64") : identifier;
  return index >= 0 && addressSpace.findNode(new NodeId(types[type], value, index)) !== null;
}
