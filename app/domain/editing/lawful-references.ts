/**
 * Which reference types may join two nodes.
 *
 * `listLawfulReferences(space, source, target)` answers the reference types that the standard allows from source to
 * target (OPC 10000-3 §7, with the limits of §5 for the source's class), the usual ones first; where none of the usual
 * ones fits it gives the reasons. `checkReference` asks for one type. `connect-nodes.ts` uses both, so a screen that
 * offers these choices never offers what is then refused.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findModellingRule, findTypeDefinition, listEdgesTo } from "../address-space/browse";
import type { Node } from "../address-space/node";
import { standardKey, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType, StandardType } from "../address-space/standard-ids";
import {
  findSupertype,
  getReferenceTypes,
  isHierarchical,
  isSubtypeOf,
  listSupertypes,
} from "../address-space/type-hierarchy";
import { problem, type Problem } from "../core/result";
import { checkSiblingName } from "./names";
import { checkSourceClass, endsRules, type Refusal } from "./reference-rules";
import { findTypedEnds } from "./typed-ends";

const R = StandardReferenceType;

/** A reference type that may join two nodes. */
export type ReferenceChoice = { readonly type: NodeKey; readonly name: string; readonly isUsual: boolean };

export type LawfulReferences = {
  readonly choices: readonly ReferenceChoice[];
  /** Why the usual types that are missing in `choices` may not be used; `data.clause` names the clause. */
  readonly refusals: readonly Problem[];
};

/** What modellers use every day, in the order in which it is offered. */
const USUAL: readonly NodeKey[] = [
  R.HasSubtype,
  R.HasInterface,
  R.HasTypeDefinition,
  R.HasProperty,
  R.HasComponent,
  R.Organizes,
  R.HasEncoding,
  R.GeneratesEvent,
  R.HasOrderedComponent,
  R.HasAddIn,
  R.AlwaysGeneratesEvent,
  R.HasModellingRule,
];

/** All lawful types for the pair, usual first, then hierarchical before others, own before foreign, by name. */
export function listLawfulReferences(space: AddressSpace, source: NodeKey, target: NodeKey): LawfulReferences {
  const choices: (ReferenceChoice & { rank: number })[] = [];
  const refusals: Problem[] = [];
  for (const type of getReferenceTypes(space, R.References)) {
    const node = space.getNode(type);
    if (node?.nodeClass !== "ReferenceType" || node.isAbstract || node.releaseStatus === "Deprecated") continue;
    const refused = checkReference(space, source, type, target);
    const usual = USUAL.indexOf(type);
    if (!refused)
      choices.push({ type, name: node.browseName.name, isUsual: usual >= 0, rank: rank(space, source, type, usual) });
    else if (usual >= 0) refusals.push(refused);
  }
  choices.sort((a, b) => a.rank - b.rank || a.name.localeCompare(b.name, "en"));
  return { choices: choices.map(({ type, name, isUsual }) => ({ type, name, isUsual })), refusals };
}

function rank(space: AddressSpace, source: NodeKey, type: NodeKey, usual: number): number {
  if (usual < 0) return USUAL.length + (isHierarchical(space, type) ? 0 : 2) + (space.isOwn(type) ? 0 : 1);
  const isFolder = isSubtypeOf(space, findTypeDefinition(space, source) ?? source, StandardType.FolderType);
  // A folder organises (§7.11); everything else has components.
  return type === R.Organizes && isFolder ? USUAL.indexOf(R.HasProperty) : usual;
}

/**
 * The reason why `type` may not lead from source to target; undefined where it may. Problems: `reference.*` with
 * `data.clause`, `operation.node-missing`, `operation.node-foreign`, `operation.reference-exists`.
 */
export function checkReference(
  space: AddressSpace,
  source: NodeKey,
  type: NodeKey,
  target: NodeKey,
): Problem | undefined {
  const from = space.getNode(source);
  const to = space.getNode(target);
  const by = space.getNode(type);
  if (!from || !to || !by) return problem("operation.node-missing", { node: !from ? source : !to ? target : type });
  if (!space.isOwn(source) && !space.isOwn(target))
    return problem("operation.node-foreign", { node: source }, { node: source });
  const refusal = findRefusal(space, from, by, to);
  if (refusal) {
    const data = {
      source: from.browseName.name,
      target: to.browseName.name,
      type: by.browseName.name,
      clause: refusal.clause,
    };
    return problem(refusal.code, data, { node: source });
  }
  if (space.hasEdge({ source, type, target }))
    return problem("operation.reference-exists", { source, type, target }, { node: source });
  // Components and Properties of one node differ in name (§4.6.4, §5.6.3); what is organised may be called alike.
  const isMember = getReferenceTypes(space, R.Aggregates).has(type);
  return isMember ? checkSiblingName(space, source, to.browseName, target) : undefined;
}

function findRefusal(space: AddressSpace, source: Node, type: Node, target: Node): Refusal | undefined {
  if (type.nodeClass !== "ReferenceType") return { code: "reference.no-reference-type", clause: "OPC 10000-3 §5.3.1" };
  if (type.isAbstract) return { code: "reference.abstract", clause: "OPC 10000-3 §5.3.1" };
  const hierarchical = isHierarchical(space, type.key);
  return (
    checkSourceClass(space, source, hierarchical, type.key) ??
    checkRules(space, source, type.key, target) ??
    checkCounts(space, source, type.key, target) ??
    checkParallel(space, source.key, type.key, target.key) ??
    (hierarchical ? checkLoop(space, source.key, type.key, target.key) : undefined) ??
    (hierarchical && type.key !== R.HasSubtype ? checkDeclaringType(space, source, target) : undefined)
  );
}

function checkRules(space: AddressSpace, source: Node, type: NodeKey, target: Node): Refusal | undefined {
  const typed = findTypedEnds(type);
  if (typed) return typed.check(space, source, target);
  for (const at of [type, ...listSupertypes(space, type)]) {
    const refusal = endsRules.get(at)?.(space, source, target);
    if (refusal) return refusal;
    // HasArgumentDescription is a subtype of HasComponent that starts at a Method (§5.7.2); its own rule is whole.
    if (at === HAS_ARGUMENT_DESCRIPTION) return undefined;
  }
  return undefined;
}

const HAS_ARGUMENT_DESCRIPTION = standardKey(129);

/** One supertype (§6.3.1), one type definition (§7.13), one modelling rule (§7.12). */
function checkCounts(space: AddressSpace, source: Node, type: NodeKey, target: Node): Refusal | undefined {
  if (type === R.HasSubtype && findSupertype(space, target.key) !== undefined) {
    return { code: "reference.second-supertype", clause: "OPC 10000-3 §6.3.1" };
  }
  const isSingle = type === R.HasTypeDefinition || type === R.HasModellingRule;
  if (isSingle && space.edgesFrom(source.key).some((e) => e.type === type)) {
    return {
      code: "reference.only-one",
      clause: type === R.HasTypeDefinition ? "OPC 10000-3 §7.13" : "OPC 10000-3 §7.12",
    };
  }
  return undefined;
}

/** A reference and one of a subtype of it between the same two nodes say the same twice (§5.3.1, §7.2). */
function checkParallel(space: AddressSpace, source: NodeKey, type: NodeKey, target: NodeKey): Refusal | undefined {
  const says = (a: NodeKey, b: NodeKey): boolean => a !== b && isSubtypeOf(space, a, b);
  const known = space.edgesTo(target).filter((e) => e.source === source);
  const isRepeated = known.some((e) => says(e.type, type) || says(type, e.type));
  return isRepeated ? { code: "reference.said-already", clause: "OPC 10000-3 §5.3.1" } : undefined;
}

/** No node reaches itself by HasChild and its subtypes (§7.5), none refers to itself hierarchically (§7.3). */
function checkLoop(space: AddressSpace, source: NodeKey, type: NodeKey, target: NodeKey): Refusal | undefined {
  if (source === target) return { code: "reference.to-itself", clause: "OPC 10000-3 §7.3" };
  if (!getReferenceTypes(space, R.HasChild).has(type)) return undefined;
  return isBelow(space, target, source) ? { code: "reference.loop", clause: "OPC 10000-3 §7.5" } : undefined;
}

/** An instance declaration stands in one type (§6.2.1): another type gets a declaration of its own. */
function checkDeclaringType(space: AddressSpace, source: Node, target: Node): Refusal | undefined {
  if (findModellingRule(space, target.key) === undefined) return undefined;
  const types = listDeclaringTypes(space, source.key);
  const others = listDeclaringTypes(space, target.key);
  const isForeign = types.size > 0 && others.size > 0 && [...types].every((type) => !others.has(type));
  return isForeign ? { code: "reference.declaration-of-other-type", clause: "OPC 10000-3 §6.2.1" } : undefined;
}

/** The Object- and VariableTypes that a node stands in, itself included. */
function listDeclaringTypes(space: AddressSpace, key: NodeKey): Set<NodeKey> {
  const types = new Set<NodeKey>();
  const seen = new Set<NodeKey>([key]);
  for (const at of seen) {
    const nodeClass = space.getNode(at)?.nodeClass;
    if (nodeClass === "ObjectType" || nodeClass === "VariableType") types.add(at);
    else for (const edge of listEdgesTo(space, at, R.HierarchicalReferences)) seen.add(edge.source);
  }
  return types;
}

/** Whether `key` can be reached from `top` by HasChild and its subtypes. Asked upwards, since a node has few parents. */
export function isBelow(space: AddressSpace, top: NodeKey, key: NodeKey): boolean {
  const seen = new Set<NodeKey>([key]);
  for (const at of seen) {
    for (const { source } of listEdgesTo(space, at, R.HasChild)) {
      if (source === top) return true;
      seen.add(source);
    }
  }
  return false;
}
