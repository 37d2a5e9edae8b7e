/** What one row of a card or of the register says of a node, read from the node and its nearest neighbours. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findModellingRule, findParent, findTypeDefinition, getDisplayName, listMembers } from "~/domain/address-space/browse";
import { getDataType, getValueRank, hasValueAttributes, type Node, type NodeClass } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { formatQualifiedName } from "~/domain/address-space/qualified-name";
import { StandardModellingRule, StandardReferenceType } from "~/domain/address-space/standard-ids";
import { listSupertypes } from "~/domain/address-space/type-hierarchy";

export type RuleName = "Mandatory" | "Optional" | "MandatoryPlaceholder" | "OptionalPlaceholder" | "ExposesItsArray";

export const RULE_KEYS: Readonly<Record<RuleName, NodeKey>> = {
  Mandatory: StandardModellingRule.Mandatory,
  Optional: StandardModellingRule.Optional,
  MandatoryPlaceholder: StandardModellingRule.MandatoryPlaceholder,
  OptionalPlaceholder: StandardModellingRule.OptionalPlaceholder,
  ExposesItsArray: StandardModellingRule.ExposesItsArray,
};

const RULES_BY_KEY = new Map<NodeKey, RuleName>(
  Object.entries(RULE_KEYS).map(([name, key]) => [key, name as RuleName] as const),
);

/** Cardinalities of OPC 10000-3 Table C.3; a rule of another model has none. */
const CARDINALITIES: Readonly<Partial<Record<RuleName, string>>> = {
  Mandatory: "1",
  Optional: "0..1",
  MandatoryPlaceholder: "1..n",
  OptionalPlaceholder: "0..n",
};

export function findRuleName(space: AddressSpace, key: NodeKey): RuleName | undefined {
  const rule = findModellingRule(space, key);
  return rule === undefined ? undefined : RULES_BY_KEY.get(rule);
}

export function getCardinality(rule: RuleName | undefined): string {
  return (rule && CARDINALITIES[rule]) ?? "";
}

/** A Variable that is the target of HasProperty (or a subtype) of its owner. */
export function isProperty(space: AddressSpace, node: Node): boolean {
  if (node.nodeClass !== "Variable") return false;
  return space.edgesTo(node.key).some((edge) => edge.type === StandardReferenceType.HasProperty);
}

/** The name of a node for people; the key itself where the node is not loaded. */
export function getNodeName(space: AddressSpace, key: NodeKey | undefined): string {
  if (key === undefined) return "";
  const node = space.getNode(key);
  return node ? getDisplayName(node) : key;
}

/** `Float`, `Float[]`, `Float[,]`, `Float[*]` by value rank (OPC 10000-3 §5.6.2). */
export function formatDataType(space: AddressSpace, node: Node): string {
  if (!hasValueAttributes(node)) return "";
  return getNodeName(space, getDataType(node)) + formatRankSuffix(getValueRank(node));
}

function formatRankSuffix(rank: number): string {
  if (rank === -1) return "";
  if (rank >= 1) return `[${",".repeat(rank - 1)}]`;
  return rank === 0 ? "[…]" : rank === -2 ? "[*]" : "[?]";
}

const RANK_NAMES: Readonly<Record<number, string>> = {
  [-3]: "Scalar or 1 dimension",
  [-2]: "Any",
  [-1]: "Scalar",
  0: "1 or more dimensions",
  1: "1 dimension",
  2: "2 dimensions",
  3: "3 dimensions",
};

export function formatValueRank(rank: number): string {
  return RANK_NAMES[rank] ?? `${rank} dimensions`;
}

export const VALUE_RANKS = [-1, 1, 2, 3, 0, -2, -3];

/** Members that a type inherits and does not override by BrowseName, nearest supertype first within the chain, topmost group first. */
export function listInheritedMembers(space: AddressSpace, type: NodeKey): { node: Node; origin: NodeKey }[] {
  const taken = new Set(listMembers(space, type).map((node) => formatQualifiedName(node.browseName)));
  const found: { node: Node; origin: NodeKey }[] = [];
  for (const origin of [...listSupertypes(space, type), ...listInterfaces(space, type)]) {
    for (const node of listMembers(space, origin)) {
      const name = formatQualifiedName(node.browseName);
      if (taken.has(name)) continue;
      taken.add(name);
      found.push({ node, origin });
    }
  }
  return found;
}

/** Interfaces of a type or an object, without those of its supertypes. */
export function listInterfaces(space: AddressSpace, key: NodeKey): NodeKey[] {
  return space.edgesFrom(key).flatMap((edge) => (edge.type === StandardReferenceType.HasInterface ? [edge.target] : []));
}

/** The path for people and the type at its beginning, ` / ` between the names. */
export function formatPath(space: AddressSpace, key: NodeKey): string {
  const names: string[] = [];
  const seen = new Set<NodeKey>();
  for (let at: NodeKey | undefined = key; at !== undefined && !seen.has(at); ) {
    seen.add(at);
    const node = space.getNode(at);
    if (!node || (names.length > 0 && space.isOwn(key) && !space.isOwn(at))) break;
    names.unshift(node.browseName.name);
    at = node.nodeClass.endsWith("Type") ? undefined : findParent(space, at);
  }
  return names.join(" / ");
}

/** Words for the class of a node as the stencil and the register name it. */
export function getClassName(nodeClass: NodeClass, property: boolean): string {
  return property ? "Property" : nodeClass;
}

export function getTypeDefinitionName(space: AddressSpace, key: NodeKey): string {
  return getNodeName(space, findTypeDefinition(space, key));
}
