/** Variants from the wire → the domain's typed values, so that a value read live can be written, compared and learnt. */
import { DataType, type DataValue, type ExtensionObject, type LocalizedText, type NodeId, type QualifiedName, type Variant, VariantArrayType } from "node-opcua";
import { OPC_UA_NAMESPACE, parseNodeId, type NodeId as DomainNodeId, type NodeKey } from "~/domain/address-space/node-id";
import { isBuiltInType, type BuiltInType, type ExtensionObject as DomainExtensionObject, type Scalar, type Variant as DomainVariant } from "~/domain/nodeset/values/variant";
import type { DataTypeLookup, StructureField } from "~/domain/nodeset/values/data-type-shapes";
import { fromWireNodeId } from "../node-ids";

/** What the conversion has to know of the server and of the loaded data types. */
export type WireContext = { readonly namespaces: readonly string[]; readonly types: DataTypeLookup };

const NULL_ID: DomainNodeId = { namespaceUri: OPC_UA_NAMESPACE, type: "i", identifier: 0 };

/** The typed value of a wire Variant; undefined for a null Variant and for a type that has no place in a file. */
export function fromWireVariant(variant: Variant | null | undefined, context: WireContext): DomainVariant | undefined {
  if (!variant || variant.dataType === DataType.Null || variant.value === null || variant.value === undefined) return undefined;
  const name = DataType[variant.dataType];
  if (name === undefined || !isBuiltInType(name)) return undefined;
  if (variant.arrayType === VariantArrayType.Scalar) return make(name, { shape: "scalar", value: fromWireScalar(variant.value, name, context) });
  const values = Array.from(variant.value as ArrayLike<unknown>, (value) => fromWireScalar(value, name, context));
  if (variant.arrayType === VariantArrayType.Array) return make(name, { shape: "array", values });
  return make(name, { shape: "matrix", values, dimensions: [...(variant.dimensions ?? [values.length])] });
}

type Shaped =
  | { shape: "scalar"; value: Scalar }
  | { shape: "array"; values: Scalar[] }
  | { shape: "matrix"; values: Scalar[]; dimensions: number[] };

function make(type: BuiltInType, shaped: Shaped): DomainVariant {
  return { type, ...shaped } as DomainVariant;
}

function fromWireScalar(value: unknown, type: BuiltInType, context: WireContext): Scalar {
  if (value === null || value === undefined) return type === "NodeId" || type === "ExpandedNodeId" ? NULL_ID : null;
  switch (type) {
    case "Int64":
    case "UInt64":
      return toBigInt(value as [number, number], type === "Int64");
    case "DateTime":
      return value instanceof Date ? value.toISOString() : String(value);
    case "Guid":
      return String(value).toLowerCase();
    case "ByteString":
      return Buffer.isBuffer(value) ? value.toString("base64") : null;
    case "XmlElement":
      return { xml: String(value) };
    case "NodeId":
    case "ExpandedNodeId":
      return toDomainNodeId(value as NodeId, context.namespaces);
    case "StatusCode":
      return (value as { value: number }).value;
    case "QualifiedName":
      return toDomainQualifiedName(value as QualifiedName, context.namespaces);
    case "LocalizedText":
      return toDomainText(value as LocalizedText);
    case "ExtensionObject":
      return fromWireStructure(value as ExtensionObject, context);
    case "Variant":
      return fromWireVariant(value as Variant, context) ?? null;
    case "DataValue":
      return fromWireDataValue(value as DataValue, context);
    case "DiagnosticInfo":
      return {};
    default:
      return value as Scalar;
  }
}

function toBigInt(halves: [number, number], isSigned: boolean): bigint {
  const whole = (BigInt(halves[0] >>> 0) << 32n) | BigInt(halves[1] >>> 0);
  return isSigned ? BigInt.asIntN(64, whole) : whole;
}

/** An index that the server's table does not have keeps its number as name, so that nothing wrong is claimed. */
export function toDomainNodeId(id: NodeId, namespaces: readonly string[]): DomainNodeId {
  const parsed = parseNodeId(fromWireNodeId(id, namespaces), []);
  return parsed.ok ? parsed.value : { namespaceUri: `urn:unknown-namespace:${id.namespace}`, type: "s", identifier: id.toString() };
}

export function toDomainQualifiedName(name: QualifiedName, namespaces: readonly string[]): { namespaceUri: string; name: string } {
  const namespaceUri = name.namespaceIndex === 0 ? OPC_UA_NAMESPACE : namespaces[name.namespaceIndex];
  return { namespaceUri: namespaceUri ?? `urn:unknown-namespace:${name.namespaceIndex}`, name: name.name ?? "" };
}

export function toDomainText(text: LocalizedText): { locale?: string; text: string } {
  return { ...(text.locale ? { locale: text.locale } : {}), text: text.text ?? "" };
}

function fromWireDataValue(value: DataValue, context: WireContext): Scalar {
  const inner = fromWireVariant(value.value, context);
  return {
    ...(inner ? { value: inner } : {}),
    statusCode: value.statusCode.value,
    ...(value.sourceTimestamp ? { sourceTimestamp: value.sourceTimestamp.toISOString() } : {}),
    ...(value.serverTimestamp ? { serverTimestamp: value.serverTimestamp.toISOString() } : {}),
  };
}

/**
 * A structure that the client library decoded, by the fields of our own definition; null where the library could not
 * decode it or the definition is not loaded.
 */
function fromWireStructure(value: ExtensionObject, context: WireContext): DomainExtensionObject | null {
  const { schema } = value as { schema?: { dataTypeNodeId?: NodeId } };
  const dataTypeId = schema?.dataTypeNodeId;
  if (!dataTypeId || dataTypeId.isEmpty()) return null;
  const dataType = fromWireNodeId(dataTypeId, context.namespaces) as NodeKey;
  const shape = context.types.findStructure(dataType);
  if (!shape) return null;
  // The library writes members in a camel case of its own; letter case is all that it changes.
  const decoded = new Map(Object.entries(value).map(([name, member]) => [name.toLowerCase(), member as unknown]));
  const fields: Record<string, DomainVariant> = {};
  for (const field of shape.fields) {
    const variant = fromWireField(decoded.get(field.name.toLowerCase()), field, context);
    if (variant) fields[field.name] = variant;
  }
  return { kind: "structure", dataType: shape.dataType, fields };
}

function fromWireField(value: unknown, field: StructureField, context: WireContext): DomainVariant | undefined {
  const type = field.builtInType;
  if (type === undefined || (field.isOptional && value === undefined)) return undefined;
  if (type === "Variant" && field.valueRank === -1) return fromWireVariant(value as Variant, context);
  if (field.valueRank === -1) return make(type, { shape: "scalar", value: fromWireScalar(value, type, context) });
  const values = Array.from((value ?? []) as ArrayLike<unknown>, (one) => fromWireScalar(one, type, context));
  return make(type, { shape: "array", values });
}
