/** Which shapes and built-in types a value may have, and how a draft gets from one to another. Pure. */
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { BUILT_IN_TYPES, type BuiltInType, type Scalar } from "~/domain/nodeset/values/variant";
import { formatLeaf, parseLeaf, TEXT_TYPES } from "./leaf-text";
import { isUnfinished, listItems, type Draft, type DraftItem } from "./value-draft";

export type Shape = Draft["shape"];

/** OPC 10000-3 §5.6.2, ValueRank; one value of BaseDataType may itself be an array. */
export function listShapes(valueRank: number, dataType?: NodeKey): readonly Shape[] {
  if (valueRank === -2 || (valueRank === -1 && dataType === StandardDataType.BaseDataType))
    return ["scalar", "array", "matrix"];
  if (valueRank === -3) return ["scalar", "array"];
  if (valueRank === -1) return ["scalar"];
  if (valueRank === 0) return ["array", "matrix"];
  return valueRank === 1 ? ["array"] : ["matrix"];
}

/** The same items in another shape; a scalar takes the first. */
export function withShape(draft: Draft, shape: Shape, make: () => DraftItem): Draft {
  if (draft.shape === shape) return draft;
  const items = listItems(draft);
  const { type } = draft;
  if (shape === "scalar") return { type, shape, value: items.length === 0 ? make() : (items[0] as DraftItem) };
  if (shape === "array") return { type, shape, values: items };
  const values = items.length === 0 ? [make()] : items;
  return { type, shape, values, dimensions: [1, values.length] };
}

const NUMBERS: readonly BuiltInType[] = [
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
];

/** Built-in types that a value of an abstract DataType may have; one for every other DataType. */
export function listTypesFor(dataType: NodeKey | undefined, carrier: BuiltInType | undefined): readonly BuiltInType[] {
  switch (dataType) {
    case StandardDataType.Number:
      return NUMBERS;
    case StandardDataType.Integer:
      return ["SByte", "Int16", "Int32", "Int64"];
    case StandardDataType.UInteger:
      return ["Byte", "UInt16", "UInt32", "UInt64"];
    case undefined:
    case StandardDataType.BaseDataType:
      return BUILT_IN_TYPES;
    default:
      return carrier === undefined || carrier === "Variant" ? BUILT_IN_TYPES : [carrier];
  }
}

/** A Variant holds no single Variant, but a list of them (OPC 10000-6 §5.1.10). */
export function mayStandAlone(type: BuiltInType): boolean {
  return type !== "Variant";
}

/** The draft with items of another type: texts and numbers are kept where the other type takes them. */
export function withType(draft: Draft, type: BuiltInType, make: () => DraftItem): Draft {
  const convert = (item: DraftItem): DraftItem => {
    if (isUnfinished(item) || !TEXT_TYPES.has(type) || !(TEXT_TYPES.has(draft.type) || draft.type === "Boolean"))
      return make();
    const parsed = parseLeaf(type, formatLeaf(item as Scalar));
    return isUnfinished(parsed) ? make() : parsed;
  };
  if (draft.shape === "scalar") return { ...draft, type, value: convert(draft.value) };
  return { ...draft, type, values: draft.values.map(convert) };
}
