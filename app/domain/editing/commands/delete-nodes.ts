/**
 * Deleting nodes with all below them.
 *
 * `findDeletion(space, keys)` tells what would go and what else refers to it, for the question to the user;
 * `deleteNodes` does it. Below a node stands what it owns: children whose ParentNodeId names it, or that have no other
 * hierarchical parent, and the encodings of a DataType. What is merely organised or shared stays. References from other own
 * nodes are removed. What would be left without its type, supertype or DataType keeps the deletion back unless `allowUses`.
 */
import { listUses, type AddressSpace, type Edge } from "../../address-space/address-space";
import { listEdgesFrom, listEdgesTo } from "../../address-space/browse";
import { compareRank } from "../../address-space/edge-bundle";
import { listDeclaredEdges } from "../../address-space/edge-index";
import type { Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType } from "../../address-space/standard-ids";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";

const R = StandardReferenceType;

export type DeleteNodesIntent = { readonly nodes: readonly NodeKey[]; readonly allowUses?: boolean };

/** Another node that needs a deleted one. */
export type Use = {
  readonly user: NodeKey;
  readonly used: NodeKey;
  readonly kind: "type-definition" | "supertype" | "data-type" | "method-declaration" | "interface";
};

export type Deletion = {
  /** Everything that goes, children before parents. */
  readonly nodes: readonly NodeKey[];
  /** References of other own nodes that go with it. */
  readonly references: readonly Edge[];
  readonly uses: readonly Use[];
};

/** What deleting these nodes means. Foreign and missing keys are left out. */
export function findDeletion(space: AddressSpace, keys: readonly NodeKey[]): Deletion {
  const going = collectOwned(space, keys);
  const references: Edge[] = [];
  for (const key of going) {
    for (const edge of listUses(space.own, space.requireNode(key))) {
      const other = edge.source === key ? edge.target : edge.source;
      if (!going.has(other)) references.push(edge);
    }
  }
  return { nodes: [...going].reverse(), references, uses: listUsers(space, going) };
}

/** The nodes and what they own, owners first. */
function collectOwned(space: AddressSpace, keys: readonly NodeKey[]): Set<NodeKey> {
  const going = new Set(keys.filter((key) => space.isOwn(key)));
  for (const key of going) {
    for (const child of listOwned(space, key)) {
      if (isOwnedBy(space, child, going)) going.add(child);
    }
  }
  return going;
}

function listOwned(space: AddressSpace, key: NodeKey): NodeKey[] {
  const children = listEdgesFrom(space, key, R.HierarchicalReferences).filter((e) => e.type !== R.HasSubtype);
  return [...children, ...listEdgesFrom(space, key, R.HasEncoding)].map((e) => e.target).filter((k) => space.isOwn(k));
}

function isOwnedBy(space: AddressSpace, child: NodeKey, owners: ReadonlySet<NodeKey>): boolean {
  const node = space.requireNode(child);
  const parents = listEdgesTo(space, child, R.HierarchicalReferences).filter((e) => e.type !== R.HasSubtype);
  const declared = "parent" in node ? node.parent : undefined;
  if (declared !== undefined && parents.some((e) => e.source === declared)) return owners.has(declared);
  return parents.every((e) => owners.has(e.source));
}

function listUsers(space: AddressSpace, going: ReadonlySet<NodeKey>): Use[] {
  const uses: Use[] = [];
  for (const node of space.own.nodes.values()) {
    if (going.has(node.key)) continue;
    const add = (used: NodeKey | undefined, kind: Use["kind"]): void => {
      if (used !== undefined && going.has(used)) uses.push({ user: node.key, used, kind });
    };
    for (const edge of listDeclaredEdges(node)) {
      if (edge.type === R.HasTypeDefinition) add(edge.target, "type-definition");
      else if (edge.type === R.HasSubtype && edge.target === node.key) add(edge.source, "supertype");
      else if (edge.type === R.HasInterface) add(edge.target, "interface");
    }
    for (const dataType of listDataTypes(node)) add(dataType, "data-type");
    if (node.nodeClass === "Method") add(node.methodDeclaration, "method-declaration");
  }
  return uses.sort((a, b) => compareRank(space.requireNode(a.user), space.requireNode(b.user)));
}

function listDataTypes(node: Node): NodeKey[] {
  if (node.nodeClass === "Variable" || node.nodeClass === "VariableType")
    return node.dataType === undefined ? [] : [node.dataType];
  if (node.nodeClass !== "DataType") return [];
  return node.definition?.fields.flatMap((f) => (f.dataType === undefined ? [] : [f.dataType])) ?? [];
}

/** Problems: `delete.in-use` (data: count, first user), `operation.node-foreign`, `operation.node-missing`. */
export function deleteNodes(space: AddressSpace, context: CommandContext, intent: DeleteNodesIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  deleteNodesOn(draft, intent.nodes, intent);
  return draft.finish();
}

/** The same on a draft. */
export function deleteNodesOn(
  draft: EditDraft,
  keys: readonly NodeKey[],
  options: { readonly allowUses?: boolean } = {},
): void {
  const { space } = draft;
  for (const key of keys) {
    if (!space.isOwn(key))
      draft.fail(
        problem(space.getNode(key) ? "operation.node-foreign" : "operation.node-missing", { node: key }, { node: key }),
      );
  }
  if (draft.hasFailed) return;
  const deletion = findDeletion(space, keys);
  const first = deletion.uses.find((use) => use.kind !== "method-declaration");
  if (first && !options.allowUses) {
    const data = {
      count: deletion.uses.length,
      user: space.requireNode(first.user).browseName.name,
      used: space.requireNode(first.used).browseName.name,
    };
    draft.fail(problem("delete.in-use", data, { node: first.user }));
    return;
  }
  for (const use of deletion.uses)
    if (use.kind === "method-declaration") draft.set(use.user, "methodDeclaration", undefined);
  for (const key of deletion.nodes) removeNodeOn(draft, key);
}

function removeNodeOn(draft: EditDraft, key: NodeKey): void {
  const node = draft.space.getNode(key);
  if (!node) return;
  for (const edge of listUses(draft.space.own, node)) {
    if (draft.space.hasEdge(edge)) draft.removeReference(edge);
  }
  draft.do({ kind: "removeNode", key });
}
