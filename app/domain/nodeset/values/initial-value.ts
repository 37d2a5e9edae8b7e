/** What a form starts with where there is no value yet: every field of its type, nothing left out that must be there. */
import { isAbstract } from "../../address-space/node";
import { OPC_UA_NAMESPACE, type NodeKey } from "../../address-space/node-id";
import type { AddressSpace } from "../../address-space/address-space";
import { StandardDataType } from "../../address-space/standard-ids";
import type { DataTypeLookup, StructureField } from "./data-type-shapes";
import { getDefault } from "./read-value";
import type { BuiltInType, Scalar, StructureValue, Variant } from "./variant";

export type ValueMaker = { readonly space: AddressSpace; readonly types: DataTypeLookup };

/** A structure that holds itself ends here. */
const MAX_DEPTH = 8;

const ABSTRACT_DEFAULTS: ReadonlyMap<NodeKey, BuiltInType> = new Map<NodeKey, BuiltInType>([
  [StandardDataType.Number, "Double"],
  [StandardDataType.Integer, "Int32"],
  [StandardDataType.UInteger, "UInt32"],
]);

/** The built-in type that a value of the DataType has on its own; for abstract ones the usual one. */
export function getCarrier({ types }: ValueMaker, dataType: NodeKey): BuiltInType {
  const builtIn = types.findBuiltInType(dataType);
  if (builtIn !== undefined && builtIn !== "Variant") return builtIn;
  return ABSTRACT_DEFAULTS.get(dataType) ?? "String";
}

/** The value of a Variable; `dimensions` as its ArrayDimensions, 0 for any length. */
export function makeValue(
  maker: ValueMaker,
  dataType: NodeKey,
  valueRank: number,
  dimensions: readonly number[] = [],
): Variant {
  const type = getCarrier(maker, dataType);
  return makeShaped(type, valueRank, dimensions, () => makeItem(maker, type, dataType, 0));
}

/** ArrayDimensions bound a length; only short ones are filled at once. */
const MOST_FILLED = 64;

function makeShaped(type: BuiltInType, valueRank: number, dimensions: readonly number[], make: () => Scalar): Variant {
  const fill = (length: number): Scalar[] => Array.from({ length }, make);
  if (valueRank < 0) return { type, shape: "scalar", value: make() } as Variant;
  if (valueRank <= 1) {
    const [length = 0] = dimensions;
    return { type, shape: "array", values: fill(length > MOST_FILLED ? 0 : length) } as unknown as Variant;
  }
  const wanted = Array.from({ length: valueRank }, (_, i) => dimensions[i] || 2);
  const isShort = wanted.reduce((a, b) => a * b, 1) <= MOST_FILLED;
  const sizes = isShort ? wanted : wanted.map(() => 1);
  return {
    type,
    shape: "matrix",
    dimensions: sizes,
    values: fill(sizes.reduce((a, b) => a * b, 1)),
  } as unknown as Variant;
}

/** One item of a type; texts and names are there and empty, what would be abstract is null. */
export function makeItem(maker: ValueMaker, type: BuiltInType, dataType: NodeKey | undefined, depth = 0): Scalar {
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
export function makeStructure(maker: ValueMaker, dataType: NodeKey, depth = 0): StructureValue | null {
  const node = maker.space.getNode(dataType);
  const shape = maker.types.findStructure(dataType);
  if (!shape || (node && isAbstract(node)) || depth > MAX_DEPTH || dataType === StandardDataType.Structure) return null;
  const fields: Record<string, Variant> = {};
  if (!shape.isUnion) {
    for (const field of shape.fields) if (!field.isOptional) fields[field.name] = makeField(maker, field, depth + 1);
  }
  return { kind: "structure", dataType, fields };
}

export function makeField(maker: ValueMaker, field: StructureField, depth = 0): Variant {
  const type = field.builtInType ?? "ExtensionObject";
  const make = (): Scalar => makeItem(maker, type, field.dataType, depth);
  if (type === "Variant" && field.valueRank < 0) return { type, shape: "scalar", value: null };
  return makeShaped(type, field.valueRank === -1 ? -1 : Math.max(field.valueRank, 1), [], make);
}
