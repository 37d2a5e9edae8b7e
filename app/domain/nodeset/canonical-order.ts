/**
 * The canonical order of nodes, which depends on nothing but their content: ReferenceTypes, DataTypes with their
 * encodings, VariableTypes, ObjectTypes, then instances; supertypes before subtypes, owners before what they own, else
 * by NodeId. Loaders that read in one pass need no second look with it.
 */
import type { Node, NodeClass } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";

const CLASS_ORDER: readonly NodeClass[] = [
  "ReferenceType",
  "DataType",
  "VariableType",
  "ObjectType",
  "Object",
  "Variable",
  "Method",
  "View",
];

const OWNING: ReadonlySet<NodeKey> = new Set<NodeKey>([
  StandardReferenceType.HasSubtype,
  StandardReferenceType.HasProperty,
  StandardReferenceType.HasComponent,
  StandardReferenceType.HasOrderedComponent,
  StandardReferenceType.HasAddIn,
  StandardReferenceType.HasEncoding,
  StandardReferenceType.Organizes,
]);

export function toCanonicalOrder(nodes: readonly Node[]): Node[] {
  const byKey = new Map(nodes.map((node) => [node.key, node]));
  const owners = findOwners(nodes, byKey);
  const owned = new Map<NodeKey | undefined, Node[]>();
  for (const node of nodes) {
    const owner = owners.get(node.key);
    const list = owned.get(owner);
    if (list) list.push(node);
    else owned.set(owner, [node]);
  }
  for (const list of owned.values()) list.sort(compareNodes);
  const sorted: Node[] = [];
  const done = new Set<NodeKey>();
  for (const root of owned.get(undefined) ?? []) emit(root, owned, sorted, done);
  // What stands in a circle of owners has no root.
  for (const node of [...nodes].sort(compareNodes)) emit(node, owned, sorted, done);
  return sorted;
}

/** Depth first without recursion: models can be deep. Types below a type come after its members. */
function emit(root: Node, owned: ReadonlyMap<NodeKey | undefined, Node[]>, sorted: Node[], done: Set<NodeKey>): void {
  const stack = [root];
  for (let node = stack.pop(); node !== undefined; node = stack.pop()) {
    if (done.has(node.key)) continue;
    done.add(node.key);
    sorted.push(node);
    const children = owned.get(node.key) ?? [];
    for (const child of children.toReversed()) if (child.nodeClass.endsWith("Type")) stack.push(child);
    for (const child of children.toReversed()) if (!child.nodeClass.endsWith("Type")) stack.push(child);
  }
}

function findOwners(nodes: readonly Node[], byKey: ReadonlyMap<NodeKey, Node>): Map<NodeKey, NodeKey> {
  const owners = new Map<NodeKey, NodeKey>();
  const claim = (child: NodeKey, owner: NodeKey): void => {
    if (!owners.has(child) && child !== owner && byKey.has(owner) && byKey.has(child)) owners.set(child, owner);
  };
  for (const node of nodes) if ("parent" in node && node.parent !== undefined) claim(node.key, node.parent);
  for (const node of nodes) {
    for (const { type, target, isForward, serverUri } of node.references) {
      if (!isForward && serverUri === undefined && OWNING.has(type)) claim(node.key, target);
    }
  }
  for (const node of nodes) {
    for (const { type, target, isForward, serverUri } of node.references) {
      if (isForward && serverUri === undefined && OWNING.has(type)) claim(target, node.key);
    }
  }
  return owners;
}

function compareNodes(a: Node, b: Node): number {
  return (
    CLASS_ORDER.indexOf(a.nodeClass) - CLASS_ORDER.indexOf(b.nodeClass) ||
    compareText(a.nodeId.namespaceUri, b.nodeId.namespaceUri) ||
    compareText(a.nodeId.type, b.nodeId.type) ||
    compareIdentifiers(a.nodeId.identifier, b.nodeId.identifier) ||
    compareText(formatNodeId(a.nodeId), formatNodeId(b.nodeId))
  );
}

function compareIdentifiers(a: number | string, b: number | string): number {
  return typeof a === "number" && typeof b === "number" ? a - b : compareText(String(a), String(b));
}

/** By UTF-16 units: the same on every machine, unlike an order by locale. */
function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
