/**
 * Values as one line of text and back, for cells and fields: numbers, texts, enumerations by name, arrays in brackets.
 * Structures are shown, not edited.
 */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDataType, getValueRank, hasValueAttributes, type Node } from "~/domain/address-space/node";
import { formatNodeId, parseNodeId } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { formatValue } from "~/domain/nodeset/values/format-value";
import { parseScalarText } from "~/domain/nodeset/values/scalar-text";
import { array, scalar, type BuiltInType, type Scalar, type Variant } from "~/domain/nodeset/values/variant";
import { findEuInformation, findRange } from "~/domain/nodeset/values/standard-values";
import { formatNumber, formatRange } from "./analog-facts";
import { getDataTypes, readTypedValue } from "./read-typed-value";

const MOST = 200;

/** Empty where the node has no value. */
export function formatValueText(space: AddressSpace, node: Node): string {
  const variant = readTypedValue(space, node);
  if (!variant) return hasValueAttributes(node) && node.value ? "…" : "";
  const names = hasValueAttributes(node) ? getDataTypes(space).findEnumerationNames(getDataType(node)) : undefined;
  if (isStructure(variant)) return clip(formatValue(variant, getDataTypes(space)));
  if (variant.shape === "scalar") return clip(formatScalar(variant.type, variant.value, variant, names));
  const texts = (variant.values as readonly Scalar[]).slice(0, 40).map((value) => formatScalar(variant.type, value, undefined, names));
  return clip(`[${texts.join(", ")}${variant.values.length > 40 ? ", …" : ""}]`);
}

function isStructure(variant: Variant): boolean {
  return variant.type === "ExtensionObject" && !findEuInformation(variant) && !findRange(variant);
}

function clip(text: string): string {
  return text.length > MOST ? `${text.slice(0, MOST)}…` : text;
}

function formatScalar(type: BuiltInType, value: Scalar, whole: Variant | undefined, names: ReadonlyMap<number, string> | undefined): string {
  if (value === null || value === undefined) return "";
  if (typeof value === "number") return names?.get(value) ?? formatNumber(value);
  if (typeof value === "bigint" || typeof value === "boolean" || typeof value === "string") return String(value);
  if (type === "LocalizedText") return "text" in value ? String(value.text) : "";
  if (type === "QualifiedName") return "name" in value ? String(value.name) : "";
  if (type === "NodeId" || type === "ExpandedNodeId") return "identifier" in value ? formatNodeId(value) : "";
  const unit = findEuInformation(whole);
  if (unit) return unit.displayName.text;
  const range = findRange(whole);
  return range ? formatRange(range) : "{…}";
}

/** The value that a text means for this node; undefined where it means none. */
export function parseValueText(space: AddressSpace, node: Node, text: string): Variant | undefined {
  if (!hasValueAttributes(node)) return undefined;
  const types = getDataTypes(space);
  const dataType = getDataType(node);
  const builtIn = types.findBuiltInType(dataType);
  const type = dataType === StandardDataType.BaseDataType || builtIn === undefined || builtIn === "Variant" ? guessType(text) : builtIn;
  const names = types.findEnumerationNames(dataType);
  const inner = /^\[(.*)\]$/s.exec(text.trim());
  if (getValueRank(node) >= 1 || (inner && getValueRank(node) !== -1)) {
    const parts = splitList(inner ? (inner[1] ?? "") : text);
    const values = parts.map((part) => parseOne(type, part, names));
    return values.includes(undefined) ? undefined : array(type, values as never[]);
  }
  const value = parseOne(type, text, names);
  return value === undefined ? undefined : scalar(type, value as never);
}

function guessType(text: string): BuiltInType {
  const trimmed = text.trim();
  if (trimmed === "true" || trimmed === "false") return "Boolean";
  return /^[-−+]?\d+(?:[.,]\d+)?$/.test(trimmed) ? "Double" : "String";
}

function splitList(text: string): string[] {
  return text.trim() === "" ? [] : text.split(/[,;]\s*|\s{2,}/).map((part) => part.trim());
}

function parseOne(type: BuiltInType, text: string, names: ReadonlyMap<number, string> | undefined): Scalar | undefined {
  if (names) {
    for (const [value, name] of names) if (name.toLowerCase() === text.trim().toLowerCase()) return value;
  }
  if (type === "LocalizedText") return { text };
  if (type === "QualifiedName") return { namespaceUri: "http://opcfoundation.org/UA/", name: text };
  if (type === "NodeId" || type === "ExpandedNodeId") {
    const id = parseNodeId(text.trim(), []);
    return id.ok ? id.value : undefined;
  }
  const plain = type === "String" ? text : text.trim().replace("−", "-");
  return parseScalarText(type, isDecimal(type) ? plain.replace(",", ".") : plain);
}

function isDecimal(type: BuiltInType): boolean {
  return type === "Float" || type === "Double";
}
