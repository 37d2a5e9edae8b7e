/**
 * How machines are fed stands in the model beside its nodes, so that one revision freezes both, and undo, collaboration
 * and audit hold for it without more. Here an entry is an addressed value; what a value says is the mapping's business
 * (mapping/mapping-parts.ts).
 */
import { ShardedMap } from "../core/sharded-map";
import type { NodeKey } from "./node-id";

/** Roles, rows, check cases and surveyed signals of a machine type; bindings and exceptions of a machine. */
export const mappingParts = ["role", "row", "check-case", "signal", "binding", "exception"] as const;
export type MappingPart = (typeof mappingParts)[number];

export type MappingAddress = {
  readonly part: MappingPart;
  /** The machine type or the machine. */
  readonly owner: NodeKey;
  readonly id: string;
};

export type MappingEntry = MappingAddress & { readonly value: unknown };

export type MappingEntries = ShardedMap<MappingEntry>;

const SEPARATOR = "\u001f";

export function toMappingKey({ part, owner, id }: MappingAddress): string {
  return [part, owner, id].join(SEPARATOR);
}

export function makeMappingEntries(entries: readonly MappingEntry[]): MappingEntries {
  return ShardedMap.from(entries.map((entry) => [toMappingKey(entry), entry] as const));
}

/** All entries in an order that depends on their addresses alone, so that equal mappings make equal packs. */
export function listMappingEntries(entries: MappingEntries | undefined): MappingEntry[] {
  if (!entries) return [];
  return [...entries.entries()].sort(([a], [b]) => (a < b ? -1 : 1)).map(([, entry]) => entry);
}
