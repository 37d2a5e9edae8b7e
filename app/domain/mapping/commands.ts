/**
 * Edits of mappings as people mean them. Each answers the operations of one transaction; nothing is allocated and nothing
 * beside the mapping changes, so that an integrator may do all of them.
 */
import type { AddressSpace } from "../address-space/address-space";
import type { MappingPart } from "../address-space/mapping-entry";
import type { NodeKey } from "../address-space/node-id";
import { fail, ok, problem, type Result } from "../core/result";
import type { Operation } from "../editing/operation";
import type { DeviceDescription, Direction } from "../iodd/device-description";
import { processDataImageSchema } from "../iodd/process-data-schema";
import { chooseLayout } from "./choose-layout";
import { planFrame, type FieldPlan } from "./decode-frame";
import { findTarget } from "./list-targets";
import { listParts, readPart } from "./mapping-entries";
import { mappingPartSchemas, type MappingPartValues, type Role } from "./mapping-parts";
import type { RowContent, SourceReference } from "./mapping";
import { proposeTransforms } from "./propose-transforms";
import { makeRoleLayouts, toRowId } from "./type-mapping";

/** Sets or, without a value, removes one entry. Problem: `mapping.invalid` with the place in the value. */
export function setPart<P extends MappingPart>(
  part: P,
  owner: NodeKey,
  id: string,
  value?: MappingPartValues[P],
): Result<Operation[]> {
  if (value === undefined) return ok([{ kind: "setMapping", part, owner, id }]);
  const checked = mappingPartSchemas[part].safeParse(value);
  if (!checked.success) {
    const issues = checked.error.issues.slice(0, 20);
    return fail(...issues.map((i) => problem("mapping.invalid", { place: i.path.join("/"), message: i.message })));
  }
  return ok([{ kind: "setMapping", part, owner, id, value: checked.data }]);
}

/** Adds a role or changes it. Problem: `mapping.role-name` for an empty or a taken name. */
export function addRole(space: AddressSpace, type: NodeKey, name: string, value: Role): Result<Operation[]> {
  const trimmed = name.trim();
  if (trimmed === "" || trimmed.length > 100 || readPart(space, "role", type, trimmed)) {
    return fail(problem("mapping.role-name", { role: trimmed }));
  }
  return setPart("role", type, trimmed, value);
}

/** Renames a role with all rows and check cases that name it; machines bound under the old name stay bound. */
export function renameRole(space: AddressSpace, type: NodeKey, from: string, to: string): Result<Operation[]> {
  const role = readPart(space, "role", type, from);
  if (!role) return fail(problem("mapping.no-such-role", { role: from }));
  const name = to.trim();
  const added = addRole(space, type, name, { ...role, formerNames: [...(role.formerNames ?? []), from].slice(-50) });
  if (!added.ok) return added;
  const operations: Operation[] = [{ kind: "setMapping", part: "role", owner: type, id: from }, ...added.value];
  for (const part of ["row", "check-case"] as const) {
    for (const { id, value } of listParts(space, part, type)) {
      const renamed = renameInside(value, from, name);
      if (renamed !== value) operations.push({ kind: "setMapping", part, owner: type, id, value: renamed });
    }
  }
  return ok(operations);
}

/** Replaces the role's name wherever a reference carries it; the same object when nothing changed. */
function renameInside<T>(value: T, from: string, to: string): T {
  const text = JSON.stringify(value, (key: string, inner: unknown) => {
    if (key === "role" && inner === from) return to;
    if (key === "roles" && Array.isArray(inner)) return inner.map((role: unknown) => (role === from ? to : role));
    return inner;
  });
  return text === JSON.stringify(value) ? value : (JSON.parse(text) as T);
}

/** Removes a role. Problem: `mapping.role-in-use` with the number of rows that read it. */
export function removeRole(space: AddressSpace, type: NodeKey, name: string): Result<Operation[]> {
  const count = listParts(space, "row", type).filter(({ value }) => renameInside(value, name, "") !== value).length;
  if (count > 0) return fail(problem("mapping.role-in-use", { role: name, count }));
  return setPart("role", type, name);
}

/** A role's value for a device of the library: what it is, and the layouts that the mapping then decodes with. */
export function makeDeviceRole(device: DeviceDescription, deviceDescriptionId: string, condition?: string): Role {
  const layout = (direction: Direction) => {
    const image = chooseLayout(device, direction, condition);
    const checked = image.ok ? processDataImageSchema.safeParse(image.value) : undefined;
    return checked?.success ? { [direction]: checked.data } : {};
  };
  const name = Object.values(device.deviceName ?? {})[0] ?? device.variants[0]?.productId;
  return {
    kind: "io-link-device",
    vendorId: device.vendorId,
    deviceId: device.deviceId,
    deviceDescriptionId,
    ...(name === undefined ? {} : { productName: name }),
    ...(condition === undefined ? {} : { condition }),
    profileCharacteristic: [...device.profileCharacteristic],
    layouts: { ...layout("in"), ...layout("out") },
  };
}

/** The field of a role's process data with its place in the frame; undefined where the role has no such field. */
export function findRoleField(
  space: AddressSpace,
  type: NodeKey,
  role: string,
  direction: Direction,
  subindex: number,
): FieldPlan | undefined {
  const layout = makeRoleLayouts(space, type)(role, direction);
  if (!layout.ok) return undefined;
  const { image, profileCharacteristic } = layout.value;
  return planFrame(image, { profileCharacteristic }).fields.find((f) => f.subindex === subindex);
}

export type MappedRow = { readonly operations: readonly Operation[]; readonly row: RowContent; readonly reasons: readonly string[] };

/**
 * What dropping a source on a Variable means: a row with the conversions that unit and data type ask for. `field` is known
 * for process data; `unit` (UN/CEFACT code) for other sources that tell one. What stood in the row beside its source stays.
 * Problems: `mapping.unknown-target`, `transform.unit-dimension` (as a warning: the row is made without a conversion).
 */
export function mapSource(
  space: AddressSpace,
  type: NodeKey,
  target: string,
  source: SourceReference,
  facts: { readonly field?: FieldPlan; readonly unit?: string; readonly scale?: number; readonly offset?: number } = {},
): Result<MappedRow> {
  const info = findTarget(space, type, target);
  if (!info) return fail(problem("mapping.unknown-target", { path: target }));
  const before = readPart(space, "row", type, toRowId(info.target));
  const proposal = proposeTransforms(info, facts);
  const row: RowContent = { period: 500, ...before, source, transforms: proposal.transforms };
  const set = setPart("row", type, toRowId(info.target), row);
  return set.ok ? ok({ operations: set.value, row, reasons: proposal.reasons }, proposal.problems) : set;
}

/** A field of process data dropped on a Variable. Problem: `mapping.unknown-field` beside those of `mapSource`. */
export function mapField(
  space: AddressSpace,
  type: NodeKey,
  target: string,
  place: { readonly role: string; readonly direction: Direction; readonly subindex: number },
): Result<MappedRow> {
  const { role, direction, subindex } = place;
  const field = findRoleField(space, type, role, direction, subindex);
  if (!field) return fail(problem("mapping.unknown-field", { role, direction, subindex }));
  return mapSource(space, type, target, { kind: "process-data", role, direction, subindex }, { field });
}
