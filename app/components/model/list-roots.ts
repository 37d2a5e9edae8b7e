/** Where a model begins for a reader: its types, and the Objects by which clients enter it. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent, findTypeDefinition } from "~/domain/address-space/browse";
import { isTypeNode, type Node, type NodeClass } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardObject, StandardType } from "~/domain/address-space/standard-ids";

/** Own types first, then where a client enters the model. */
export function listRoots(space: AddressSpace): NodeKey[] {
  const own = listOwnByClass(space, ROOT_CLASSES);
  return ROOT_CLASSES.flatMap((nodeClass) =>
    own.flatMap((node) => (node.nodeClass === nodeClass && (nodeClass !== "Object" || isEntryObject(space, node.key)) ? [node.key] : [])),
  );
}

const ROOT_CLASSES: readonly NodeClass[] = ["ObjectType", "Object", "VariableType", "DataType", "ReferenceType"];

/** Own nodes of some classes in their order; most nodes of a model are Variables, so these are not sorted along. */
export function listOwnByClass(space: AddressSpace, classes: readonly NodeClass[]): Node[] {
  return [...space.own.nodes.values()].filter((node) => classes.includes(node.nodeClass)).sort((a, b) => a.order - b.order || (a.key < b.key ? -1 : 1));
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
