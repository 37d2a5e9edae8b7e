/** Values from the wire → JSON for the event stream and a text for people. */
import { DataType, type DataValue, type Variant, VariantArrayType } from "node-opcua";
import { formatRange } from "~/domain/live/format-live";
import type { Sample, StatusSeverity } from "~/domain/live/sample";

const TEXT_LIMIT = 400;
const ELEMENTS_SHOWN = 12;
const ELEMENTS_SENT = 2_000;
const SEVERITIES: readonly StatusSeverity[] = ["good", "uncertain", "bad", "bad"];

/** Texts of an enumeration's or a multi-state item's numbers. */
export type StateTexts = ReadonlyMap<number, string>;

export function decodeSample(dataValue: DataValue, states: StateTexts | undefined, coalesced: number): Sample {
  const { statusCode } = dataValue;
  const value = decodeVariant(dataValue.value);
  return {
    value,
    text: formatValue(value, states),
    status: { code: statusCode.value, name: nameStatus(statusCode.name), severity: SEVERITIES[statusCode.value >>> 30] ?? "bad" },
    sourceTimestamp: dataValue.sourceTimestamp?.toISOString() ?? null,
    serverTimestamp: dataValue.serverTimestamp?.toISOString() ?? null,
    coalesced,
  };
}

/** The standard writes `Uncertain_SimulatedValue`; the library drops the underscore. */
export function nameStatus(name: string): string {
  return name.split("#")[0]?.replace(/^(Good|Uncertain|Bad)(?=[A-Z])/, "$1_") ?? name;
}

/** The JSON form of a Variant; long arrays are cut, dates are ISO 8601, 64-bit integers are numbers while they are exact. */
export function decodeVariant(variant: Variant | undefined): unknown {
  if (!variant || variant.dataType === DataType.Null || variant.value === null || variant.value === undefined) return null;
  if (variant.arrayType === VariantArrayType.Scalar) return decodeScalar(variant.value, variant.dataType);
  const elements = Array.from(variant.value as ArrayLike<unknown>).slice(0, ELEMENTS_SENT);
  return elements.map((element) => decodeScalar(element, variant.dataType));
}

function decodeScalar(value: unknown, dataType: DataType): unknown {
  switch (dataType) {
    case DataType.Int64:
    case DataType.UInt64:
      return decodeLong(value as [number, number], dataType === DataType.Int64);
    case DataType.DateTime:
      return value instanceof Date ? value.toISOString() : String(value);
    case DataType.ByteString:
      return Buffer.isBuffer(value) ? value.toString("base64") : null;
    case DataType.LocalizedText:
      return (value as { text: string | null }).text ?? "";
    case DataType.QualifiedName:
    case DataType.NodeId:
    case DataType.ExpandedNodeId:
    case DataType.StatusCode:
      return String(value);
    case DataType.Variant:
      return decodeVariant(value as Variant);
    case DataType.ExtensionObject:
    case DataType.DataValue:
    case DataType.DiagnosticInfo:
      return toPlainJson(value);
    default:
      return value;
  }
}

function decodeLong(halves: [number, number], isSigned: boolean): number | string {
  const whole = (BigInt(halves[0] >>> 0) << 32n) | BigInt(halves[1] >>> 0);
  const value = isSigned ? BigInt.asIntN(64, whole) : whole;
  const asNumber = Number(value);
  return Number.isSafeInteger(asNumber) ? asNumber : value.toString();
}

function toPlainJson(value: unknown): unknown {
  const text = JSON.stringify(value, (_key, inner: unknown) => (typeof inner === "bigint" ? inner.toString() : inner));
  return text === undefined ? null : (JSON.parse(text) as unknown);
}

/** A text for people; formatting of figures by range is the page's matter. */
export function formatValue(value: unknown, states: StateTexts | undefined): string {
  if (value === null || value === undefined) return "no value";
  if (Array.isArray(value)) {
    const shown = value.slice(0, ELEMENTS_SHOWN).map((element) => formatValue(element, states));
    return `[${shown.join(", ")}${value.length > ELEMENTS_SHOWN ? `, … ${value.length} elements` : ""}]`.slice(0, TEXT_LIMIT);
  }
  if (typeof value === "number") return states?.get(value) ?? String(value);
  if (typeof value === "object") return formatStructure(value).slice(0, TEXT_LIMIT);
  return String(value).slice(0, TEXT_LIMIT);
}

/** The two structures that every analog item carries read as people write them; others are shown by their fields. */
function formatStructure(value: object): string {
  const { low, high, displayName, unitId } = value as { low?: unknown; high?: unknown; displayName?: { text?: string } | string; unitId?: unknown };
  if (typeof low === "number" && typeof high === "number") return formatRange({ low, high });
  if (typeof unitId === "number" && displayName !== undefined) return typeof displayName === "string" ? displayName : (displayName.text ?? "");
  return JSON.stringify(value);
}
