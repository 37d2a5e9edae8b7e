/** Whether a value fits a Variable (OPC 10000-3 §5.6.2, §8; OPC 10000-6 §5.3.1.2). */
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType } from "../../address-space/standard-ids";
import { problem, type Problem } from "../../core/result";
import type { DataTypeLookup } from "./data-type-shapes";
import { INTEGER_RANGES } from "./scalar-text";
import type { BuiltInType, Variant } from "./variant";

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
const SIGNED: readonly BuiltInType[] = ["SByte", "Int16", "Int32", "Int64"];
const UNSIGNED: readonly BuiltInType[] = ["Byte", "UInt16", "UInt32", "UInt64"];

/** undefined where it fits. Problems: `value.type`, `value.rank`, `value.range`. A DataType that is not loaded fits all. */
export function checkVariant(
  value: Variant,
  declared: { readonly dataType: NodeKey; readonly valueRank: number },
  types: DataTypeLookup,
): Problem | undefined {
  return checkType(value, declared.dataType, types) ?? checkRank(value, declared) ?? checkRange(value);
}

function checkType(value: Variant, dataType: NodeKey, types: DataTypeLookup): Problem | undefined {
  const allowed = listAllowedTypes(dataType, types);
  if (!allowed || allowed.includes(value.type)) return undefined;
  return problem("value.type", { type: value.type, expected: allowed.join(", ") });
}

/** undefined: anything. */
function listAllowedTypes(dataType: NodeKey, types: DataTypeLookup): readonly BuiltInType[] | undefined {
  if (dataType === StandardDataType.Number) return [...NUMBERS, "ExtensionObject"];
  if (dataType === StandardDataType.Integer) return SIGNED;
  if (dataType === StandardDataType.UInteger) return UNSIGNED;
  const builtIn = types.findBuiltInType(dataType);
  return builtIn === undefined || builtIn === "Variant" ? undefined : [builtIn];
}

function checkRank(
  value: Variant,
  { dataType, valueRank }: { dataType: NodeKey; valueRank: number },
): Problem | undefined {
  const rank = value.shape === "scalar" ? -1 : value.shape === "array" ? 1 : value.dimensions.length;
  const isEmptyArray = value.shape === "array" && value.values.length === 0;
  const fits =
    valueRank === -2 ||
    (valueRank === -3 && rank <= 1) ||
    (valueRank === 0 && rank >= 1) ||
    rank === valueRank ||
    (isEmptyArray && valueRank >= 0) ||
    // One value of BaseDataType may itself be an array.
    (dataType === StandardDataType.BaseDataType && valueRank === -1);
  return fits ? undefined : problem("value.rank", { rank, valueRank });
}

function checkRange(value: Variant): Problem | undefined {
  const range = INTEGER_RANGES[value.type];
  if (!range) return undefined;
  for (const item of value.shape === "scalar" ? [value.value] : value.values) {
    const isInteger = typeof item === "bigint" || (typeof item === "number" && Number.isInteger(item));
    if (isInteger && BigInt(item) >= range[0] && BigInt(item) <= range[1]) continue;
    return problem("value.range", { type: value.type, low: String(range[0]), high: String(range[1]) });
  }
  return undefined;
}
