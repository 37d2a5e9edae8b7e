/** What a row of a mapping delivers, as far as that is known before anything runs. */
import type { FieldPlan } from "../mapping/decode-frame";
import { planFrame } from "../mapping/decode-frame";
import type { Target } from "../mapping/list-targets";
import type { MappingRow, Transform } from "../mapping/mapping";
import { makeScaler } from "../mapping/scale";
import { convert } from "../units/units";
import type { WiredMapping } from "./wiring";

export type Interval = { readonly low: number; readonly high: number };

/** The field of process data that a row reads. */
export function findField({ findLayout }: WiredMapping, { source }: Pick<MappingRow, "source">): FieldPlan | undefined {
  if (source.kind !== "process-data") return undefined;
  const layout = findLayout(source.role, source.direction);
  if (!layout.ok) return undefined;
  const { image, profileCharacteristic } = layout.value;
  return planFrame(image, { profileCharacteristic }).fields.find((f) => f.subindex === source.subindex);
}

export function findTargetOf({ targets }: WiredMapping, row: MappingRow): Target | undefined {
  return targets.find((t) => t.path === row.target);
}

/** UN/CEFACT code of what reaches the Variable; undefined where the source tells none or a transform hides it. */
export function findUnit(row: MappingRow, field: FieldPlan | undefined): string | undefined {
  let code = field?.unit?.code === "" ? undefined : field?.unit?.code;
  for (const transform of row.transforms) {
    if (transform.kind === "unit") code = transform.to;
    else if (!keepsUnit(transform)) code = undefined;
  }
  return code;
}

function keepsUnit({ kind }: Transform): boolean {
  return kind === "deadband" || kind === "average";
}

/** The physical values that the source can deliver, after the transforms; undefined where nobody says so. */
export function findInterval(row: MappingRow, field: FieldPlan | undefined): Interval | undefined {
  const ranges = field && "ranges" in field.type ? field.type.ranges : [];
  if (!field || ranges.length === 0) return undefined;
  const scale = makeScaler(field);
  let ends = ranges.flatMap((r) => [scale(r.lower), scale(r.upper)]);
  for (const transform of row.transforms) {
    const change = makeChange(transform);
    if (!change) return undefined;
    ends = ends.map(change);
  }
  return ends.some((end) => !Number.isFinite(end)) ? undefined : { low: Math.min(...ends), high: Math.max(...ends) };
}

/** Only transforms that keep the order of values tell where the ends go. */
function makeChange(transform: Transform): ((value: number) => number) | undefined {
  switch (transform.kind) {
    case "linear":
      return makeScaler(transform);
    case "unit":
      return (value) => {
        const converted = convert(value, transform.from, transform.to);
        return converted.ok ? converted.value : Number.NaN;
      };
    case "deadband":
    case "average":
      return (value) => value;
    default:
      return undefined;
  }
}

export type ValueKind = "boolean" | "integer" | "real" | "text" | "time" | "octets";

/** What kind of value reaches the Variable, and how many bits an integer takes; undefined where it is not known. */
export type SourceKind = { readonly kind: ValueKind; readonly bits?: number; readonly isSigned?: boolean };

export function findSourceKind(row: MappingRow, field: FieldPlan | undefined): SourceKind | undefined {
  let at = field ? findFieldKind(field) : findReferenceKind(row);
  for (const transform of row.transforms) at = at && afterTransform(transform, at);
  return at;
}

function findFieldKind(field: FieldPlan): SourceKind {
  const { type } = field;
  const isScaled = field.gradient !== 1 || field.offset !== 0;
  switch (type.kind) {
    case "BooleanT":
      return { kind: "boolean" };
    case "UIntegerT":
    case "IntegerT":
      return isScaled
        ? { kind: "real" }
        : { kind: "integer", bits: type.bitLength, isSigned: type.kind === "IntegerT" };
    case "Float32T":
      return { kind: "real" };
    case "StringT":
      return { kind: "text" };
    case "OctetStringT":
      return { kind: "octets" };
    case "TimeT":
      return { kind: "time" };
    case "TimeSpanT":
      return { kind: "real" };
  }
}

function findReferenceKind({ source }: MappingRow): SourceKind | undefined {
  switch (source.kind) {
    case "register": {
      if (source.table === "coil" || source.table === "discrete-input" || source.bit !== undefined)
        return { kind: "boolean" };
      const type = source.type ?? "UInt16";
      if (type.startsWith("Float")) return { kind: "real" };
      return { kind: "integer", bits: Number(/\d+$/.exec(type)?.[0] ?? 16), isSigned: type.startsWith("Int") };
    }
    case "validity":
      return { kind: "boolean" };
    case "device-status":
    case "port-status":
      return { kind: "integer", bits: 8, isSigned: false };
    case "event-code":
      return { kind: "boolean" };
    case "constant":
      return {
        kind: typeof source.value === "boolean" ? "boolean" : typeof source.value === "string" ? "text" : "real",
      };
    case "formula":
      return { kind: "real" };
    default:
      return undefined;
  }
}

function afterTransform(transform: Transform, before: SourceKind): SourceKind | undefined {
  switch (transform.kind) {
    case "bit":
      return { kind: "boolean" };
    case "value-map": {
      const isText = transform.entries.some(({ to }) => typeof to === "string");
      return isText ? { kind: "text" } : { kind: "integer", bits: 32, isSigned: true };
    }
    case "deadband":
      return before;
    case "counter":
      return before.kind === "integer"
        ? { kind: "integer", bits: Math.max(transform.bits, before.bits ?? 0), isSigned: false }
        : before;
    default:
      return { kind: "real" };
  }
}
