/** `connectNodes` and `disconnectNodes`: references between nodes that are there, as far as lawful-references.ts allows. */
import type { AddressSpace, Edge } from "../../address-space/address-space";
import { listEdgesTo } from "../../address-space/browse";
import { isTypeNode } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType } from "../../address-space/standard-ids";
import { isHierarchical } from "../../address-space/type-hierarchy";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { checkReference } from "../lawful-references";
import { isOwning, needsOwner } from "../placement";

export type ConnectNodesIntent = { readonly source: NodeKey; readonly type: NodeKey; readonly target: NodeKey };

const R = StandardReferenceType;

/**
 * A hierarchical reference and HasEncoding are declared at the child, others at the source; the first owner becomes
 * ParentNodeId. Problems: those of `checkReference`.
 */
export function connectNodes(space: AddressSpace, context: CommandContext, intent: ConnectNodesIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const refused = checkReference(space, intent.source, intent.type, intent.target);
  if (refused) draft.fail(refused);
  else connect(draft, intent);
  return draft.finish();
}

function connect(draft: EditDraft, edge: Edge): void {
  const { space } = draft;
  const hierarchical = isHierarchical(space, edge.type);
  const isAtChild = hierarchical || edge.type === R.HasEncoding;
  const [wanted, other] = isAtChild ? (["target", "source"] as const) : (["source", "target"] as const);
  draft.addReference(edge, space.isOwn(edge[wanted]) ? wanted : other);
  const child = space.getNode(edge.target);
  const isFirstOwner =
    hierarchical && child && !isTypeNode(child) && space.isOwn(child.key) && child.parent === undefined;
  if (isFirstOwner) draft.set(child.key, "parent", edge.source);
}

/** Problems: `disconnect.last-parent`, `disconnect.last-owner` (move or delete instead), `disconnect.required`, `operation.*`. */
export function disconnectNodes(
  space: AddressSpace,
  context: CommandContext,
  intent: ConnectNodesIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  const { source, type, target } = intent;
  const child = space.getNode(target);
  if (type === R.HasTypeDefinition || type === R.HasSubtype) {
    draft.fail(
      problem("disconnect.required", { type: space.getNode(type)?.browseName.name ?? type }, { node: target }),
    );
    return draft.finish();
  }
  if (child && isHierarchical(space, type)) {
    const others = listEdgesTo(space, target, R.HierarchicalReferences).filter(
      (e) => e.source !== source || e.type !== type,
    );
    if (others.length === 0)
      draft.fail(problem("disconnect.last-parent", { name: child.browseName.name }, { node: target }));
    else if (needsOwner(child) && !others.some((e) => isOwning(space, e.type))) {
      draft.fail(problem("disconnect.last-owner", { name: child.browseName.name }, { node: target }));
    }
    if (
      !isTypeNode(child) &&
      child.parent === source &&
      space.isOwn(target) &&
      others.every((e) => e.source !== source)
    ) {
      draft.set(target, "parent", others[0]?.source);
    }
  }
  draft.removeReference({ source, type, target });
  return draft.finish();
}
