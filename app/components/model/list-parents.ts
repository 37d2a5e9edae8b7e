/** Nodes below which members may be added, for a list of choices. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findTypeDefinition } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardObject, StandardType } from "~/domain/address-space/standard-ids";
import { isDeclarationParent } from "~/domain/editing/placement";
import { listOwnByClass } from "./list-roots";
import { formatPath, getNodeName } from "./member-facts";

export type ParentChoice = { readonly key: NodeKey; readonly label: string };

const MOST = 500;

/** Own types and Objects, then the folders of required models where machines are entered. */
export function listParents(space: AddressSpace): ParentChoice[] {
  const own = listOwnByClass(space, ["ObjectType", "VariableType", "Object"]).filter((node) => {
    if (node.nodeClass === "ObjectType" || node.nodeClass === "VariableType") return true;
    if (node.nodeClass !== "Object") return false;
    const type = findTypeDefinition(space, node.key);
    return type !== StandardType.DataTypeEncodingType && type !== StandardType.NamespaceMetadataType;
  });
  const entries = listEntryFolders(space);
  return [
    ...own.slice(0, MOST).map((node) => ({ key: node.key, label: formatPath(space, node.key) })),
    ...entries.map((key) => ({ key, label: `${getNodeName(space, key)} (standard folder)` })),
  ];
}

/** The Objects folder, and the Objects of required models that stand directly below it: Machines, DeviceSet and their like. */
function listEntryFolders(space: AddressSpace): NodeKey[] {
  const { ObjectsFolder } = StandardObject;
  if (!space.getNode(ObjectsFolder)) return [];
  const below = space.edgesFrom(ObjectsFolder).flatMap((edge) => {
    const node = space.getNode(edge.target);
    return node?.nodeClass === "Object" && !space.isOwn(node.key) && !HIDDEN.has(node.browseName.name) ? [node.key] : [];
  });
  return [ObjectsFolder, ...new Set(below)];
}

/** Parts of every server that hold no machines (OPC 10000-5 §8.2). */
const HIDDEN = new Set(["Server", "Aliases", "Locations", "Quantities"]);

/** Whether children of the node carry modelling rules: it is a type, or an instance declaration in one. */
export function isInType(space: AddressSpace, key: NodeKey | undefined): boolean {
  const node = key === undefined ? undefined : space.getNode(key);
  return node !== undefined && isDeclarationParent(space, node);
}
