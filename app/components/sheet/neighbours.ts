/** What lies around a node, for drawing it beside it. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { hasValueAttributes } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardModellingRule, StandardReferenceType } from "~/domain/address-space/standard-ids";

const MOST = 40;
const RULES = new Set<NodeKey>(Object.values(StandardModellingRule));

/** Nodes that a reference leads to or comes from; modelling rules are shown as cardinalities, so they are left out. */
export function listNeighbours(space: AddressSpace, key: NodeKey): NodeKey[] {
  const found = new Set<NodeKey>();
  for (const edge of space.edgesFrom(key)) if (!RULES.has(edge.target)) found.add(edge.target);
  for (const edge of space.edgesTo(key)) if (space.isOwn(edge.source)) found.add(edge.source);
  return [...found].slice(0, MOST);
}

/** Own nodes that need this one: its instances and subtypes, and Variables of this DataType. */
export function listUsers(space: AddressSpace, key: NodeKey): NodeKey[] {
  const found = new Set<NodeKey>();
  for (const edge of space.edgesTo(key)) {
    const isUse = edge.type === StandardReferenceType.HasTypeDefinition || edge.type === StandardReferenceType.HasSubtype || edge.type === StandardReferenceType.HasInterface;
    if (space.isOwn(edge.source) && isUse) found.add(edge.source);
  }
  for (const edge of space.edgesFrom(key)) if (edge.type === StandardReferenceType.HasSubtype && space.isOwn(edge.target)) found.add(edge.target);
  if (space.getNode(key)?.nodeClass === "DataType") {
    for (const node of space.listOwnNodes()) if (hasValueAttributes(node) && node.dataType === key) found.add(node.key);
  }
  return [...found].slice(0, MOST);
}
