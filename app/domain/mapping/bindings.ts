/** What a machine adds to the mapping of its type: where each role is found, and which rows differ. */
import type { AddressSpace } from "../address-space/address-space";
import { findTypeDefinition } from "../address-space/browse";
import type { NodeKey } from "../address-space/node-id";
import { listSupertypes } from "../address-space/type-hierarchy";
import { findMachineNode, findTarget, findTargetByPath } from "./list-targets";
import { listParts, readPart } from "./mapping-entries";
import type { Binding, Role, RowException } from "./mapping-parts";
import type { Mapping, MappingRow } from "./mapping";
import { toMapping, toRowTarget } from "./type-mapping";

export type BoundRole = {
  readonly role: string;
  readonly value: Role;
  /** Undefined while the machine has no source for it. */
  readonly binding: Binding | undefined;
};

export type MachineException = { readonly target: string; readonly path: string; readonly exception: RowException };

/** The type whose mapping feeds the machine: its type or the nearest supertype that has one. */
export function findMappedType(space: AddressSpace, machine: NodeKey): NodeKey | undefined {
  const type = findTypeDefinition(space, machine);
  if (type === undefined) return undefined;
  return [type, ...listSupertypes(space, type)].find((key) => listParts(space, "role", key).length > 0);
}

/** The roles of the machine's type with what it binds; a binding made under a former name of a role still holds. */
export function listBoundRoles(space: AddressSpace, machine: NodeKey): BoundRole[] {
  const type = findMappedType(space, machine);
  if (type === undefined) return [];
  return listParts(space, "role", type).map(({ id, value }) => {
    const names = [id, ...[...(value.formerNames ?? [])].reverse()];
    const binding = names.map((name) => readPart(space, "binding", machine, name)).find((b) => b !== undefined);
    return { role: id, value, binding };
  });
}

/** Exceptions with the paths of their rows; a row that the type has no more keeps its target text. */
export function listExceptions(space: AddressSpace, machine: NodeKey): MachineException[] {
  const type = findMappedType(space, machine);
  return listParts(space, "exception", machine).map(({ id, value }) => {
    const target = toRowTarget(id);
    const path = type === undefined ? undefined : findTarget(space, type, target)?.path;
    return { target, path: path ?? target, exception: value };
  });
}

/**
 * The mapping as it holds for one machine: exceptions applied, rows of members that the machine lacks left out together
 * with formulas that read them.
 */
export function toMachineMapping(space: AddressSpace, machine: NodeKey): Mapping | undefined {
  const type = findMappedType(space, machine);
  if (type === undefined) return undefined;
  const mapping = toMapping(space, type);
  const exceptions = new Map(listExceptions(space, machine).map((e) => [e.path, e.exception] as const));
  const isPresent = (path: string): boolean => {
    const target = findTargetByPath(space, type, path);
    return target !== undefined && findMachineNode(space, machine, target) !== undefined;
  };
  let rows = mapping.rows.flatMap((row): MappingRow[] => {
    const exception = exceptions.get(row.target);
    if (exception?.isMissing || !isPresent(row.target)) return [];
    return [exception?.row ? withException(row, exception.row) : row];
  });
  for (;;) {
    const targets = new Set(rows.map((row) => row.target));
    const kept = rows.filter((row) => listRead(row).every((target) => targets.has(target)));
    if (kept.length === rows.length) return { ...mapping, rows };
    rows = kept;
  }
}

function withException(row: MappingRow, change: NonNullable<RowException["row"]>): MappingRow {
  const given = Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined));
  return { ...row, ...given };
}

function listRead({ source }: MappingRow): string[] {
  if (source.kind !== "formula") return [];
  return Object.values(source.inputs).flatMap((input) => (input.kind === "member" ? [input.target] : []));
}
