/** What a form starts with where there is no value yet: every field of its type, nothing left out that must be there. Pure. */
import { OPC_UA_NAMESPACE, type NodeKey } from "~/domain/address-space/node-id";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { isAbstract } from "~/domain/address-space/node";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import type { DataTypeLookup, StructureField } from "~/domain/nodeset/values/data-type-shapes";
import { getDefault } from "~/domain/nodeset/values/read-value";
import type { BuiltInType } from "~/domain/nodeset/values/variant";
import type { Draft, DraftItem, DraftStructure } from "./value-draft";

export type DraftMaker = { readonly space: AddressSpace; readonly types: DataTypeLookup };
type Maker = DraftMaker;

/** A structure that holds itself ends here. */
const MAX_DEPTH = 8;

const ABSTRACT_DEFAULTS: ReadonlyMap<NodeKey, BuiltInType> = new Map<NodeKey, BuiltInType>([
  [StandardDataType.Number, "Double"],
  [StandardDataType.Integer, "Int32"],
  [StandardDataType.UInteger, "UInt32"],
]);

/** The built-in type that a value of the DataType has on its own; for abstract ones the usual one. */
export function getCarrier({ types }: Maker, dataType: NodeKey): BuiltInType {
  const builtIn = types.findBuiltInType(dataType);
  if (builtIn !== undefined && builtIn !== "Variant") return builtIn;
  return ABSTRACT_DEFAULTS.get(dataType) ?? "String";
}

/** The value of a Variable; `dimensions` as its ArrayDimensions, 0 for any length. */
export function makeDraft(
  maker: Maker,
  dataType: NodeKey,
  valueRank: number,
  dimensions: readonly number[] = [],
): Draft {
  const type = getCarrier(maker, dataType);
  return makeShaped(type, valueRank, dimensions, () => makeItem(maker, type, dataType, 0));
}

function makeShaped(type: BuiltInType, valueRank: number, dimensions: readonly number[], make: () => DraftItem): Draft {
  if (valueRank < 0) return { type, shape: "scalar", value: make() };
  if (valueRank <= 1) return { type, shape: "array", values: Array.from({ length: dimensions[0] ?? 0 }, make) };
  const sizes = Array.from({ length: valueRank }, (_, i) => dimensions[i] || 2);
  return {
    type,
    shape: "matrix",
    dimensions: sizes,
    values: Array.from({ length: sizes.reduce((a, b) => a * b, 1) }, make),
  };
}

/** One item of a type; texts and names are there and empty, what would be abstract is null. */
export function makeItem(maker: Maker, type: BuiltInType, dataType: NodeKey | undefined, depth = 0): DraftItem {
  switch (type) {
    case "String":
    case "ByteString":
      return "";
    case "LocalizedText":
      return { text: "" };
    case "QualifiedName":
      return { namespaceUri: OPC_UA_NAMESPACE, name: "" };
    case "DiagnosticInfo":
      return {};
    case "XmlElement":
      return null;
    case "ExtensionObject":
      return dataType === undefined ? null : makeStructure(maker, dataType, depth);
    case "Int32": {
      const names = dataType === undefined ? undefined : maker.types.findEnumerationNames(dataType);
      return names?.keys().next().value ?? 0;
    }
    default:
      return getDefault(type);
  }
}

/** null for an abstract or unknown structure: its concrete type is chosen first. */
export function makeStructure(maker: Maker, dataType: NodeKey, depth = 0): DraftStructure | null {
  const node = maker.space.getNode(dataType);
  const shape = maker.types.findStructure(dataType);
  if (!shape || (node && isAbstract(node)) || depth > MAX_DEPTH || dataType === StandardDataType.Structure) return null;
  const fields: Record<string, Draft> = {};
  if (!shape.isUnion) {
    for (const field of shape.fields) if (!field.isOptional) fields[field.name] = makeField(maker, field, depth + 1);
  }
  return { kind: "structure", dataType, fields };
}

export function makeField(maker: Maker, field: StructureField, depth = 0): Draft {
  const type = field.builtInType ?? "ExtensionObject";
  const make = (): DraftItem => makeItem(maker, type, field.dataType, depth);
  if (type === "Variant" && field.valueRank < 0) return { type, shape: "scalar", value: null };
  return makeShaped(type, field.valueRank === -1 ? -1 : Math.max(field.valueRank, 1), [], make);
}
