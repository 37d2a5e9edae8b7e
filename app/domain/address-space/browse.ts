/** Short questions about one node and its neighbours, as an OPC UA client would browse them. */
import type { AddressSpace, Edge } from "./address-space";
import type { Node } from "./node";
import type { NodeKey } from "./node-id";
import { OPC_UA_NAMESPACE } from "./node-id";
import { findText } from "./qualified-name";
import { StandardReferenceType } from "./standard-ids";
import { getReferenceTypes } from "./type-hierarchy";

/** Edges from the node of a reference type or its subtypes. */
export function listEdgesFrom(space: AddressSpace, key: NodeKey, referenceType: NodeKey): Edge[] {
  const types = getReferenceTypes(space, referenceType);
  return space.edgesFrom(key).filter((e) => types.has(e.type));
}

/** Edges to the node of a reference type or its subtypes. */
export function listEdgesTo(space: AddressSpace, key: NodeKey, referenceType: NodeKey): Edge[] {
  const types = getReferenceTypes(space, referenceType);
  return space.edgesTo(key).filter((e) => types.has(e.type));
}

/** Members of a node: targets of HasComponent, HasProperty and their subtypes, loaded ones only. */
export function listMembers(space: AddressSpace, key: NodeKey): Node[] {
  return toNodes(space, listEdgesFrom(space, key, StandardReferenceType.Aggregates));
}

/** Targets of all hierarchical references but HasSubtype. */
export function listChildren(space: AddressSpace, key: NodeKey): Node[] {
  return toNodes(
    space,
    listEdgesFrom(space, key, StandardReferenceType.HierarchicalReferences).filter(
      (e) => e.type !== StandardReferenceType.HasSubtype,
    ),
  );
}

function toNodes(space: AddressSpace, edges: readonly Edge[]): Node[] {
  const seen = new Set<NodeKey>();
  const nodes: Node[] = [];
  for (const edge of edges) {
    const node = seen.has(edge.target) ? undefined : space.getNode(edge.target);
    if (!node) continue;
    seen.add(edge.target);
    nodes.push(node);
  }
  return nodes;
}

/** The node's owner: ParentNodeId where it is given and true, else the source of the first hierarchical reference. */
export function findParent(space: AddressSpace, key: NodeKey): NodeKey | undefined {
  const node = space.getNode(key);
  const edges = listEdgesTo(space, key, StandardReferenceType.HierarchicalReferences);
  const declared = node && "parent" in node ? node.parent : undefined;
  if (declared !== undefined && edges.some((e) => e.source === declared)) return declared;
  return (edges.find((e) => e.type !== StandardReferenceType.HasSubtype) ?? edges[0])?.source;
}

export function findTypeDefinition(space: AddressSpace, key: NodeKey): NodeKey | undefined {
  return space.edgesFrom(key).find((e) => e.type === StandardReferenceType.HasTypeDefinition)?.target;
}

export function findModellingRule(space: AddressSpace, key: NodeKey): NodeKey | undefined {
  return space.edgesFrom(key).find((e) => e.type === StandardReferenceType.HasModellingRule)?.target;
}

/** A Property by BrowseName. */
export function findProperty(
  space: AddressSpace,
  key: NodeKey,
  name: string,
  namespaceUri = OPC_UA_NAMESPACE,
): Node | undefined {
  for (const edge of listEdgesFrom(space, key, StandardReferenceType.HasProperty)) {
    const node = space.getNode(edge.target);
    if (node?.browseName.name === name && node.browseName.namespaceUri === namespaceUri) return node;
  }
  return undefined;
}

/** A member (component or Property) by BrowseName. */
export function findMember(space: AddressSpace, key: NodeKey, name: string, namespaceUri: string): Node | undefined {
  return listMembers(space, key).find((n) => n.browseName.name === name && n.browseName.namespaceUri === namespaceUri);
}

/** The name for people: DisplayName in the wanted language, else the BrowseName's name. */
export function getDisplayName(node: Node, locale?: string): string {
  return findText(node.displayName, locale) ?? node.browseName.name;
}

/**
 * Names from the topmost owner down to the node, for people: `RopeBraiderType/Process/SpindleSpeed`. Stops below the
 * standard's folders and where a cycle closes.
 */
export function getPath(space: AddressSpace, key: NodeKey): string {
  const names: string[] = [];
  const seen = new Set<NodeKey>();
  for (let at: NodeKey | undefined = key; at !== undefined && !seen.has(at);) {
    seen.add(at);
    const node = space.getNode(at);
    if (!node || (names.length > 0 && !space.isOwn(at) && space.isOwn(key))) break;
    names.unshift(node.browseName.name);
    at = node.nodeClass.endsWith("Type") ? undefined : findParent(space, at);
  }
  return names.join("/");
}
