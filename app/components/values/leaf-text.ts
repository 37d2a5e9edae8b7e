/** Built-in types that are written as one text: their text for the field, and what a text means or why it means nothing. Pure. */
import { formatNodeId, parseNodeId } from "~/domain/address-space/node-id";
import { INTEGER_RANGES, isWritableText, parseScalarText } from "~/domain/nodeset/values/scalar-text";
import type { BuiltInType, ExpandedNodeId, Scalar } from "~/domain/nodeset/values/variant";
import { unfinished, type Unfinished } from "./value-draft";

/** Types with a field for one text. */
export const TEXT_TYPES: ReadonlySet<BuiltInType> = new Set<BuiltInType>([
  "SByte",
  "Byte",
  "Int16",
  "UInt16",
  "Int32",
  "UInt32",
  "Int64",
  "UInt64",
  "Float",
  "Double",
  "String",
  "DateTime",
  "Guid",
]);

/** With U+2212 as on all screens; not a number and the infinities as XML writes them. */
export function formatLeaf(value: Scalar): string {
  if (value === null) return "";
  if (value === Infinity) return "INF";
  if (value === -Infinity) return "−INF";
  if (typeof value === "number" || typeof value === "bigint") return String(value).replace("-", "−");
  return typeof value === "string" || typeof value === "boolean" ? String(value) : "";
}

export function parseLeaf(type: BuiltInType, text: string): Scalar | Unfinished {
  switch (type) {
    case "String":
      return isWritableText(text) ? text : unfinished(text, "This text holds characters that XML cannot hold.");
    case "Float":
    case "Double":
      return parseDecimal(type, text);
    case "DateTime":
      return parseDateTime(text);
    case "Guid":
      return (
        parseScalarText("Guid", text.replace(/^\{|\}$/g, "")) ??
        unfinished(text, "A Guid has 8-4-4-4-12 digits from 0–9 and a–f.")
      );
    case "Boolean":
      return parseScalarText("Boolean", text.toLowerCase()) ?? unfinished(text, "Boolean is true or false.");
    default:
      return parseInteger(type, text);
  }
}

function parseInteger(type: BuiltInType, text: string): Scalar | Unfinished {
  const value = parseScalarText(type, text.trim().replace("−", "-"));
  if (value !== undefined) return value;
  const [low, high] = INTEGER_RANGES[type] ?? [0n, 0n];
  return unfinished(text, `${type} takes whole numbers from ${formatLeaf(low)} to ${formatLeaf(high)}.`);
}

/** The largest finite number of IEEE 754 binary32. */
const FLOAT_LIMIT = 3.4028234663852886e38;

function parseDecimal(type: "Float" | "Double", text: string): Scalar | Unfinished {
  const plain = text
    .trim()
    .replace("−", "-")
    .replace(/^(-?\d+),(\d+)$/, "$1.$2");
  const value = parseScalarText(type, plain === "NaN" ? plain : plain.replace(/∞|inf(inity)?/i, "INF"));
  if (typeof value !== "number")
    return unfinished(text, `${type} takes a number such as 12.5 or 1e−3, or INF, −INF, NaN.`);
  if (type === "Float" && Number.isFinite(value) && Math.abs(value) > FLOAT_LIMIT)
    return unfinished(text, "Float ends at 3.4e38; take Double for larger numbers.");
  if (!Number.isFinite(value) && /\d/.test(plain)) return unfinished(text, "Double ends at 1.8e308.");
  return value;
}

const SAID_DATE = /^(\d{4}-\d\d-\d\d)(?:[T ](\d\d:\d\d)(:\d\d(?:\.\d+)?)?)?\s*(Z|[+-]\d\d:\d\d)?$/i;

/** Kept as written where it is a whole XML date; a shorter one is filled up, in UTC. */
function parseDateTime(text: string): string | Unfinished {
  const trimmed = text.trim();
  const parts = SAID_DATE.exec(trimmed);
  const whole = parseScalarText("DateTime", trimmed);
  const filled =
    trimmed !== "" && typeof whole === "string"
      ? whole
      : parts && `${parts[1]}T${parts[2] ?? "00:00"}${parts[3] ?? ":00"}${parts[4]?.toUpperCase() ?? "Z"}`;
  const isDay = filled && !Number.isNaN(Date.parse(filled)) && isCalendarDay(filled.slice(0, 10));
  return filled && (isDay || !/^\d{4}-/.test(filled))
    ? filled
    : unfinished(text, "Write date and time as 2026-12-01T09:30:00Z.");
}

function isCalendarDay(day: string): boolean {
  const [year = 0, month = 0, date = 0] = day.split("-").map(Number);
  return (
    month >= 1 && month <= 12 && date >= 1 && date <= new Date(Date.UTC(year === 0 ? 4 : year, month, 0)).getUTCDate()
  );
}

export function formatNodeIdLeaf(id: ExpandedNodeId): string {
  return formatNodeId(id);
}

/** `i=85`, `nsu=URI;s=Name`, and `1;i=85` is refused: an index means nothing without its table. */
export function parseNodeIdLeaf(text: string): ExpandedNodeId | Unfinished {
  const parsed = parseNodeId(text.trim(), []);
  return parsed.ok
    ? parsed.value
    : unfinished(text, "A NodeId reads i=85 or nsu=URI;s=Name. Or write a name and choose the node.");
}

export type ByteNotation = "hex" | "base64";

export function formatBytes(base64: string, notation: ByteNotation): string {
  if (notation === "base64") return base64;
  return toBytes(base64)
    .map((byte) => byte.toString(16).padStart(2, "0").toUpperCase())
    .join(" ");
}

/** Base64, as values hold bytes. */
export function parseBytes(text: string, notation: ByteNotation): string | Unfinished {
  const packed = text.replace(/\s+/g, "");
  if (notation === "base64") {
    const value = parseScalarText("ByteString", packed);
    return typeof value === "string"
      ? value
      : unfinished(text, "Base64 has groups of four from A–Z, a–z, 0–9, + and /, filled up with =.");
  }
  const digits = packed.replace(/^0x/i, "");
  if (!/^(?:[0-9a-f]{2})*$/i.test(digits)) return unfinished(text, "Hex takes pairs of the digits 0–9 and A–F.");
  return toBase64((digits.match(/../g) ?? []).map((pair) => Number.parseInt(pair, 16)));
}

export function toBytes(base64: string): number[] {
  return [...atob(base64)].map((char) => char.charCodeAt(0));
}

export function toBase64(bytes: readonly number[]): string {
  let binary = "";
  for (const byte of bytes) binary += String.fromCharCode(byte);
  return btoa(binary);
}
