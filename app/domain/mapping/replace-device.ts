/**
 * What replacing the device of a role means, told before it is bought: which fields go, come or move, which rows are
 * touched, what has to be proved again. The same device (same vendor and device id) changes nothing but its serial number.
 */
import type { AddressSpace } from "../address-space/address-space";
import type { NodeKey } from "../address-space/node-id";
import { fail, ok, problem, type Result } from "../core/result";
import type { Operation } from "../editing/operation";
import type { DeviceDescription, Direction } from "../iodd/device-description";
import { canConvert } from "../units/units";
import { findMappedType, listBoundRoles, type BoundRole } from "./bindings";
import { makeDeviceRole } from "./commands";
import { planFrame, type FieldPlan } from "./decode-frame";
import { compareNames } from "./name-likeness";
import { proposeTransforms } from "./propose-transforms";
import { readTypeMapping, type TypeRow } from "./type-mapping";
import type { Role } from "./mapping-parts";
import type { MappingRow, RowContent } from "./mapping";

/** Same: same ids. Compatible: every field that a row reads lies where it lay, with type, scaling and unit as they were. */
export type ReplacementKind = "same" | "compatible" | "other";

export type FieldChange = {
  readonly direction: Direction;
  readonly subindex: number;
  readonly before: string | undefined;
  readonly after: string | undefined;
  readonly change: "same" | "moved" | "scaling" | "type" | "gone" | "new";
  readonly text: string;
};

export type RowImpact = {
  readonly target: string;
  readonly path: string;
  readonly effect: "keeps" | "changes" | "loses";
  readonly text: string;
  /** The row on the new device, where a field for it was found. */
  readonly proposal: RowContent | undefined;
};

export type Replacement = {
  readonly kind: ReplacementKind;
  readonly role: string;
  readonly fields: readonly FieldChange[];
  readonly rows: readonly RowImpact[];
  /** Paths of the Variables whose point check is due again: all that the device feeds. */
  readonly pointChecks: readonly string[];
  /** The role on the new device. */
  readonly value: Role;
};

/**
 * `device` and `deviceDescriptionId` are the new device's. Problem: `replace.no-role` when the machine's type has no such
 * role of an IO-Link device.
 */
export function previewReplacement(
  space: AddressSpace,
  machine: NodeKey,
  role: string,
  device: DeviceDescription,
  deviceDescriptionId: string,
): Result<Replacement> {
  const type = findMappedType(space, machine);
  const bound = listBoundRoles(space, machine).find((b) => b.role === role);
  if (type === undefined || bound?.value.kind !== "io-link-device") return fail(problem("replace.no-role", { role }));
  const value = makeDeviceRole(device, deviceDescriptionId, bound.value.condition);
  const rows = readTypeMapping(space, type).rows.filter((row) => readsRole(row.row, role));
  const pointChecks = rows.map((row) => row.path);
  const isSame = bound.value.vendorId === device.vendorId && bound.value.deviceId === device.deviceId;
  const fields = (["in", "out"] satisfies Direction[]).flatMap((direction) => compareFields(direction, bound.value, value));
  const impacts = rows.map((row) => rateRow(row, role, fields, bound, value));
  const keeps = impacts.every((impact) => impact.effect === "keeps");
  return ok({ kind: isSame && keeps ? "same" : keeps ? "compatible" : "other", role, fields, rows: impacts, pointChecks, value });
}

function readsRole(row: RowContent, role: string): boolean {
  return JSON.stringify(row.source).includes(`"role":${JSON.stringify(role)}`) || (row.source.kind === "device-status" && row.source.roles.includes(role));
}

function listFields(value: Role, direction: Direction): readonly FieldPlan[] {
  const image = value.layouts?.[direction];
  if (!image) return [];
  return planFrame(image, { profileCharacteristic: value.profileCharacteristic ?? [] }).fields;
}

function compareFields(direction: Direction, before: Role, after: Role): FieldChange[] {
  const old = listFields(before, direction);
  const now = listFields(after, direction);
  const changes = old.map((field): FieldChange => {
    const same = now.find((f) => f.subindex === field.subindex);
    const common = { direction, subindex: field.subindex, before: describe(field), after: same && describe(same) };
    if (!same) return { ...common, change: "gone", text: `${field.id} is gone` };
    if (JSON.stringify(toKind(same)) !== JSON.stringify(toKind(field))) return { ...common, change: "type", text: `${field.id} has another type` };
    const isScaled = same.gradient !== field.gradient || same.offset !== field.offset || same.unit?.ioddCode !== field.unit?.ioddCode;
    if (isScaled) return { ...common, change: "scaling", text: `${field.id} has another scaling or unit` };
    if (same.bitOffset !== field.bitOffset) return { ...common, change: "moved", text: `${field.id} lies at bit ${same.bitOffset} instead of ${field.bitOffset}` };
    return { ...common, change: "same", text: `${field.id} stays` };
  });
  const added = now.filter((field) => !old.some((f) => f.subindex === field.subindex));
  return [...changes, ...added.map((field): FieldChange => ({ direction, subindex: field.subindex, before: undefined, after: describe(field), change: "new", text: `${field.id} is new` }))];
}

function toKind({ type }: FieldPlan) {
  return { kind: type.kind, bits: "bitLength" in type ? type.bitLength : 0 };
}

function describe({ id, type, bitOffset, bitLength, gradient, offset, unit }: FieldPlan): string {
  const scaling = gradient === 1 && offset === 0 ? "" : ` × ${gradient}${offset === 0 ? "" : ` + ${offset}`}`;
  return `${id}: ${type.kind} ${bitLength} bit @${bitOffset}${scaling}${unit ? ` ${unit.symbol}` : ""}`;
}

/** A row stays as it is while its fields decode to the same values; a moved field is decoded by the new layout. */
function rateRow({ target, path, row, info }: TypeRow, role: string, fields: readonly FieldChange[], bound: BoundRole, value: Role): RowImpact {
  const { source } = row;
  const common = { target, path };
  if (source.kind !== "process-data") return { ...common, effect: "keeps", text: "does not read its process data by itself", proposal: row };
  const change = fields.find((f) => f.direction === source.direction && f.subindex === source.subindex);
  if (change?.change === "same") return { ...common, effect: "keeps", text: change.text, proposal: row };
  if (change?.change === "moved") return { ...common, effect: "keeps", text: `${change.text}; decoding follows the new layout`, proposal: row };
  const before = listFields(bound.value, source.direction).find((f) => f.subindex === source.subindex);
  const after = findHeir(before, listFields(value, source.direction), path);
  if (!after || !info) return { ...common, effect: "loses", text: change?.text ?? "its field is gone", proposal: undefined };
  const { transforms, reasons } = proposeTransforms(info, { field: after });
  const proposal: MappingRow | RowContent = { ...row, source: { ...source, subindex: after.subindex }, transforms };
  return { ...common, effect: "changes", text: [change?.text, `now ${describe(after)}`, ...reasons].filter((t) => t !== undefined).join("; "), proposal };
}

/** The field of the new device that most likely measures the same: of a unit that converts, by likeness of names. */
function findHeir(before: FieldPlan | undefined, fields: readonly FieldPlan[], path: string): FieldPlan | undefined {
  const fits = fields.filter((field) => {
    const from = field.unit?.code ?? "";
    const to = before?.unit?.code ?? "";
    const isNumber = field.type.kind !== "BooleanT";
    if ((before?.type.kind === "BooleanT") === isNumber) return false;
    return from === to || from === "" || to === "" || canConvert(from, to);
  });
  const ranked = fits.map((field) => ({ field, score: rate(before, field, path) })).sort((a, b) => b.score - a.score);
  const [best] = ranked;
  return best && best.score > 0.3 ? best.field : undefined;
}

function rate(before: FieldPlan | undefined, field: FieldPlan, path: string): number {
  const name = field.id.replaceAll("_", " ");
  const byName = Math.max(compareNames(path, name).score, before ? compareNames(before.id.replaceAll("_", " "), name).score : 0);
  const hasUnit = before?.unit !== undefined && field.unit !== undefined;
  return 0.6 * byName + (hasUnit ? 0.4 : 0);
}

/**
 * The operations of a replacement: the machine's binding with the new serial number; for a device of another kind the
 * type's role and the rows that were agreed on, which then hold for all machines of the type.
 */
export function replaceDevice(
  space: AddressSpace,
  machine: NodeKey,
  replacement: Replacement,
  serialNumber: string,
): Result<{ readonly machine: readonly Operation[]; readonly type: readonly Operation[] }> {
  const type = findMappedType(space, machine);
  const bound = listBoundRoles(space, machine).find((b) => b.role === replacement.role);
  if (type === undefined || !bound?.binding) return fail(problem("replace.not-bound", { role: replacement.role }));
  const { deviceDescriptionId } = replacement.value;
  const binding = { ...bound.binding, serialNumber, ...(deviceDescriptionId === undefined ? {} : { deviceDescriptionId }) };
  const own: Operation[] = [{ kind: "setMapping", part: "binding", owner: machine, id: replacement.role, value: binding }];
  if (replacement.kind === "same") return ok({ machine: own, type: [] });
  const { formerNames } = bound.value;
  const value = { ...replacement.value, ...(formerNames ? { formerNames } : {}) };
  const rows = replacement.rows.flatMap((impact): Operation[] =>
    impact.effect === "changes" && impact.proposal ? [{ kind: "setMapping", part: "row", owner: type, id: impact.target, value: impact.proposal }] : [],
  );
  return ok({ machine: own, type: [{ kind: "setMapping", part: "role", owner: type, id: replacement.role, value }, ...rows] });
}
