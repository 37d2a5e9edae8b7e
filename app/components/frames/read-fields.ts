/** What the fields of one frame say, in words for the ruler and its table. Pure. */
import type { Problem } from "~/domain/core/result";
import { formatBound, formatNumber } from "~/domain/live/format-live";
import { formatHex } from "~/domain/mapping/bits";
import { decodeFrame, type DecodedValue, type FieldValue } from "~/domain/mapping/decode-frame";
import { formatStatus, isBad, isGood } from "~/domain/mapping/status";
import type { FrameField, FrameView } from "./frame-fields";

export type FieldReading = {
  readonly subindex: number;
  readonly raw: string;
  /** With the name of a special value or state where one was met; `–` when there is no value. */
  readonly value: string;
  readonly unit: string;
  readonly statusCode: number;
  readonly status: string;
  readonly tone: "good" | "uncertain" | "bad";
};

export type FrameReading =
  | { readonly ok: true; readonly readings: ReadonlyMap<number, FieldReading> }
  | { readonly ok: false; readonly problems: readonly Problem[] };

/** Problems: `decode.length`. */
export function readFields(view: FrameView, octets: Uint8Array): FrameReading {
  const decoded = decodeFrame(view.plan, octets);
  if (!decoded.ok) return decoded;
  const readings = new Map<number, FieldReading>();
  for (const field of view.fields) {
    const value = decoded.value[view.plan.fields.indexOf(field.plan)];
    if (value) readings.set(field.subindex, toReading(field, value));
  }
  return { ok: true, readings };
}

function toReading(field: FrameField, decoded: DecodedValue): FieldReading {
  const { status, text } = decoded;
  const value = decoded.value === null ? "–" : formatFieldValue(decoded.value, field);
  return {
    subindex: field.subindex,
    raw: formatFieldValue(decoded.raw, undefined),
    value: text && decoded.value !== null ? `${value} (${text})` : (text ?? value),
    unit: decoded.value === null ? "" : field.unitText,
    statusCode: status,
    status: formatStatus(status),
    tone: isGood(status) ? "good" : isBad(status) ? "bad" : "uncertain",
  };
}

/** Scaled numbers get the decimals of their gradient, so that 234.5 and 240.0 stand under each other. */
function formatFieldValue(value: FieldValue, field: FrameField | undefined): string {
  if (value === null) return "–";
  if (value instanceof Uint8Array) return formatHex(value);
  if (typeof value === "bigint") return String(value).replace("-", "−");
  if (typeof value === "number") {
    if (field?.plan.type.kind === "TimeT") return new Date(value).toISOString();
    if (!field || (field.plan.gradient === 1 && field.plan.offset === 0)) {
      return Number.isInteger(value) ? formatBound(value) : formatNumber(value, 3);
    }
    const decimals = Math.max(countDecimals(field.plan.gradient), countDecimals(field.plan.offset));
    return formatNumber(value, Math.min(6, decimals));
  }
  if (typeof value === "object") return value.map((element) => formatFieldValue(element, field)).join(", ");
  return String(value);
}

function countDecimals(value: number): number {
  const [digits = "", exponent] = String(value).split("e");
  const fraction = digits.split(".")[1]?.length ?? 0;
  return Math.max(0, fraction - Number(exponent ?? 0));
}
