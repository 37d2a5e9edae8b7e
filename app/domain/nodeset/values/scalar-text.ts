/** Text of simple built-in types (OPC 10000-6 §5.3.1; W3C XML Schema part 2). */
import type { BuiltInType } from "./variant";

/** Ranges of the integers, OPC 10000-6 §5.1.2. */
export const INTEGER_RANGES: Readonly<Partial<Record<BuiltInType, readonly [low: bigint, high: bigint]>>> = {
  SByte: [-128n, 127n],
  Byte: [0n, 255n],
  Int16: [-32_768n, 32_767n],
  UInt16: [0n, 65_535n],
  Int32: [-2_147_483_648n, 2_147_483_647n],
  UInt32: [0n, 4_294_967_295n],
  Int64: [-9_223_372_036_854_775_808n, 9_223_372_036_854_775_807n],
  UInt64: [0n, 18_446_744_073_709_551_615n],
};

/** Whether XML can hold every character (XML 1.0 §2.2): no control characters but tab and line ends, no lone surrogates. */
export function isWritableText(text: string): boolean {
  if (LONE_SURROGATE.test(text)) return false;
  for (let i = 0; i < text.length; i++) {
    const code = text.charCodeAt(i);
    if (code < 0x20 ? code !== 9 && code !== 10 && code !== 13 : code >= 0xfffe) return false;
  }
  return true;
}

/** With the flag u a pair counts as one character, so this finds halves only. */
const LONE_SURROGATE = /\p{Surrogate}/u;

const DATE_TIME = /^-?\d{4,}-\d\d-\d\dT\d\d:\d\d:\d\d(?:\.\d+)?(?:Z|[+-]\d\d:\d\d)?$/;
const GUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;
const BASE64 = /^(?:[A-Za-z0-9+/]{4})*(?:[A-Za-z0-9+/]{2}==|[A-Za-z0-9+/]{3}=)?$/;
const DECIMAL = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;

/** The value of a text, undefined where it is none of the type. Strings keep every character; all others are trimmed. */
export function parseScalarText(type: BuiltInType, written: string): boolean | number | bigint | string | undefined {
  const text = type === "String" ? written : written.trim();
  switch (type) {
    case "String":
      return text;
    case "Boolean":
      return text === "true" || text === "1" ? true : text === "false" || text === "0" ? false : undefined;
    case "Float":
    case "Double":
      return parseDouble(text);
    case "DateTime":
      return text === "" ? "0001-01-01T00:00:00Z" : DATE_TIME.test(text) ? text : undefined;
    case "Guid":
      return GUID.test(text) ? text.toLowerCase() : undefined;
    case "ByteString": {
      const packed = text.replace(/\s+/g, "");
      return BASE64.test(packed) ? packed : undefined;
    }
    default:
      return parseInteger(type, text);
  }
}

function parseDouble(text: string): number | undefined {
  if (text === "INF" || text === "+INF") return Infinity;
  if (text === "-INF") return -Infinity;
  if (text === "NaN") return NaN;
  return DECIMAL.test(text) ? Number(text) : undefined;
}

function parseInteger(type: BuiltInType, text: string): number | bigint | undefined {
  const range = INTEGER_RANGES[type];
  if (!range || !/^[+-]?\d+$/.test(text)) return undefined;
  const value = BigInt(text.startsWith("+") ? text.slice(1) : text);
  if (value < range[0] || value > range[1]) return undefined;
  return type === "Int64" || type === "UInt64" ? value : Number(value);
}
