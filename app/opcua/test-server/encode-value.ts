/** Numbers of the simulation → Variants of the Variable's data type, and plain values where the model gives none. */
import { coerceNodeId, DataType, type UADataType, type AddressSpace, LocalizedText, QualifiedName, StatusCodes, Variant, VariantArrayType, type VariantOptions } from "node-opcua";
import type { BuiltInType } from "~/domain/simulation/motion";
import { fitToType } from "~/domain/simulation/simulate-value";

const WIRE_TYPE: Readonly<Record<BuiltInType, DataType>> = {
  Boolean: DataType.Boolean,
  SByte: DataType.SByte,
  Byte: DataType.Byte,
  Int16: DataType.Int16,
  UInt16: DataType.UInt16,
  Int32: DataType.Int32,
  UInt32: DataType.UInt32,
  Int64: DataType.Int64,
  UInt64: DataType.UInt64,
  Float: DataType.Float,
  Double: DataType.Double,
  String: DataType.String,
  DateTime: DataType.DateTime,
  Guid: DataType.Guid,
  ByteString: DataType.ByteString,
  XmlElement: DataType.XmlElement,
  NodeId: DataType.NodeId,
  ExpandedNodeId: DataType.ExpandedNodeId,
  StatusCode: DataType.StatusCode,
  QualifiedName: DataType.QualifiedName,
  LocalizedText: DataType.LocalizedText,
  ExtensionObject: DataType.ExtensionObject,
  DataValue: DataType.DataValue,
  Variant: DataType.Null,
  DiagnosticInfo: DataType.DiagnosticInfo,
};

/** What text Variables without a value say, so that nobody takes it for a machine's answer. */
const TEXT = "simulation";
const NULL_GUID = "00000000-0000-0000-0000-000000000000";

/** A Variant of one element per place of the dimensions, in row order; a scalar without dimensions. */
export function makeVariant(type: BuiltInType, dimensions: readonly number[], element: (offset: number) => unknown): Variant {
  const dataType = WIRE_TYPE[type];
  if (dimensions.length === 0) return new Variant({ dataType, arrayType: VariantArrayType.Scalar, value: element(0) });
  const count = dimensions.reduce((product, length) => product * length, 1);
  const value = Array.from({ length: count }, (_, i) => element(i / count));
  const options: VariantOptions =
    dimensions.length === 1
      ? { dataType, arrayType: VariantArrayType.Array, value }
      : { dataType, arrayType: VariantArrayType.Matrix, dimensions: [...dimensions], value };
  return new Variant(options);
}

/** A number as the value of a data type; 64-bit integers travel as two halves. */
export function encodeNumber(value: number, type: BuiltInType): unknown {
  if (type === "Boolean") return value !== 0;
  const fitted = fitToType(value, type);
  if (type !== "Int64" && type !== "UInt64") return fitted;
  const whole = BigInt.asUintN(64, BigInt(fitted));
  return [Number(whole >> 32n), Number(whole & 0xffffffffn)];
}

/** A plain value of a data type: zero, no time, or a text that says what it is. Undefined when none can be made. */
export function makePlainValue(space: AddressSpace, type: BuiltInType, dataType: UADataType | null, now: Date): unknown {
  switch (type) {
    case "String":
      return TEXT;
    case "LocalizedText":
      return new LocalizedText({ text: TEXT });
    case "QualifiedName":
      return new QualifiedName({ name: TEXT });
    case "DateTime":
      return now;
    case "Guid":
      return NULL_GUID;
    case "ByteString":
      return Buffer.alloc(0);
    case "NodeId":
    case "ExpandedNodeId":
      return coerceNodeId("i=0");
    case "StatusCode":
      return StatusCodes.Good;
    case "ExtensionObject":
      return dataType && !dataType.isAbstract ? space.constructExtensionObject(dataType, {}) : undefined;
    case "Variant":
    case "DataValue":
    case "DiagnosticInfo":
    case "XmlElement":
      return undefined;
    default:
      return encodeNumber(0, type);
  }
}
