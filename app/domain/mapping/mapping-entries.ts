/** Questions to the mapping that a model and its required models keep, typed by part. An owner has its entries in one layer. */
import type { AddressSpace } from "../address-space/address-space";
import { toMappingKey, type MappingEntries, type MappingPart } from "../address-space/mapping-entry";
import type { NodeKey } from "../address-space/node-id";
import type { MappingPartValues } from "./mapping-parts";

export type PartEntry<P extends MappingPart> = { readonly id: string; readonly value: MappingPartValues[P] };

/** One entry; undefined where there is none. The mapping of a machine's type stands in the layer of the type. */
export function readPart<P extends MappingPart>(
  space: AddressSpace,
  part: P,
  owner: NodeKey,
  id: string,
): MappingPartValues[P] | undefined {
  const key = toMappingKey({ part, owner, id });
  for (let i = space.layers.length - 1; i >= 0; i--) {
    const entry = space.layers[i]?.mapping?.get(key);
    // Every entry passed the schema of its part when it came in.
    if (entry) return entry.value as MappingPartValues[P];
  }
  return undefined;
}

/** All entries of one part of one owner by id, so that every window shows the same order. */
export function listParts<P extends MappingPart>(space: AddressSpace, part: P, owner: NodeKey): PartEntry<P>[] {
  for (let i = space.layers.length - 1; i >= 0; i--) {
    const found = getIndex(space.layers[i]?.mapping).get(part)?.get(owner);
    if (found) return found as PartEntry<P>[];
  }
  return [];
}

/** Who has entries of a part in the own model: machine types with roles, machines with bindings. */
export function listOwners(space: AddressSpace, part: MappingPart): NodeKey[] {
  return [...(getIndex(space.own.mapping).get(part)?.keys() ?? [])];
}

type Index = ReadonlyMap<MappingPart, ReadonlyMap<NodeKey, readonly PartEntry<MappingPart>[]>>;

/** Entries never change, and every drawing of a page asks for many of them. */
const indexes = new WeakMap<MappingEntries, Index>();
const EMPTY: Index = new Map();

function getIndex(entries: MappingEntries | undefined): Index {
  if (!entries) return EMPTY;
  const known = indexes.get(entries);
  if (known) return known;
  const index = new Map<MappingPart, Map<NodeKey, PartEntry<MappingPart>[]>>();
  for (const { part, owner, id, value } of entries.values()) {
    const owners = index.get(part) ?? new Map<NodeKey, PartEntry<MappingPart>[]>();
    index.set(part, owners);
    const list = owners.get(owner) ?? [];
    owners.set(owner, list);
    list.push({ id, value: value as MappingPartValues[MappingPart] });
  }
  for (const owners of index.values())
    for (const list of owners.values()) list.sort((a, b) => (a.id < b.id ? -1 : a.id > b.id ? 1 : 0));
  indexes.set(entries, index);
  return index;
}
