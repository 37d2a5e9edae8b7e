/**
 * What a Variable or VariableType must fit: its VariableType, its supertype, the declaration that it overrides, the
 * declaration of the type of which it is a member (OPC 10000-3 §6.2.8).
 */
import { hasValueAttributes, type Node, type VariableNode, type VariableTypeNode } from "../address-space/node";
import { makeLookup, type CheckContext } from "./check-context";
import { findTypeDefinition, listSupertypes } from "./lookups";
import { findInheritedMember, getMembers, isNaming, listInterfaces, toNameText, type Member } from "./members";

export type ValueBase = {
  readonly base: VariableNode | VariableTypeNode;
  /** How the two relate, to be read as `{role} {name}`. */
  readonly role: "its VariableType" | "its supertype" | "the overridden declaration" | "the declaration in the type";
};

const NO_BASES: readonly ValueBase[] = [];

const valueBases = makeLookup<readonly ValueBase[]>((ctx, key) => {
  const node = ctx.node(key);
  if (!node || !hasValueAttributes(node)) return NO_BASES;
  const bases: ValueBase[] = [];
  const addMember = ({ node: { key: member } }: Member, role: ValueBase["role"]): void => add(ctx.node(member), role);
  const add = (base: Node | undefined, role: ValueBase["role"]): void => {
    if (base && base.key !== node.key && hasValueAttributes(base)) bases.push({ base, role });
  };
  if (node.nodeClass === "VariableType") {
    const [supertype] = listSupertypes(ctx, node.key);
    if (supertype !== undefined) add(ctx.node(supertype), "its supertype");
    return bases;
  }
  const type = findTypeDefinition(ctx, node.key);
  const typeNode = type === undefined ? undefined : ctx.node(type);
  if (typeNode?.nodeClass === "VariableType") add(typeNode, "its VariableType");
  const name = toNameText(node.browseName);
  for (const { source } of ctx.parentEdges(node.key)) {
    const parent = ctx.classOf(source);
    if (parent === undefined) continue;
    if (parent === "ObjectType" || parent === "VariableType") {
      const inherited = findInheritedMember(ctx, source, node.browseName);
      if (inherited) addMember(inherited, "the overridden declaration");
      continue;
    }
    const parentType = findTypeDefinition(ctx, source);
    for (const from of [...(parentType === undefined ? [] : [parentType]), ...listInterfaces(ctx, source)]) {
      const member = getMembers(ctx, from).get(name);
      if (member && isNaming(member.rule)) addMember(member, "the declaration in the type");
    }
  }
  return bases;
});

export function listValueBases({ key }: VariableNode | VariableTypeNode, ctx: CheckContext): readonly ValueBase[] {
  return ctx.lookUp(valueBases, key);
}
