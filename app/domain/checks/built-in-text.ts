/** Whether the text of a value's element can be read as its built-in type (OPC 10000-6 §5.3.1). */
import type { ValueElement } from "./value-element";

const INTEGER_RANGES: Readonly<Record<string, readonly [low: bigint, high: bigint]>> = {
  SByte: [-128n, 127n],
  Byte: [0n, 255n],
  Int16: [-32768n, 32767n],
  UInt16: [0n, 65535n],
  Int32: [-2147483648n, 2147483647n],
  UInt32: [0n, 4294967295n],
  Int64: [-9223372036854775808n, 9223372036854775807n],
  UInt64: [0n, 18446744073709551615n],
};

const INTEGER = /^[+-]?\d{1,20}$/;
const DECIMAL = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/;
const SPECIAL = new Set(["INF", "+INF", "-INF", "NaN"]);
const DATE_TIME = /^-?\d{4,}-\d\d-\d\dT\d\d:\d\d:\d\d(?:\.\d+)?(?:Z|[+-]\d\d:\d\d)?$/;
const GUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;
const BASE64 = /^[A-Za-z0-9+/\s]*={0,2}\s*$/;

/** True also for elements whose content is not plain text, which other rules look at. */
export function isBuiltInText(element: ValueElement): boolean {
  const text = element.text.trim();
  const range = INTEGER_RANGES[element.name];
  if (range) {
    if (!INTEGER.test(text)) return false;
    const value = BigInt(text.replace(/^\+/, ""));
    return value >= range[0] && value <= range[1];
  }
  switch (element.name) {
    case "Boolean":
      return text === "true" || text === "false" || text === "1" || text === "0";
    case "Float":
    case "Double":
      return DECIMAL.test(text) || SPECIAL.has(text);
    case "DateTime":
      return DATE_TIME.test(text);
    case "ByteString":
      return BASE64.test(text);
    case "Guid": {
      const inner = element.children.find((c) => c.name === "String")?.text.trim();
      return inner === undefined || GUID.test(inner);
    }
    default:
      return true;
  }
}
