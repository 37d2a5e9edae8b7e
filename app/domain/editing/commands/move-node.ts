/**
 * `moveNode`: to another parent; a type to another supertype. The reference keeps its type where the standard allows it
 * there, else the usual one is taken. A member that moves into a type gets a modelling rule.
 */
import type { AddressSpace, Edge } from "../../address-space/address-space";
import { findModellingRule, findParent, findTypeDefinition, listEdgesTo } from "../../address-space/browse";
import { isTypeNode, type Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType, StandardModellingRule, StandardReferenceType } from "../../address-space/standard-ids";
import { isSubtypeOf } from "../../address-space/type-hierarchy";
import { SpaceDataTypes } from "../../nodeset/values/data-type-shapes";
import { problem, type Problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { checkInheritedFields } from "../inherited-fields";
import { checkReference, isBelow } from "../lawful-references";
import { checkSiblingName } from "../names";
import { isDeclarationParent, isOwning, needsOwner, placeChild } from "../placement";

const R = StandardReferenceType;

export type MoveNodeIntent = { readonly node: NodeKey; readonly parent: NodeKey; readonly referenceType?: NodeKey };

/** Problems: `move.below-itself`, `move.no-owner`, `move.other-kind`, `name.taken`, `reference.*`, `operation.node-missing`, `operation.node-foreign`. */
export function moveNode(space: AddressSpace, context: CommandContext, intent: MoveNodeIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const node = space.getNode(intent.node);
  const parent = space.getNode(intent.parent);
  if (!node || !parent) draft.fail(problem("operation.node-missing", { node: node ? intent.parent : intent.node }));
  else if (!space.isOwn(node.key))
    draft.fail(problem("operation.node-foreign", { node: node.key }, { node: node.key }));
  else move(draft, node, parent, intent.referenceType);
  return draft.finish();
}

function move(draft: EditDraft, node: Node, parent: Node, wished: NodeKey | undefined): void {
  const { space } = draft;
  const found = checkTarget(space, node, parent);
  if (found) {
    draft.fail(found);
    return;
  }
  const old = listOldEdges(space, node);
  for (const edge of old) draft.removeReference(edge);
  const type = chooseType(draft.space, node, parent, wished ?? old[0]?.type);
  const isLoose = needsOwner(node) && !isOwning(space, type);
  const refused = isLoose
    ? problem("move.no-owner", { name: node.browseName.name, parent: parent.browseName.name }, { node: node.key })
    : checkReference(draft.space, parent.key, type, node.key);
  if (refused) {
    draft.fail(refused);
    return;
  }
  draft.addReference({ source: parent.key, type, target: node.key }, "target");
  if (isTypeNode(node)) return;
  draft.set(node.key, "parent", parent.key);
  if (
    isDeclarationParent(space, parent) &&
    findModellingRule(space, node.key) === undefined &&
    node.nodeClass !== "View"
  ) {
    draft.addReference(
      { source: node.key, type: R.HasModellingRule, target: StandardModellingRule.Mandatory },
      "source",
    );
  }
}

function checkTarget(space: AddressSpace, node: Node, parent: Node): Problem | undefined {
  if (node.key === parent.key || isBelow(space, node.key, parent.key)) {
    return problem("move.below-itself", { name: node.browseName.name }, { node: node.key });
  }
  if (!isTypeNode(node)) return checkSiblingName(space, parent.key, node.browseName, node.key);
  const isOtherKind =
    node.nodeClass === "DataType" && getDataTypeKind(space, node.key) !== getDataTypeKind(space, parent.key);
  if (isOtherKind)
    return problem(
      "move.other-kind",
      { name: node.browseName.name, parent: parent.browseName.name },
      { node: node.key },
    );
  return node.nodeClass === "DataType"
    ? checkInheritedFields(space, parent.key, node.definition?.fields ?? [])
    : undefined;
}

/** What decides fields, encodings and Properties of a DataType: a structure does not become an enumeration by moving. */
function getDataTypeKind(space: AddressSpace, dataType: NodeKey): NodeKey | string | undefined {
  const kinds: readonly NodeKey[] = [StandardDataType.Enumeration, StandardDataType.Union, StandardDataType.Structure];
  return (
    kinds.find((kind) => isSubtypeOf(space, dataType, kind)) ?? new SpaceDataTypes(space).findBuiltInType(dataType)
  );
}

/** The references to the present owner; others (a folder that organises the node too) stay. */
function listOldEdges(space: AddressSpace, node: Node): Edge[] {
  const owner = findParent(space, node.key);
  const edges = listEdgesTo(space, node.key, R.HierarchicalReferences).filter((e) => e.source === owner);
  return edges.filter((e) => (e.type === R.HasSubtype) === isTypeNode(node));
}

function chooseType(space: AddressSpace, node: Node, parent: Node, preferred: NodeKey | undefined): NodeKey {
  if (isTypeNode(node)) return R.HasSubtype;
  // What a folder merely organised becomes a component elsewhere; other references keep their type.
  const isKept = preferred !== undefined && preferred !== R.Organizes;
  if (isKept && !checkReference(space, parent.key, preferred, node.key)) return preferred;
  const typeDefinition = findTypeDefinition(space, node.key);
  const nodeClass = node.nodeClass === "Variable" || node.nodeClass === "Method" ? node.nodeClass : "Object";
  const placement = placeChild(
    space,
    parent,
    { nodeClass, ...(typeDefinition === undefined ? {} : { typeDefinition }) },
    {},
  );
  return (placement.ok ? placement.references[0]?.type : undefined) ?? preferred ?? R.HasComponent;
}
