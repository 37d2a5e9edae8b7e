/**
 * Where a new instance hangs: by which reference, and with which modelling rule. What we write carries the hierarchical
 * reference as an inverse one at the child (most loaders look for the parent there) and forward HasModellingRule.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findModellingRule, findTypeDefinition } from "../address-space/browse";
import { isTypeNode, type DeclaredReference, type Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { StandardModellingRule, StandardReferenceType, StandardType } from "../address-space/standard-ids";
import { getReferenceTypes, isHierarchical, isSubtypeOf, listSupertypes } from "../address-space/type-hierarchy";
import { problem, type Problem } from "../core/result";
import { checkSourceClass, endsRules } from "./reference-rules";

const R = StandardReferenceType;

export type Placement =
  | {
      readonly ok: true;
      /** The inverse hierarchical reference of the child. */
      readonly references: readonly DeclaredReference[];
      readonly rules: readonly DeclaredReference[];
      /** The child is an instance declaration: it stands in a type. */
      readonly isDeclaration: boolean;
    }
  | { readonly ok: false; readonly problem: Problem };

/** Whether children of the node are instance declarations: it is an Object- or VariableType, or a declaration itself. */
export function isDeclarationParent(space: AddressSpace, parent: Node): boolean {
  if (parent.nodeClass === "ObjectType" || parent.nodeClass === "VariableType") return true;
  return findModellingRule(space, parent.key) !== undefined;
}

/** Variables and Methods hang on an owner by HasComponent or HasProperty (OPC 10000-3 §5.6.3, §5.6.4, §5.7.1). */
export function needsOwner(node: Node): boolean {
  return node.nodeClass === "Variable" || node.nodeClass === "Method";
}

export function isOwning(space: AddressSpace, referenceType: NodeKey): boolean {
  return getReferenceTypes(space, R.Aggregates).has(referenceType);
}

/** What the user may wish for; `rule: "none"` means no rule although the parent is a type. */
export type PlacementWish = { readonly referenceType?: NodeKey; readonly rule?: NodeKey | "none" };

/** For an instance of `type`, an ObjectType or VariableType. */
export function choosePlacement(space: AddressSpace, parent: Node, type: Node, wish: PlacementWish): Placement {
  const nodeClass = type.nodeClass === "VariableType" ? "Variable" : "Object";
  return placeChild(space, parent, { nodeClass, typeDefinition: type.key }, wish);
}

/** A child that does not exist yet. */
type NewChild = { readonly nodeClass: "Object" | "Variable" | "Method"; readonly typeDefinition?: NodeKey };

export function placeChild(space: AddressSpace, parent: Node, child: NewChild, wish: PlacementWish): Placement {
  const referenceType = wish.referenceType ?? getUsualReference(space, parent, child);
  const found = checkPlace(space, parent, child, referenceType);
  if (found) return { ok: false, problem: found };
  const isDeclaration = isDeclarationParent(space, parent);
  const rule = wish.rule ?? (isDeclaration ? StandardModellingRule.Mandatory : undefined);
  return {
    ok: true,
    references: [{ type: referenceType, target: parent.key, isForward: false }],
    rules: rule === undefined || rule === "none" ? [] : [{ type: R.HasModellingRule, target: rule, isForward: true }],
    isDeclaration,
  };
}

function getUsualReference(space: AddressSpace, parent: Node, child: NewChild): NodeKey {
  if (child.typeDefinition === StandardType.PropertyType) return R.HasProperty;
  if (parent.nodeClass === "View") return R.Organizes;
  const definition = parent.nodeClass === "Object" ? findTypeDefinition(space, parent.key) : undefined;
  const isFolder = definition !== undefined && isSubtypeOf(space, definition, StandardType.FolderType);
  // A Variable needs an owner by HasComponent (OPC 10000-3 §5.6.4); a folder only organises Objects.
  return isFolder && child.nodeClass === "Object" && !isTypeNode(parent) ? R.Organizes : R.HasComponent;
}

function checkPlace(space: AddressSpace, parent: Node, child: NewChild, referenceType: NodeKey): Problem | undefined {
  if (!isHierarchical(space, referenceType)) return problem("reference.not-hierarchical", { type: referenceType });
  // The rules ask a node for its class, type and neighbours; a node that is not there yet has only the first two.
  const probe = { key: PROBE, nodeClass: child.nodeClass } as Node;
  const spaceWithProbe = child.typeDefinition === undefined ? space : withProbe(space, child);
  const refusal =
    checkSourceClass(space, parent, true, referenceType) ??
    [referenceType, ...listSupertypes(space, referenceType)]
      .map((type) => endsRules.get(type)?.(spaceWithProbe, parent, probe))
      .find((r) => r !== undefined);
  if (!refusal) return undefined;
  const data = { source: parent.browseName.name, target: child.nodeClass, type: referenceType, clause: refusal.clause };
  return problem(refusal.code, data, { node: parent.key });
}

const PROBE = "i=0" as NodeKey;

function withProbe(space: AddressSpace, child: NewChild): AddressSpace {
  const references = [{ type: R.HasTypeDefinition, target: child.typeDefinition as NodeKey, isForward: true }];
  const nodeId = { namespaceUri: "", type: "i", identifier: 0 } as const;
  const browseName = { namespaceUri: "", name: "" };
  return space.withNode({
    key: PROBE,
    nodeId,
    nodeClass: child.nodeClass,
    order: 0,
    browseName,
    displayName: [],
    references,
  } as Node);
}
