/** Values as text for people: `0 … 400`, `°C`, `Running`, `[1, 2, 3]`, `{X: 1, Y: −2}`. Minus is U+2212. */
import { formatNodeId, type NodeKey } from "../../address-space/node-id";
import { formatQualifiedName } from "../../address-space/qualified-name";
import type { DataTypeLookup } from "./data-type-shapes";
import { findEuInformation, findRange } from "./standard-values";
import type { DataValue, ExtensionObject, Scalar, Variant } from "./variant";

export type FormatOptions = {
  /** Names the values of enumerations. */
  readonly dataType?: NodeKey;
  /** Elements of an array that are shown; the rest is counted. */
  readonly maxItems?: number;
};

const DEFAULT_ITEMS = 20;

/** One line. Text stands as it is, without quotes, unless it is inside an array or a structure. */
export function formatValue(variant: Variant, types: DataTypeLookup, options: FormatOptions = {}): string {
  const names = options.dataType === undefined ? undefined : types.findEnumerationNames(options.dataType);
  const one = (value: Scalar, isInside: boolean): string =>
    formatScalar(variant, value, types, { ...options, names, isInside });
  if (variant.shape === "scalar") return one(variant.value, false);
  const values: readonly Scalar[] = variant.values;
  const most = options.maxItems ?? DEFAULT_ITEMS;
  const shown = values.slice(0, most).map((value) => one(value, true));
  const rest = values.length > most ? [`… ${values.length} in all`] : [];
  const size = variant.shape === "matrix" ? `${variant.dimensions.join(" × ")} ` : "";
  return `${size}[${[...shown, ...rest].join(", ")}]`;
}

type Inner = FormatOptions & { readonly names: ReadonlyMap<number, string> | undefined; readonly isInside: boolean };

function formatScalar(variant: Variant, value: Scalar, types: DataTypeLookup, inner: Inner): string {
  if (value === null) return "–";
  if (typeof value === "number")
    return inner.names?.get(value) ?? (variant.type === "StatusCode" ? formatStatus(value) : formatNumber(value));
  if (typeof value === "bigint") return formatNumber(value);
  if (typeof value === "boolean") return String(value);
  if (typeof value === "string") return variant.type === "ByteString" ? formatBytes(value) : quote(value, inner);
  switch (variant.type) {
    case "NodeId":
    case "ExpandedNodeId":
      return "identifier" in value ? formatNodeId(value) : "";
    case "QualifiedName":
      return "namespaceUri" in value && "name" in value ? formatQualifiedName(value) : "";
    case "LocalizedText":
      return "text" in value ? quote(value.text as string, inner) : "";
    case "XmlElement":
      return "xml" in value ? (value.xml as string).trim() : "";
    case "ExtensionObject":
      return formatStructure(value as ExtensionObject, types, inner);
    case "Variant":
      return formatValue(value as Variant, types, inner.maxItems === undefined ? {} : { maxItems: inner.maxItems });
    case "DataValue":
      return formatDataValue(value as DataValue, types);
    default:
      return JSON.stringify(value);
  }
}

function quote(text: string, { isInside }: Inner): string {
  return isInside ? `“${text}”` : text;
}

/** Digits as JavaScript prints them, with a true minus. */
export function formatNumber(value: number | bigint): string {
  return String(value).replace("-", "−").replace("Infinity", "∞");
}

function formatStatus(code: number): string {
  return `0x${code.toString(16).toUpperCase().padStart(8, "0")}`;
}

function formatBytes(base64: string): string {
  const padding = base64.endsWith("==") ? 2 : base64.endsWith("=") ? 1 : 0;
  const count = (base64.length / 4) * 3 - padding;
  return `${count} ${count === 1 ? "byte" : "bytes"}`;
}

function formatStructure(value: ExtensionObject, types: DataTypeLookup, inner: Inner): string {
  if (value.kind === "raw") return `unknown structure ${value.typeId}`;
  const whole: Variant = { type: "ExtensionObject", shape: "scalar", value };
  const range = findRange(whole);
  if (range) return `${formatNumber(range.low)} … ${formatNumber(range.high)}`;
  const unit = findEuInformation(whole);
  if (unit) return unit.displayName.text;
  const shape = types.findStructure(value.dataType);
  const parts = Object.entries(value.fields).map(([name, field]) => {
    const dataType = shape?.fields.find((f) => f.name === name)?.dataType;
    const text = formatValue(field, types, {
      ...(dataType === undefined ? {} : { dataType }),
      ...(inner.maxItems === undefined ? {} : { maxItems: inner.maxItems }),
    });
    return `${name}: ${text}`;
  });
  return `{${parts.join(", ")}}`;
}

function formatDataValue({ value, statusCode, sourceTimestamp }: DataValue, types: DataTypeLookup): string {
  const parts = [value ? formatValue(value, types) : "–"];
  if (statusCode !== undefined) parts.push(formatStatus(statusCode));
  if (sourceTimestamp !== undefined) parts.push(sourceTimestamp);
  return parts.join(", ");
}
