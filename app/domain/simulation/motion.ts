/** How a simulated Variable moves. Times are seconds, phases are parts of one period, 0 … 1. */
export type Motion =
  /** Swings between low and high along a sine. */
  | { readonly kind: "sine"; readonly low: number; readonly high: number; readonly period: number; readonly phase: number }
  /** Rises from low to high and falls back along straight lines. */
  | { readonly kind: "ramp"; readonly low: number; readonly high: number; readonly period: number; readonly phase: number }
  /** Rises from low to high and starts again at low: totals and counters with a reset. */
  | { readonly kind: "rise"; readonly low: number; readonly high: number; readonly perSecond: number; readonly phase: number }
  /** Shows each value for the same time, in the order given, over and over. */
  | { readonly kind: "steps"; readonly values: readonly number[]; readonly secondsEach: number; readonly phase: number }
  /** Counts whole numbers up from `start` and wraps to 0 after `last`. */
  | { readonly kind: "count"; readonly start: number; readonly perSecond: number; readonly last: number }
  /** Tells the time of day. */
  | { readonly kind: "clock" }
  /** Keeps the value that the model gives, else a plain value of the data type. */
  | { readonly kind: "static" };

/** The built-in types of OPC 10000-6 §5.1.2 that a Value is encoded as. */
export type BuiltInType =
  | "Boolean"
  | "SByte"
  | "Byte"
  | "Int16"
  | "UInt16"
  | "Int32"
  | "UInt32"
  | "Int64"
  | "UInt64"
  | "Float"
  | "Double"
  | "String"
  | "DateTime"
  | "Guid"
  | "ByteString"
  | "XmlElement"
  | "NodeId"
  | "ExpandedNodeId"
  | "StatusCode"
  | "QualifiedName"
  | "LocalizedText"
  | "ExtensionObject"
  | "DataValue"
  | "Variant"
  | "DiagnosticInfo";

/** Smallest and largest value of each whole-number type (OPC 10000-6 Table 1); 64-bit ones end where a double stays exact. */
export const INTEGER_RANGES: Readonly<Partial<Record<BuiltInType, readonly [low: number, high: number]>>> = {
  SByte: [-128, 127],
  Byte: [0, 255],
  Int16: [-32768, 32767],
  UInt16: [0, 65535],
  Int32: [-2147483648, 2147483647],
  UInt32: [0, 4294967295],
  Int64: [Number.MIN_SAFE_INTEGER, Number.MAX_SAFE_INTEGER],
  UInt64: [0, Number.MAX_SAFE_INTEGER],
};
