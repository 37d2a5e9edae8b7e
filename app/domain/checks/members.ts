/**
 * Members that types give to their instances (OPC 10000-3 §6.2, §6.3.3): the instance declarations directly below a type
 * and its supertypes, where a subtype's declaration of the same BrowseName overrides.
 */
import type { NodeKey } from "../address-space/node-id";
import type { Node } from "../address-space/node";
import { formatQualifiedName } from "../address-space/qualified-name";
import { StandardModellingRule as M, StandardReferenceType as R } from "../address-space/standard-ids";
import { makeLookup, type CheckContext } from "./check-context";
import { findModellingRule, findTypeDefinition, listSupertypes } from "./lookups";
import type { NodeHead } from "./views";

/** A declaration with its rule and the type (or Interface, or declaration) that it hangs on. */
export type Member = {
  readonly node: NodeHead;
  /** Text of its BrowseName, by which members are matched. */
  readonly name: string;
  readonly rule: NodeKey;
  readonly owner: NodeKey;
  readonly referenceType: NodeKey;
};

const texts = new Map<string, Map<string, string>>();

/** Text of a BrowseName; the same string for the same name, since models repeat few names often. */
export function toNameText({ namespaceUri, name }: Node["browseName"]): string {
  let names = texts.get(namespaceUri);
  if (!names) texts.set(namespaceUri, (names = new Map()));
  let text = names.get(name);
  if (text === undefined) {
    if (names.size >= MAX_NAMES) names.clear();
    names.set(name, (text = formatQualifiedName({ namespaceUri, name })));
  }
  return text;
}

const MAX_NAMES = 20_000;

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
    const node = ctx.head(edge.target);
    const rule = findModellingRule(ctx, edge.target);
    if (!node || rule === undefined || seen.has(node.key)) continue;
    seen.add(node.key);
    found.push({ node, name: toNameText(node.browseName), rule, owner: key, referenceType: edge.type });
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
  return supertype === undefined ? undefined : getMembers(ctx, supertype).get(toNameText(browseName));
}

/** The declaration that a child of the name overrides or follows: a supertype's below a type, else one of the owner's type. */
export function findMemberAbove(ctx: CheckContext, owner: NodeKey, browseName: Node["browseName"]): Member | undefined {
  const ownerClass = ctx.classOf(owner);
  if (ownerClass === "ObjectType" || ownerClass === "VariableType") return findInheritedMember(ctx, owner, browseName);
  const type = findTypeDefinition(ctx, owner);
  return type === undefined ? undefined : getMembers(ctx, type).get(toNameText(browseName));
}

/** Children of a node by BrowseName with namespace; several where names repeat. */
const children = makeLookup<ReadonlyMap<string, readonly NodeHead[]>>((ctx, key) => {
  const found = new Map<string, NodeHead[]>();
  for (const edge of ctx.childEdges(key)) {
    const node = ctx.head(edge.target);
    if (!node) continue;
    const name = toNameText(node.browseName);
    const same = found.get(name);
    if (!same) found.set(name, [node]);
    else if (!same.some((n) => n.key === node.key)) same.push(node);
  }
  return found;
});

export function getChildren(ctx: CheckContext, key: NodeKey): ReadonlyMap<string, readonly NodeHead[]> {
  return ctx.lookUp(children, key);
}

const MAX_DEPTH = 20;

/**
 * The declaration that a member of a plain instance follows: found by the names on its path, from the topmost own node whose
 * type declares them, since declarations of a type override those of the types of its members.
 */
export function findDeclarationOf(ctx: CheckContext, key: NodeKey): NodeHead | undefined {
  const path: string[] = [];
  let found: NodeHead | undefined;
  let at = key;
  for (let depth = 0; depth < MAX_DEPTH; depth++) {
    const node = ctx.head(at);
    const [edge] = ctx.parentEdges(at);
    if (!node || !edge || !ctx.isOwn(edge.source)) break;
    path.unshift(toNameText(node.browseName));
    const type = findTypeDefinition(ctx, edge.source);
    found = (type === undefined ? undefined : findDeclared(ctx, type, path)) ?? found;
    at = edge.source;
  }
  return found?.key === key ? undefined : found;
}

function findDeclared(
  ctx: CheckContext,
  type: NodeKey,
  [first = "", ...rest]: readonly string[],
): NodeHead | undefined {
  let member = getMembers(ctx, type).get(first);
  for (const name of rest) {
    if (!member || !isNaming(member.rule)) return undefined;
    member = listOwnMembers(ctx, member.node.key).find((m) => m.name === name);
  }
  return member && isNaming(member.rule) ? member.node : undefined;
}
