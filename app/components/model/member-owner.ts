/** To which node a new member goes, given what is selected. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";

/** The selected own Object or type; for a selected Variable or Method the node that holds it. Undefined where nothing own is selected. */
export function findMemberOwner(space: AddressSpace, selected: NodeKey | undefined): NodeKey | undefined {
  const seen = new Set<NodeKey>();
  for (let at = selected; at !== undefined && !seen.has(at); at = findParent(space, at)) {
    seen.add(at);
    const node = space.getNode(at);
    if (!node || !space.isOwn(at)) return undefined;
    if (node.nodeClass === "Object" || node.nodeClass === "ObjectType" || node.nodeClass === "VariableType") return at;
    if (node.nodeClass === "DataType" || node.nodeClass === "ReferenceType") return undefined;
  }
  return undefined;
}
