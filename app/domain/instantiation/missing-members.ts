/**
 * Compares an instance with the declarations of its type (OPC 10000-3 §6.4.2, §6.4.4.4).
 *
 * - `listMissingMembers(space, instance)`: mandatory members that it lacks, at any depth below members that it has; empty
 *   means complete. A MandatoryPlaceholder without any node of its type is missing too.
 * - `listOfferedMembers(space, instance)`: optional members and placeholders that could be added.
 * - `walkInstance`: both node by node, used by the builder to complete an instance.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findTypeDefinition, listEdgesFrom } from "../address-space/browse";
import {
  isMandatory,
  listInstanceSources,
  listMemberDeclarations,
  listMemberSources,
  toPathKey,
  standsForMany,
  type DeclarationSource,
  type MemberDeclaration,
} from "../address-space/instance-declarations";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { isSameQualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { StandardModellingRule, StandardReferenceType } from "../address-space/standard-ids";
import { isSubtypeOf } from "../address-space/type-hierarchy";

/** One node of an instance with what is declared for it. */
export type InstanceLevel = {
  readonly parent: NodeKey;
  readonly path: readonly QualifiedName[];
  readonly sources: readonly DeclarationSource[];
  readonly members: readonly { readonly member: MemberDeclaration; readonly child: Node | undefined }[];
};

/** A member that an instance lacks or could have. */
export type OpenMember = {
  /** Browse path below the instance, and its key for `addDeclaredMembers`. */
  readonly path: readonly QualifiedName[];
  readonly pathKey: string;
  /** The existing node that it would hang on. */
  readonly parent: NodeKey;
  readonly declaration: NodeKey;
  readonly rule: NodeKey;
  /** It stands for any number of nodes with names of their own. */
  readonly isPlaceholder: boolean;
};

/** All levels of an instance that exist, from the top. `newScope` names the use of a type in one place. */
export function* walkInstance(
  space: AddressSpace,
  instance: NodeKey,
  newScope: () => string,
): Generator<InstanceLevel> {
  const seen = new Set<NodeKey>([instance]);
  const queue: Omit<InstanceLevel, "members">[] = [
    { parent: instance, path: [], sources: listInstanceSources(space, instance, newScope()) },
  ];
  for (let level = queue.shift(); level; level = queue.shift()) {
    const children = listHierarchicalChildren(space, level.parent);
    const members = listMemberDeclarations(space, level.sources).map((member) => ({
      member,
      child: findChild(children, member),
    }));
    yield { ...level, members };
    for (const { member, child } of members) {
      if (!child || seen.has(child.key) || standsForMany(member.rule)) continue;
      seen.add(child.key);
      const definition = findTypeDefinition(space, child.key) ?? member.typeDefinition;
      queue.push({
        parent: child.key,
        path: [...level.path, member.browseName],
        sources: listMemberSources(space, member, newScope(), definition),
      });
    }
  }
}

function listHierarchicalChildren(space: AddressSpace, key: NodeKey): Node[] {
  return listEdgesFrom(space, key, StandardReferenceType.HierarchicalReferences)
    .filter((e) => e.type !== StandardReferenceType.HasSubtype)
    .map((e) => space.getNode(e.target))
    .filter((n) => n !== undefined);
}

function findChild(children: readonly Node[], member: MemberDeclaration): Node | undefined {
  return children.find(
    (n) => n.nodeClass === member.node.nodeClass && isSameQualifiedName(n.browseName, member.browseName),
  );
}

/** Mandatory members that the instance lacks. Below an optional member that is absent nothing is missing. */
export function listMissingMembers(space: AddressSpace, instance: NodeKey): OpenMember[] {
  return listOpenMembers(space, instance, ({ parent }, member) => {
    if (member.rule === StandardModellingRule.MandatoryPlaceholder) return !hasStandIn(space, parent, member);
    return isMandatory(member.rule);
  });
}

/** Optional members that the instance has not, and placeholders, which take any number of nodes. */
export function listOfferedMembers(space: AddressSpace, instance: NodeKey): OpenMember[] {
  return listOpenMembers(
    space,
    instance,
    (_level, member) => member.rule === StandardModellingRule.Optional || standsForMany(member.rule),
  );
}

function listOpenMembers(
  space: AddressSpace,
  instance: NodeKey,
  isAsked: (level: InstanceLevel, member: MemberDeclaration) => boolean,
): OpenMember[] {
  const open: OpenMember[] = [];
  let scopes = 0;
  for (const level of walkInstance(space, instance, () => String(++scopes))) {
    for (const { member, child } of level.members) {
      if (child || !isAsked(level, member)) continue;
      const path = [...level.path, member.browseName];
      open.push({
        path,
        pathKey: toPathKey(path),
        parent: level.parent,
        declaration: member.node.key,
        rule: member.rule,
        isPlaceholder: standsForMany(member.rule),
      });
    }
  }
  return open;
}

/** Whether some child of the declared class and type stands for the placeholder (§6.4.4.4.5). */
function hasStandIn(space: AddressSpace, parent: NodeKey, member: MemberDeclaration): boolean {
  return listHierarchicalChildren(space, parent).some((child) => {
    if (child.nodeClass !== member.node.nodeClass) return false;
    const definition = findTypeDefinition(space, child.key);
    return (
      member.typeDefinition === undefined ||
      (definition !== undefined && isSubtypeOf(space, definition, member.typeDefinition))
    );
  });
}
