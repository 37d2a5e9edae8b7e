/**
 * What a sheet shows before anybody chose: for a model of types its own types with their supertypes, interfaces, the groups
 * and methods that they are made of; for a model of machines the machines below the folder that organises them.
 */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent, findTypeDefinition, listMembers } from "~/domain/address-space/browse";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { formatQualifiedName } from "~/domain/address-space/qualified-name";
import { StandardType } from "~/domain/address-space/standard-ids";
import { findSupertype, listSupertypes } from "~/domain/address-space/type-hierarchy";
import { isEntryObject, listOwnByClass } from "../model/list-roots";
import { listInterfaces } from "../model/member-facts";

const MOST_CARDS = 80;
const MOST_METHODS = 4;
const FEWEST_ROWS = 3;

/** Keys in the order in which a reader meets them. */
export function listDefaultCards(space: AddressSpace): NodeKey[] {
  const shown = new Set<NodeKey>();
  const own = listOwnByClass(space, ["ObjectType", "VariableType", "DataType", "ReferenceType", "Object"]);
  for (const node of own) {
    if (node.nodeClass === "ObjectType" || node.nodeClass === "VariableType") addTypeCards(space, node, shown);
    if (shown.size >= MOST_CARDS) break;
  }
  for (const node of own) {
    if (shown.size >= MOST_CARDS) break;
    if (node.nodeClass === "DataType" || node.nodeClass === "ReferenceType") shown.add(node.key);
    else if (node.nodeClass === "Object" && isEntryObject(space, node.key)) addEntryCards(space, node.key, shown);
  }
  return [...shown];
}

function addTypeCards(space: AddressSpace, type: Node, shown: Set<NodeKey>): void {
  shown.add(type.key);
  const supertype = findSupertype(space, type.key);
  if (supertype !== undefined) shown.add(supertype);
  for (const key of listInterfaces(space, type.key)) shown.add(key);
  const members = listMembers(space, type.key);
  for (const member of members) {
    if (member.nodeClass === "Object" && isGroup(space, member)) shown.add(member.key);
  }
  // Methods stand beside a type that has other members to list; else its card would be empty.
  const methods = members.filter((member) => member.nodeClass === "Method");
  const listed = members.filter((member) => !shown.has(member.key)).length - methods.length;
  if (listed >= FEWEST_ROWS && methods.length <= MOST_METHODS) for (const method of methods) shown.add(method.key);
}

/** A plain Object, empty or not, and one that is more than an instance of its type: it has members that the type does not declare. */
function isGroup(space: AddressSpace, node: Node): boolean {
  const type = findTypeDefinition(space, node.key);
  if (type === StandardType.BaseObjectType) return true;
  const declared = new Set<string>();
  if (type !== undefined) {
    for (const key of [type, ...listSupertypes(space, type)]) {
      for (const member of listMembers(space, key)) declared.add(formatQualifiedName(member.browseName));
    }
  }
  return listMembers(space, node.key).some((member) => !declared.has(formatQualifiedName(member.browseName)));
}

function addEntryCards(space: AddressSpace, key: NodeKey, shown: Set<NodeKey>): void {
  const parent = findParent(space, key);
  if (parent !== undefined) shown.add(parent);
  shown.add(key);
}
