/**
 * A machine type's mapping as a whole: out of the entries that the model keeps, in the two forms that are needed. People
 * and the running mapping read paths, the model keeps targets (list-targets.ts). `toMapping` and `fromMapping` are inverse
 * to each other for every mapping whose targets exist.
 */
import type { AddressSpace } from "../address-space/address-space";
import { getDisplayName } from "../address-space/browse";
import type { NodeKey } from "../address-space/node-id";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { toProcessDataImage } from "../iodd/process-data-schema";
import type { Operation } from "../editing/operation";
import { findTarget, findTargetByPath, listTargets, type Target } from "./list-targets";
import { listParts, readPart, type PartEntry } from "./mapping-entries";
import type { CheckCase, Role } from "./mapping-parts";
import type { Mapping, MappingRow, RowContent, SourceReference } from "./mapping";
import type { FindLayout, PlanMappingOptions } from "./plan-mapping";

export type TypeRow = {
  /** As the model keeps it. */
  readonly target: string;
  /** What rows are listed and addressed by: two rows, in and out, may share one target. */
  readonly id: string;
  readonly row: RowContent;
  /** Undefined when the type has no such member any more. */
  readonly info: Target | undefined;
  readonly path: string;
};

export type TypeMapping = {
  readonly type: NodeKey;
  readonly roles: readonly PartEntry<"role">[];
  readonly rows: readonly TypeRow[];
  readonly cases: readonly PartEntry<"check-case">[];
};

/** An output row is kept beside the input row of its target under this id. */
const OUT_PREFIX = "out ";

export function toRowId(target: string, direction: "in" | "out" = "in"): string {
  return direction === "out" ? `${OUT_PREFIX}${target}` : target;
}

export function toRowTarget(id: string): string {
  return id.startsWith(OUT_PREFIX) ? id.slice(OUT_PREFIX.length) : id;
}

/** Rows in the order of the type's members; those whose member is gone at the end. */
export function readTypeMapping(space: AddressSpace, type: NodeKey): TypeMapping {
  const rows = listParts(space, "row", type).map(({ id, value }): TypeRow => {
    const target = toRowTarget(id);
    const info = findTarget(space, type, target);
    return { id, target, row: value, info, path: info?.path ?? describeLost(space, target) };
  });
  const places = new Map(listTargets(space, type).map((info, place) => [info, place] as const));
  const placeOf = (row: TypeRow): number => (row.info && places.get(row.info)) ?? places.size;
  return {
    type,
    roles: listParts(space, "role", type),
    rows: rows.sort((a, b) => placeOf(a) - placeOf(b)),
    cases: listParts(space, "check-case", type),
  };
}

/** A name for a member that is no longer of the type. */
function describeLost(space: AddressSpace, target: string): string {
  const [key = "", below] = target.split("\n");
  const node = space.getNode(key as NodeKey);
  const name = node ? getDisplayName(node) : key;
  return below === undefined ? name : `${name}/${below}`;
}

/** The mapping with paths, as documents and the running mapping have it; rows whose member is gone are left out. */
export function toMapping(space: AddressSpace, type: NodeKey): Mapping {
  const { roles, rows } = readTypeMapping(space, type);
  return {
    machineType: space.getNode(type)?.browseName.name ?? type,
    roles: roles.map(({ id, value }) => ({ role: id, ...toDocumentRole(value) })),
    rows: rows.flatMap(({ info, row }): MappingRow[] =>
      info ? [{ target: info.path, ...row, source: mapMembers(row.source, (t) => findTarget(space, type, t)?.path ?? t) }] : [],
    ),
  };
}

/** What of a role belongs in a document: not what only this installation knows, nor what stands in its layouts. */
function toDocumentRole(role: Role): Omit<Mapping["roles"][number], "role"> {
  const { deviceDescriptionId: _id, layouts: _layouts, profileCharacteristic: _profiles, formerNames: _names, ...rest } = role;
  return rest;
}

/** Members that formulas read, under other names. */
function mapMembers(source: SourceReference, rename: (target: string) => string): SourceReference {
  if (source.kind !== "formula") return source;
  const inputs = Object.entries(source.inputs).map(([name, input]) => [
    name,
    input.kind === "member" ? { ...input, target: rename(input.target) } : input,
  ]);
  return { ...source, inputs: Object.fromEntries(inputs) as typeof source.inputs };
}

/** Whether a formula of the row reads the member. */
export function readsMember(row: RowContent, target: string): boolean {
  if (row.source.kind !== "formula") return false;
  return Object.values(row.source.inputs).some((input) => input.kind === "member" && input.target === target);
}

/** Layouts that the roles carry, as the plan of a mapping asks for them. Problem: `mapping.no-device`. */
export function makeRoleLayouts(space: AddressSpace, type: NodeKey): FindLayout {
  return (role, direction) => {
    const value = readPart(space, "role", type, role);
    const image = value?.layouts?.[direction];
    if (!value || !image) return fail(problem("mapping.no-device", { role }));
    return ok({ image: toProcessDataImage(image), profileCharacteristic: value.profileCharacteristic ?? [] });
  };
}

/** Ranges of the Variables that rows feed, by path. */
export function makeTargetRanges(space: AddressSpace, type: NodeKey): NonNullable<PlanMappingOptions["findRanges"]> {
  return (path) => {
    const target = findTargetByPath(space, type, path);
    if (!target) return undefined;
    const { range, instrumentRange } = target;
    return { ...(range ? { range } : {}), ...(instrumentRange ? { instrumentRange } : {}) };
  };
}

/** What comes with a mapping from elsewhere. */
export type MappingExtras = {
  /** Layouts and profile identifiers by role. */
  readonly roles?: ReadonlyMap<string, Pick<Role, "layouts" | "profileCharacteristic">>;
  /** Check cases with paths for targets. */
  readonly cases?: readonly CheckCase[];
};

/**
 * The operations that make the type's mapping equal to another one: what is not in it goes. What only this installation
 * knows of a role stays while the device stays the same. Problem: `mapping.unknown-target`.
 */
export function fromMapping(space: AddressSpace, type: NodeKey, mapping: Mapping, extras: MappingExtras = {}): Result<Operation[]> {
  const problems: Problem[] = [];
  const toTarget = (path: string): string => {
    const target = findTargetByPath(space, type, path)?.target;
    if (target === undefined) problems.push(problem("mapping.unknown-target", { path }, { path }));
    return target ?? path;
  };
  const roles = mapping.roles.map(({ role, ...value }) => [role, restoreRole(space, type, role, { ...value, ...extras.roles?.get(role) })] as const);
  const rows = mapping.rows.map(({ target, ...row }) => {
    const source = mapMembers(row.source, toTarget);
    return [toRowId(toTarget(target), row.direction), { ...row, source }] as const;
  });
  const cases = (extras.cases ?? []).map((value, i) => {
    const expected = value.expected.map((e) => ({ ...e, target: toTarget(e.target) }));
    return [findCaseId(space, type, value.name) ?? `case-${i + 1}`, { ...value, expected }] as const;
  });
  if (problems.length > 0) return fail(...problems);
  return ok([
    ...replaceAll(space, "role", type, new Map<string, unknown>(roles)),
    ...replaceAll(space, "row", type, new Map<string, unknown>(rows)),
    ...(extras.cases ? replaceAll(space, "check-case", type, new Map<string, unknown>(cases)) : []),
  ]);
}

function findCaseId(space: AddressSpace, type: NodeKey, name: string): string | undefined {
  return listParts(space, "check-case", type).find((c) => c.value.name === name)?.id;
}

function restoreRole(space: AddressSpace, type: NodeKey, name: string, value: Role): Role {
  const before = readPart(space, "role", type, name);
  const isSame = before?.vendorId === value.vendorId && before?.deviceId === value.deviceId;
  if (!before || !isSame) return value;
  const { deviceDescriptionId, formerNames } = before;
  return { ...value, ...(deviceDescriptionId === undefined ? {} : { deviceDescriptionId }), ...(formerNames ? { formerNames } : {}) };
}

function replaceAll(
  space: AddressSpace,
  part: "role" | "row" | "check-case",
  owner: NodeKey,
  wanted: ReadonlyMap<string, unknown>,
): Operation[] {
  const operations: Operation[] = [];
  for (const { id } of listParts(space, part, owner)) {
    if (!wanted.has(id)) operations.push({ kind: "setMapping", part, owner, id });
  }
  for (const [id, value] of wanted) {
    if (JSON.stringify(readPart(space, part, owner, id)) === JSON.stringify(value)) continue;
    operations.push({ kind: "setMapping", part, owner, id, value });
  }
  return operations;
}
