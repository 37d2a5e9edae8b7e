/**
 * Instance declarations of types (OPC 10000-3 §6.2–6.3).
 *
 * An instance declaration is an Object, Variable or Method with a modelling rule, reached from a type by forward
 * hierarchical references. The fully inherited hierarchy of a type (§6.3.3.2) holds its own declarations and those of its
 * supertypes, identified by browse path: the same path in the type overrides the supertype's. An Interface gives its
 * declarations to the type or instance that has it (§4.10.2), an add-in is a member as any other (§4.10.3, HasAddIn is a
 * subtype of HasComponent).
 *
 * What a member has is merged from *sources*: the declaration, the declarations that it overrides, then its type
 * definition with supertypes, and the Interfaces of all of these. `listMemberDeclarations` answers one level of this and
 * is asked level by level, because types may contain themselves (a folder type with a placeholder for folders).
 */
import type { AddressSpace } from "./address-space";
import { findModellingRule, findTypeDefinition, listEdgesFrom } from "./browse";
import type { Node } from "./node";
import type { NodeKey } from "./node-id";
import { formatQualifiedName, type QualifiedName } from "./qualified-name";
import { StandardModellingRule, StandardReferenceType } from "./standard-ids";
import { listSupertypes } from "./type-hierarchy";

/** A node that gives members. `scope` tells apart the use of one type in two places; see `MemberDeclaration.scope`. */
export type DeclarationSource = { readonly key: NodeKey; readonly scope: string };

export type MemberDeclaration = {
  readonly browseName: QualifiedName;
  /** The declaration that holds: the one of the nearest source. */
  readonly node: Node;
  /** It and those that it overrides, nearest first, each with the scope of the source that gave it. */
  readonly declared: readonly DeclarationSource[];
  /** Reference types that lead to it from its parent. */
  readonly referenceTypes: readonly NodeKey[];
  readonly rule: NodeKey;
  readonly typeDefinition: NodeKey | undefined;
};

/** A type with what it inherits and what its Interfaces give, nearest first. */
export function listTypeSources(space: AddressSpace, type: NodeKey, scope = ""): DeclarationSource[] {
  const { chains } = getCache(space);
  let keys = chains.get(type);
  if (!keys) {
    const chain = [type, ...listSupertypes(space, type)];
    const interfaces = new Set<NodeKey>();
    for (const key of chain) collectInterfaces(space, key, interfaces);
    keys = [...new Set([...chain, ...interfaces])];
    chains.set(type, keys);
  }
  return keys.map((key) => ({ key, scope }));
}

type DirectDeclaration = readonly [node: Node, referenceTypes: NodeKey[], rule: NodeKey];

/** An address space never changes, and an instance asks for the same few types with each of its members. */
type Cache = {
  readonly chains: Map<NodeKey, readonly NodeKey[]>;
  readonly direct: Map<NodeKey, readonly DirectDeclaration[]>;
};

const caches = new WeakMap<AddressSpace, Cache>();

function getCache(space: AddressSpace): Cache {
  let cache = caches.get(space);
  if (!cache) {
    cache = { chains: new Map(), direct: new Map() };
    caches.set(space, cache);
  }
  return cache;
}

function collectInterfaces(space: AddressSpace, key: NodeKey, found: Set<NodeKey>): void {
  for (const edge of listEdgesFrom(space, key, StandardReferenceType.HasInterface)) {
    for (const at of [edge.target, ...listSupertypes(space, edge.target)]) found.add(at);
  }
}

/** What gives members to an instance: the Interfaces that it has itself, then its type definition. */
export function listInstanceSources(space: AddressSpace, instance: NodeKey, scope = ""): DeclarationSource[] {
  const interfaces = new Set<NodeKey>();
  collectInterfaces(space, instance, interfaces);
  const definition = findTypeDefinition(space, instance);
  const sources = [...interfaces].map((key) => ({ key, scope }));
  return definition === undefined ? sources : [...sources, ...listTypeSources(space, definition, scope)];
}

/** What gives members to a member. `typeDefinition` may be the actual type of an instance in its place. */
export function listMemberSources(
  space: AddressSpace,
  member: MemberDeclaration,
  scope: string,
  typeDefinition = member.typeDefinition,
): DeclarationSource[] {
  const interfaces = new Set<NodeKey>();
  for (const { key } of member.declared) collectInterfaces(space, key, interfaces);
  const inherited = typeDefinition === undefined ? [] : listTypeSources(space, typeDefinition, scope);
  return [...member.declared, ...inherited, ...[...interfaces].map((key) => ({ key, scope }))];
}

/** The members that the sources declare, merged by BrowseName, in the order of declaration, nearest source first. */
export function listMemberDeclarations(
  space: AddressSpace,
  sources: readonly DeclarationSource[],
): MemberDeclaration[] {
  const byName = new Map<string, { first: MemberDeclaration; declared: DeclarationSource[] }>();
  const seenSources = new Set<NodeKey>();
  for (const source of sources) {
    if (seenSources.has(source.key)) continue;
    seenSources.add(source.key);
    for (const [node, referenceTypes, rule] of listDirectDeclarations(space, source.key)) {
      const id = formatQualifiedName(node.browseName);
      const known = byName.get(id);
      const declaration = { key: node.key, scope: source.scope };
      if (!known) byName.set(id, { first: makeMember(space, node, referenceTypes, rule), declared: [declaration] });
      else if (known.first.node.nodeClass === node.nodeClass && !known.declared.some((d) => d.key === node.key))
        known.declared.push(declaration);
    }
  }
  return [...byName.values()].map(({ first, declared }) => ({ ...first, declared }));
}

function makeMember(
  space: AddressSpace,
  node: Node,
  referenceTypes: readonly NodeKey[],
  rule: NodeKey,
): MemberDeclaration {
  const typeDefinition = findTypeDefinition(space, node.key);
  return { browseName: node.browseName, node, declared: [], referenceTypes, rule, typeDefinition };
}

/** Children of a type or declaration that have a modelling rule, with all hierarchical references that lead to them. */
function listDirectDeclarations(space: AddressSpace, key: NodeKey): readonly DirectDeclaration[] {
  const { direct } = getCache(space);
  let declarations = direct.get(key);
  if (!declarations) {
    declarations = readDirectDeclarations(space, key);
    direct.set(key, declarations);
  }
  return declarations;
}

function readDirectDeclarations(space: AddressSpace, key: NodeKey): DirectDeclaration[] {
  const found = new Map<NodeKey, DirectDeclaration>();
  for (const edge of listEdgesFrom(space, key, StandardReferenceType.HierarchicalReferences)) {
    if (edge.type === StandardReferenceType.HasSubtype) continue;
    const known = found.get(edge.target);
    if (known) {
      known[1].push(edge.type);
      continue;
    }
    const rule = findModellingRule(space, edge.target);
    const node = rule === undefined ? undefined : space.getNode(edge.target);
    if (node && rule !== undefined) found.set(edge.target, [node, [edge.type], rule]);
  }
  return [...found.values()];
}

/** A row of the fully inherited instance declaration hierarchy. */
export type InstanceDeclaration = MemberDeclaration & {
  readonly path: readonly QualifiedName[];
  /** The type, supertype or Interface whose hierarchy the declaration stands in. */
  readonly declaredBy: NodeKey;
};

/**
 * The fully inherited instance declarations of a type by browse path (`toPathKey`), parents before children
 * (§6.3.3.2). Members that come only from the type definition of a member are not in it: they belong to that type.
 */
export function listInstanceDeclarations(space: AddressSpace, type: NodeKey): ReadonlyMap<string, InstanceDeclaration> {
  const table = new Map<string, InstanceDeclaration>();
  const owners = new Map<NodeKey, NodeKey>();
  const visit = (
    sources: readonly DeclarationSource[],
    path: readonly QualifiedName[],
    above: readonly NodeKey[],
  ): void => {
    for (const member of listMemberDeclarations(space, sources)) {
      // Organizes may lead back to where one came from; a path that passes a node twice is no path.
      if (above.includes(member.node.key)) continue;
      const memberPath = [...path, member.browseName];
      for (const { key } of member.declared) {
        const source = sources.find((s) =>
          listEdgesFrom(space, s.key, StandardReferenceType.HierarchicalReferences).some((e) => e.target === key),
        );
        if (source && !owners.has(key)) owners.set(key, owners.get(source.key) ?? source.key);
      }
      table.set(toPathKey(memberPath), {
        ...member,
        path: memberPath,
        declaredBy: owners.get(member.node.key) ?? type,
      });
      visit(member.declared, memberPath, [...above, member.node.key]);
    }
  };
  visit(listTypeSources(space, type), [], []);
  return table;
}

/** A browse path as one text: names with namespace URI joined by `/`, `&` before reserved characters as in OPC 10000-4 §A.2. */
export function toPathKey(path: readonly QualifiedName[]): string {
  return path.map((name) => formatQualifiedName({ ...name, name: name.name.replace(/[/.<>:#!&]/g, "&$&") })).join("/");
}

export function isMandatory(rule: NodeKey | undefined): boolean {
  return rule === StandardModellingRule.Mandatory;
}

/**
 * Whether the declaration stands for any number of nodes with names of their own: placeholders, and a Variable that exposes
 * an array, one for each entry (§6.4.4.4.3).
 */
export function standsForMany(rule: NodeKey | undefined): boolean {
  return isPlaceholder(rule) || rule === StandardModellingRule.ExposesItsArray;
}

export function isPlaceholder(rule: NodeKey | undefined): boolean {
  return rule === StandardModellingRule.OptionalPlaceholder || rule === StandardModellingRule.MandatoryPlaceholder;
}
