/** Whether a value is one text or one choice, which a cell can edit; everything else is edited in its form. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDataType, getValueRank, hasValueAttributes, type Node } from "~/domain/address-space/node";
import type { BuiltInType } from "~/domain/nodeset/values/variant";
import { getDataTypes, readTypedValue } from "./read-typed-value";

const FORM_TYPES: ReadonlySet<BuiltInType> = new Set<BuiltInType>([
  "ExtensionObject",
  "DataValue",
  "DiagnosticInfo",
  "XmlElement",
]);

/** The value that is there, or the one that there could be, is a scalar of the very DataType. */
export function isPlainValue(space: AddressSpace, node: Node): boolean {
  if (!hasValueAttributes(node) || getValueRank(node) !== -1) return false;
  const builtIn = getDataTypes(space).findBuiltInType(getDataType(node));
  const value = readTypedValue(space, node);
  if (value === undefined) return node.value === undefined && (builtIn === undefined || !FORM_TYPES.has(builtIn));
  return value.shape === "scalar" && value.type === builtIn && value.type !== "ExtensionObject";
}

/** Whether a cell can hold it as text: plain values and short lists of them. */
export function fitsInCell(space: AddressSpace, node: Node): boolean {
  if (!hasValueAttributes(node)) return false;
  const value = readTypedValue(space, node);
  if (value) return value.shape !== "matrix" && !FORM_TYPES.has(value.type);
  const builtIn = getDataTypes(space).findBuiltInType(getDataType(node));
  return node.value === undefined && getValueRank(node) <= 1 && (builtIn === undefined || !FORM_TYPES.has(builtIn));
}
