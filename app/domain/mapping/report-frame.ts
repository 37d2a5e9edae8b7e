/** A decoded frame as plain JSON, for the command line, the API and the decode bench. */
import type { DecodedValue, FieldValue, FramePlan } from "./decode-frame";
import { formatHex } from "./bits";
import { formatQuality, formatStatus } from "./status";

export type FieldReport = {
  readonly id: string;
  readonly subindex: number;
  readonly bitOffset: number;
  readonly bitLength: number;
  readonly raw: JsonValue;
  readonly value: JsonValue;
  /** UN/CEFACT code where one fits (else ""), and the id of OPC UA's EUInformation. */
  readonly unit: { readonly code: string; readonly unitId: number; readonly symbol: string } | null;
  readonly text: string | null;
  readonly status: string;
  readonly quality: string;
};

type JsonValue = number | boolean | string | null | readonly (number | boolean | string)[];

export function reportFrame(plan: FramePlan, values: readonly DecodedValue[]): FieldReport[] {
  return plan.fields.map((field, index) => {
    const decoded = values[index];
    if (!decoded) throw new RangeError(`No value for ${field.id}`);
    const unit = decoded.unit;
    return {
      id: field.id,
      subindex: field.subindex,
      bitOffset: field.bitOffset,
      bitLength: field.bitLength,
      raw: toJson(decoded.raw),
      value:
        field.type.kind === "TimeT" && typeof decoded.value === "number"
          ? formatTime(decoded.value)
          : toJson(decoded.value),
      unit: unit ? { code: unit.code, unitId: unit.unitId, symbol: unit.symbol } : null,
      text: decoded.text ?? null,
      status: formatStatus(decoded.status),
      quality: formatQuality(decoded.status),
    };
  });
}

/** Integers above 53 bits become text; NaN and infinities, which JSON has no form for, too. */
function toJson(value: FieldValue): JsonValue {
  if (typeof value === "bigint") {
    return value >= -9007199254740991n && value <= 9007199254740991n ? Number(value) : value.toString();
  }
  if (typeof value === "number") return Number.isFinite(value) ? value : String(value);
  if (value instanceof Uint8Array) return formatHex(value);
  if (Array.isArray(value)) return value.map((v: number | bigint | boolean) => toJson(v) as number | boolean | string);
  return value as boolean | string | null;
}

/** ISO 8601 of milliseconds since 1970, UTC. */
function formatTime(milliseconds: number): string {
  return new Date(milliseconds).toISOString();
}
