/** Questions along HasSubtype (OPC 10000-3 §7.10, §6.3). All of them end in graphs with cycles. */
import type { AddressSpace } from "./address-space";
import { standardKey, type NodeKey } from "./node-id";
import { StandardReferenceType } from "./standard-ids";

const { HasSubtype } = StandardReferenceType;

/** The roots of the four hierarchies; being used by everything they would be costly to ask, and they have none. */
const ROOTS: ReadonlySet<NodeKey> = new Set([58, 62, 24, 31].map(standardKey));

/**
 * The supertype of a type; the first one where a broken file gives several. The type itself mostly says it, so that the
 * nodes that use the type need not be looked through.
 */
export function findSupertype(space: AddressSpace, type: NodeKey): NodeKey | undefined {
  if (ROOTS.has(type)) return undefined;
  for (const reference of space.getNode(type)?.references ?? []) {
    if (reference.type === HasSubtype && !reference.isForward && reference.serverUri === undefined)
      return reference.target;
  }
  return space.findEdgeTo(type, HasSubtype)?.source;
}

/** The chain upwards without the type itself, nearest first; stops where a cycle closes. */
export function listSupertypes(space: AddressSpace, type: NodeKey): NodeKey[] {
  const chain: NodeKey[] = [];
  const seen = new Set<NodeKey>([type]);
  for (let at = findSupertype(space, type); at !== undefined && !seen.has(at); at = findSupertype(space, at)) {
    seen.add(at);
    chain.push(at);
  }
  return chain;
}

/** Direct subtypes in the order of declaration. */
export function listDirectSubtypes(space: AddressSpace, type: NodeKey): NodeKey[] {
  return space
    .edgesFrom(type)
    .filter((e) => e.type === HasSubtype)
    .map((e) => e.target);
}

/** The type and all types below it. */
export function collectSubtypes(space: AddressSpace, type: NodeKey): ReadonlySet<NodeKey> {
  const found = new Set<NodeKey>([type]);
  for (const at of found) for (const subtype of listDirectSubtypes(space, at)) found.add(subtype);
  return found;
}

/** Whether `type` is `ancestor` or below it. */
export function isSubtypeOf(space: AddressSpace, type: NodeKey, ancestor: NodeKey): boolean {
  return type === ancestor || listSupertypes(space, type).includes(ancestor);
}

/** A reference type with its subtypes, remembered by the address space while no ReferenceType changes. */
export function getReferenceTypes(space: AddressSpace, type: NodeKey): ReadonlySet<NodeKey> {
  const known = space.referenceTypeCache.get(type);
  if (known) return known;
  const closure = collectSubtypes(space, type);
  space.referenceTypeCache.set(type, closure);
  return closure;
}

export function isHierarchical(space: AddressSpace, referenceType: NodeKey): boolean {
  return getReferenceTypes(space, StandardReferenceType.HierarchicalReferences).has(referenceType);
}
