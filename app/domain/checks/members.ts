/**
 * Members that types give to their instances (OPC 10000-3 §6.2, §6.3.3): the instance declarations directly below a type
 * and its supertypes, where a subtype's declaration of the same BrowseName overrides.
 */
import type { NodeKey } from "../address-space/node-id";
import type { Node } from "../address-space/node";
import { formatQualifiedName } from "../address-space/qualified-name";
import { StandardModellingRule as M, StandardReferenceType as R } from "../address-space/standard-ids";
import { makeLookup, type CheckContext } from "./check-context";
import { findModellingRule, listSupertypes } from "./lookups";

/** A declaration with its rule and the type (or Interface, or declaration) that it hangs on. */
export type Member = {
  readonly node: Node;
  /** Text of its BrowseName, by which members are matched. */
  readonly name: string;
  readonly rule: NodeKey;
  readonly owner: NodeKey;
  readonly referenceType: NodeKey;
};

/** Rules that name one member each; placeholders and ExposesItsArray name none. */
export function isNaming(rule: NodeKey): boolean {
  return rule === M.Mandatory || rule === M.Optional;
}

export function isPlaceholder(rule: NodeKey | undefined): boolean {
  return rule === M.MandatoryPlaceholder || rule === M.OptionalPlaceholder;
}

const ownMembers = makeLookup<readonly Member[]>((ctx, key) => {
  const found: Member[] = [];
  const seen = new Set<NodeKey>();
  for (const edge of ctx.childEdges(key)) {
    const node = ctx.node(edge.target);
    const rule = findModellingRule(ctx, edge.target);
    if (!node || rule === undefined || seen.has(node.key)) continue;
    seen.add(node.key);
    found.push({ node, name: formatQualifiedName(node.browseName), rule, owner: key, referenceType: edge.type });
  }
  return found;
});

/** The declarations directly below a type or a declaration, not the inherited ones. */
export function listOwnMembers(ctx: CheckContext, key: NodeKey): readonly Member[] {
  return ctx.lookUp(ownMembers, key);
}

const inheritedMembers = makeLookup<ReadonlyMap<string, Member>>((ctx, key) => {
  const members = new Map<string, Member>();
  for (const type of [key, ...listSupertypes(ctx, key)]) {
    for (const member of listOwnMembers(ctx, type)) {
      if (!members.has(member.name)) members.set(member.name, member);
    }
  }
  return members;
});

/** The members of a type with the inherited ones, by BrowseName with namespace; the nearest declaration wins. */
export function getMembers(ctx: CheckContext, type: NodeKey): ReadonlyMap<string, Member> {
  return ctx.lookUp(inheritedMembers, type);
}

const NO_MEMBERS: readonly Member[] = [];

const placeholders = makeLookup<readonly Member[]>((ctx, type) => {
  const found = [...getMembers(ctx, type).values()].filter((m) => m.rule === M.MandatoryPlaceholder);
  return found.length > 0 ? found : NO_MEMBERS;
});

/** The members of a type that stand for one or more others on each instance. */
export function listMandatoryPlaceholders(ctx: CheckContext, type: NodeKey): readonly Member[] {
  return ctx.lookUp(placeholders, type);
}

const interfaces = makeLookup<readonly NodeKey[]>((ctx, key) => {
  const found = new Set<NodeKey>();
  const types = ctx.closure(R.HasInterface);
  for (const at of [key, ...listSupertypes(ctx, key)]) {
    for (const edge of ctx.otherEdges(at)) if (types.has(edge.type)) found.add(edge.target);
  }
  return [...found];
});

/** Interfaces that a node or its supertypes apply (OPC 10000-3 §4.10). */
export function listInterfaces(ctx: CheckContext, key: NodeKey): readonly NodeKey[] {
  return ctx.lookUp(interfaces, key);
}

/** The declaration that the supertypes give for the name; undefined where the type is the first to declare it. */
export function findInheritedMember(
  ctx: CheckContext,
  type: NodeKey,
  browseName: Node["browseName"],
): Member | undefined {
  const [supertype] = listSupertypes(ctx, type);
  return supertype === undefined ? undefined : getMembers(ctx, supertype).get(formatQualifiedName(browseName));
}

/** Children of a node by BrowseName with namespace; several where names repeat. */
const children = makeLookup<ReadonlyMap<string, readonly Node[]>>((ctx, key) => {
  const found = new Map<string, Node[]>();
  for (const edge of ctx.childEdges(key)) {
    const node = ctx.node(edge.target);
    if (!node) continue;
    const name = formatQualifiedName(node.browseName);
    const same = found.get(name);
    if (!same) found.set(name, [node]);
    else if (!same.includes(node)) same.push(node);
  }
  return found;
});

export function getChildren(ctx: CheckContext, key: NodeKey): ReadonlyMap<string, readonly Node[]> {
  return ctx.lookUp(children, key);
}
