/**
 * The typed view of a Value (OPC 10000-6 §5.1, §5.3; OPC 10000-3 §8). Nodes keep their value as XML text; `readValue`
 * makes a Variant of it and `writeValue` makes text of a Variant.
 *
 * How JavaScript holds the 25 built-in types: Int64 and UInt64 are bigint; Float and Double may be NaN and ±Infinity;
 * DateTime is text as written (`2024-05-01T08:00:00Z`); Guid is lower-case text; ByteString is base64 text; a NodeId has
 * its namespace URI. `null` is the null of a type that has one (String, ByteString, XmlElement, LocalizedText …).
 */
import type { NodeId, NodeKey } from "../../address-space/node-id";
import type { LocalizedText, QualifiedName } from "../../address-space/qualified-name";
import type { XmlText } from "../../address-space/node";

/** OPC 10000-6 §5.1.2, Table 1. */
export const BUILT_IN_TYPES = [
  "Boolean",
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
  "ByteString",
  "XmlElement",
  "NodeId",
  "ExpandedNodeId",
  "StatusCode",
  "QualifiedName",
  "LocalizedText",
  "ExtensionObject",
  "DataValue",
  "Variant",
  "DiagnosticInfo",
] as const;

export type BuiltInType = (typeof BUILT_IN_TYPES)[number];

/** A NodeId that may point to another server: `serverIndex` as in the file's `svr=` prefix. */
export type ExpandedNodeId = NodeId & { readonly serverIndex?: number };

/** A structure whose DataType is known. An optional field that is absent has no entry; a union has one entry or none. */
export type StructureValue = {
  readonly kind: "structure";
  readonly dataType: NodeKey;
  readonly fields: Readonly<Record<string, Variant>>;
};

/** An ExtensionObject that is kept as it was: its DataType is not loaded, or its body does not fit it. `reason` says which. */
export type RawStructure = {
  readonly kind: "raw";
  readonly typeId: string;
  readonly body: XmlText;
  readonly reason: "unknown-type" | "body-mismatch" | "no-body" | "binary-body";
};

export type ExtensionObject = StructureValue | RawStructure;

/** OPC 10000-4 §7.11. */
export type DataValue = {
  readonly value?: Variant;
  readonly statusCode?: number;
  readonly sourceTimestamp?: string;
  readonly sourcePicoseconds?: number;
  readonly serverTimestamp?: string;
  readonly serverPicoseconds?: number;
};

/** OPC 10000-4 §7.12; numbers are indices of a string table that a file does not have. */
export type DiagnosticInfo = {
  readonly symbolicId?: number;
  readonly namespaceUri?: number;
  readonly locale?: number;
  readonly localizedText?: number;
  readonly additionalInfo?: string;
  readonly innerStatusCode?: number;
  readonly innerDiagnosticInfo?: DiagnosticInfo;
};

/** What one element of each built-in type is in JavaScript. */
export type ScalarOf = {
  Boolean: boolean;
  SByte: number;
  Byte: number;
  Int16: number;
  UInt16: number;
  Int32: number;
  UInt32: number;
  Int64: bigint;
  UInt64: bigint;
  Float: number;
  Double: number;
  String: string | null;
  DateTime: string;
  Guid: string;
  ByteString: string | null;
  XmlElement: XmlText | null;
  NodeId: NodeId;
  ExpandedNodeId: ExpandedNodeId;
  StatusCode: number;
  QualifiedName: QualifiedName | null;
  LocalizedText: LocalizedText | null;
  ExtensionObject: ExtensionObject | null;
  DataValue: DataValue;
  Variant: Variant | null;
  DiagnosticInfo: DiagnosticInfo | null;
};

export type Scalar = ScalarOf[BuiltInType];

type VariantOf<T extends BuiltInType> =
  | { readonly type: T; readonly shape: "scalar"; readonly value: ScalarOf[T] }
  | { readonly type: T; readonly shape: "array"; readonly values: readonly ScalarOf[T][] }
  /** Values are flat, the last index runs fastest (OPC 10000-6 §5.3.1.17). */
  | {
      readonly type: T;
      readonly shape: "matrix";
      readonly values: readonly ScalarOf[T][];
      readonly dimensions: readonly number[];
    };

/** A value of one built-in type: scalar, array or matrix. */
export type Variant = { [T in BuiltInType]: VariantOf<T> }[BuiltInType];

/** Short ways to make Variants. The caller answers for the type of the values. */
export function scalar<T extends BuiltInType>(type: T, value: ScalarOf[T]): Variant {
  return { type, shape: "scalar", value } as unknown as Variant;
}

export function array<T extends BuiltInType>(type: T, values: readonly ScalarOf[T][]): Variant {
  return { type, shape: "array", values } as unknown as Variant;
}

export function matrix<T extends BuiltInType>(
  type: T,
  dimensions: readonly number[],
  values: readonly ScalarOf[T][],
): Variant {
  return { type, shape: "matrix", values, dimensions } as unknown as Variant;
}

/** A structure as a scalar Variant. */
export function structure(dataType: NodeKey, fields: Readonly<Record<string, Variant>>): StructureValue {
  return { kind: "structure", dataType, fields };
}

const BUILT_IN = new Set<string>(BUILT_IN_TYPES);

export function isBuiltInType(name: string): name is BuiltInType {
  return BUILT_IN.has(name);
}
