/** Attributes that an instance takes from its declaration (OPC 10000-3 §6.4.2; OPC 10000-6 §F.7, §F.9). */
import type { AddressSpace } from "../address-space/address-space";
import type { MemberDeclaration } from "../address-space/instance-declarations";
import { hasValueAttributes, type Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";

const OF_EACH_CLASS: Readonly<Record<string, readonly string[]>> = {
  Object: ["eventNotifier"],
  Variable: ["accessLevel", "minimumSamplingInterval", "historizing"],
  Method: ["executable", "argumentDescriptions"],
};

const COMMON: readonly string[] = [
  "writeMask",
  "accessRestrictions",
  "hasNoPermissions",
  "rolePermissions",
  "documentation",
];

/**
 * Attributes for a copy of the member. DataType, ValueRank, ArrayDimensions and Value are those of the nearest
 * declaration that gives them; a copied Method names its declaration.
 */
export function copyAttributes(space: AddressSpace, member: MemberDeclaration): Readonly<Record<string, unknown>> {
  const { node } = member;
  const copied = pick(node, [...COMMON, ...(OF_EACH_CLASS[node.nodeClass] ?? [])]);
  if (node.nodeClass === "Method") return { ...copied, methodDeclaration: node.key };
  if (node.nodeClass !== "Variable") return copied;
  return { ...copied, ...copyValueAttributes(space, member) };
}

function copyValueAttributes(space: AddressSpace, member: MemberDeclaration): Record<string, unknown> {
  const nodes = member.declared.map((d) => space.getNode(d.key)).filter((n) => n !== undefined);
  const attributes = pick(member.node, ["dataType", "valueRank", "arrayDimensions"]);
  const withValue = nodes.find((n) => hasValueAttributes(n) && n.value !== undefined);
  return { ...attributes, ...(withValue ? pick(withValue, ["value"]) : {}) };
}

/**
 * What a Variable takes from the VariableType that it is an instance of. Where the type leaves the rank open, a scalar is
 * meant (or one dimension, where it wants an array): a Variable should say the narrowest (OPC 10000-3 §5.6.2).
 */
export function copyTypeAttributes(space: AddressSpace, type: NodeKey): Readonly<Record<string, unknown>> {
  const node = space.getNode(type);
  if (node?.nodeClass !== "VariableType") return {};
  const rank = node.valueRank ?? -1;
  if (rank > 0) return pick(node, ["dataType", "valueRank", "arrayDimensions", "value"]);
  return { ...pick(node, ["dataType", "value"]), ...(rank === 0 ? { valueRank: 1, arrayDimensions: "0" } : {}) };
}

function pick(node: Node, names: readonly string[]): Record<string, unknown> {
  return Object.fromEntries(
    Object.entries(node).filter(([name, value]) => names.includes(name) && value !== undefined),
  );
}
