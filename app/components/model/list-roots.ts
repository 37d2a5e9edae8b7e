/** Where a model begins for a reader: its types, and the Objects by which clients enter it. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent, findTypeDefinition } from "~/domain/address-space/browse";
import { isTypeNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardObject, StandardType } from "~/domain/address-space/standard-ids";

/** Own types first, then where a client enters the model. */
export function listRoots(space: AddressSpace): NodeKey[] {
  const groups: Record<string, NodeKey[]> = { Object: [], ObjectType: [], VariableType: [], DataType: [], ReferenceType: [] };
  for (const node of space.listOwnNodes()) {
    if (node.nodeClass === "Object" ? isEntryObject(space, node.key) : node.nodeClass.endsWith("Type")) groups[node.nodeClass]?.push(node.key);
  }
  return ["ObjectType", "Object", "VariableType", "DataType", "ReferenceType"].flatMap((name) => groups[name] ?? []);
}

/** An own Object that hangs below a node of a required model: where a client enters. Namespace metadata and encodings are none. */
export function isEntryObject(space: AddressSpace, key: NodeKey): boolean {
  const parent = findParent(space, key);
  if (parent === undefined || parent === StandardObject.ServerNamespaces || space.isOwn(parent)) return false;
  const parentNode = space.getNode(parent);
  if (parentNode && isTypeNode(parentNode)) return false;
  const type = findTypeDefinition(space, key);
  return type !== StandardType.DataTypeEncodingType && type !== StandardType.NamespaceMetadataType;
}
