/** What the ruler shows of an image: its fields with names, types, ranges and places in words. Pure. */
import type { IoddSimpleDatatype, ProcessDataImage, RecordItem } from "~/domain/iodd/device-description";
import { formatBound } from "~/domain/live/format-live";
import { planFrame, type FieldPlan, type FramePlan } from "~/domain/mapping/decode-frame";
import { findFieldName, pickText } from "./field-name";

export type FrameField = {
  readonly subindex: number;
  readonly name: string;
  readonly description: string | undefined;
  readonly plan: FieldPlan;
  readonly bitOffset: number;
  readonly bitLength: number;
  readonly typeText: string;
  /** `31 … 16`, or `3` for a single bit: highest first, as the ruler is read. */
  readonly bitText: string;
  /** `octets 0 … 1`, in the order of transmission. */
  readonly octetText: string;
  /** `× 0.1 − 40`; empty where raw is the value. */
  readonly scaleText: string;
  readonly unitText: string;
  /** Ranges as values in the unit. */
  readonly rangeText: string;
  readonly named: readonly { readonly raw: string; readonly text: string }[];
};

export type FrameView = { readonly plan: FramePlan; readonly octets: number; readonly fields: readonly FrameField[] };

export type FrameViewOptions = { readonly profileCharacteristic?: readonly number[]; readonly language?: string };

/** Fields in the order of transmission: the highest bit first. */
export function viewFrame(image: ProcessDataImage, options: FrameViewOptions = {}): FrameView {
  const plan = planFrame(image, options);
  const items = image.type.kind === "RecordT" ? image.type.items : [];
  const fields = plan.fields.map((field) =>
    toField(
      field,
      items.find((item) => item.subindex === field.subindex),
      plan.octets,
      image,
      options.language,
    ),
  );
  fields.sort((a, b) => b.bitOffset + b.bitLength - (a.bitOffset + a.bitLength) || a.subindex - b.subindex);
  return { plan, octets: plan.octets, fields };
}

function toField(
  plan: FieldPlan,
  item: RecordItem | undefined,
  octets: number,
  image: ProcessDataImage,
  language: string | undefined,
): FrameField {
  const { type, bitOffset, bitLength, gradient, offset } = plan;
  const last = bitOffset + bitLength - 1;
  const first = octets - 1 - (last >> 3);
  const end = octets - 1 - (bitOffset >> 3);
  return {
    subindex: plan.subindex,
    name: findFieldName(image, plan.subindex, language) ?? plan.id.replace(/_/g, " "),
    description: pickText(item?.description, language),
    plan,
    bitOffset,
    bitLength,
    typeText: formatType(type),
    bitText: last === bitOffset ? String(bitOffset) : `${last} … ${bitOffset}`,
    octetText: first === end ? `octet ${first}` : `octets ${first} … ${end}`,
    scaleText: formatScale(gradient, offset),
    unitText: plan.unit?.symbol ?? "",
    rangeText:
      "ranges" in type ? type.ranges.map((range) => formatScaledRange(range, gradient, offset)).join(", ") : "",
    named:
      "singleValues" in type
        ? type.singleValues.map(({ value, name }) => ({ raw: formatRaw(value), text: pickText(name, language) ?? "" }))
        : [],
  };
}

function formatRaw(value: number | boolean | string): string {
  return typeof value === "number" ? formatBound(value) : String(value);
}

/** Names of IEC and OPC UA integers with the bit length of the IODD: `Int14`, `UInt4`. */
export function formatType(type: IoddSimpleDatatype): string {
  switch (type.kind) {
    case "BooleanT":
      return "Boolean";
    case "UIntegerT":
      return `UInt${type.bitLength}`;
    case "IntegerT":
      return `Int${type.bitLength}`;
    case "Float32T":
      return "Float32";
    case "StringT":
      return `String, ${type.fixedLength} octets`;
    case "OctetStringT":
      return `Octets, ${type.fixedLength}`;
    case "TimeT":
      return "Time";
    case "TimeSpanT":
      return "TimeSpan";
  }
}

export function formatScale(gradient: number, offset: number): string {
  const parts = [
    gradient === 1 ? "" : `× ${formatFactor(gradient)}`,
    offset === 0 ? "" : `${offset < 0 ? "−" : "+"} ${formatFactor(Math.abs(offset))}`,
  ];
  return parts.filter((part) => part !== "").join(" ");
}

/** All digits of a factor: a gradient of 0.016666667 must not be rounded in sight. */
function formatFactor(value: number): string {
  return String(value).replace("-", "−");
}

function formatScaledRange(range: { lower: number; upper: number }, gradient: number, offset: number): string {
  const ends = [range.lower, range.upper].map((raw) => Number((raw * gradient + offset).toPrecision(12)));
  const low = Math.min(...ends);
  const high = Math.max(...ends);
  return low === high ? formatBound(low) : `${formatBound(low)} … ${formatBound(high)}`;
}
