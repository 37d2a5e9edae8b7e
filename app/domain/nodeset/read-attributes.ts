/** Reads the attributes of one element by a table; what the table does not know, or cannot take, is kept as written. */
import type { NodeKey } from "../address-space/node-id";
import type { AttributeTable, AttributeType } from "./attribute-tables";
import type { Attributes } from "./xml/scan-xml";

export type AttributeContext = {
  /** Resolves a NodeId or alias; undefined when it cannot, which is then reported already. */
  toKey(text: string, attribute: string): NodeKey | undefined;
  reportValue(attribute: string, value: string, expected: string): void;
  /** Set when an attribute is not written as we would write it: `1` for true, `1000.0`. */
  hasOddSpelling: boolean;
};

const INTEGER = /^[+-]?\d{1,15}$/;
const DOUBLE = /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?$/;
const DIMENSIONS = /^(?:(?:\d+,)*\d+)?$/;

const RANGES = {
  byte: [0, 255, "a whole number 0 … 255"],
  uint16: [0, 65_535, "a whole number 0 … 65535"],
  uint32: [0, 4_294_967_295, "a whole number 0 … 4294967295"],
  int32: [-2_147_483_648, 2_147_483_647, "a whole number −2147483648 … 2147483647"],
} as const;

/**
 * Sets the fields of `target` and answers the attributes that stay as written. `handled` names attributes that the
 * caller reads itself; a declaration of the default namespace is never kept, since the writer chooses its own.
 */
export function readAttributes(
  attributes: Attributes,
  table: AttributeTable,
  handled: readonly string[],
  target: Record<string, unknown>,
  context: AttributeContext,
): Readonly<Record<string, string>> | undefined {
  let others: Record<string, string> | undefined;
  for (const name in attributes) {
    if (handled.includes(name) || name === "xmlns") continue;
    const text = attributes[name] ?? "";
    const spec = table.get(name);
    const value = spec && parseAttribute(name, spec.type, text, context);
    if (spec && value !== undefined) {
      target[spec.field] = value;
      if (typeof value !== "string" && String(value) !== text) context.hasOddSpelling = true;
    }
    else (others ??= {})[name] = text;
  }
  return others;
}

/** The value of one attribute, undefined when it is not what the schema asks for; that is reported. */
function parseAttribute(name: string, type: AttributeType, text: string, context: AttributeContext): unknown {
  switch (type) {
    case "text":
      return text;
    case "nodeId":
      return context.toKey(text, name);
    case "boolean":
      return parseBoolean(name, text, context);
    case "double":
      if (DOUBLE.test(text.trim())) return Number(text);
      return refuse(name, text, "a number", context);
    case "arrayDimensions":
      if (DIMENSIONS.test(text.trim())) return text.trim();
      return refuse(name, text, "a list of whole numbers such as 0,3", context);
    case "releaseStatus":
      return oneOf(name, text, ["Released", "Draft", "Deprecated"], context);
    case "purpose":
      return oneOf(name, text, ["Normal", "ServicesOnly", "CodeGenerator"], context);
    default: {
      const [least, greatest, expected] = RANGES[type];
      const value = INTEGER.test(text.trim()) ? Number(text) : Number.NaN;
      return value >= least && value <= greatest ? value : refuse(name, text, expected, context);
    }
  }
}

function parseBoolean(name: string, text: string, context: AttributeContext): boolean | undefined {
  switch (text.trim()) {
    case "true":
    case "1":
      return true;
    case "false":
    case "0":
      return false;
    default:
      return refuse(name, text, "true or false", context);
  }
}

function oneOf(name: string, text: string, values: readonly string[], context: AttributeContext): string | undefined {
  return values.includes(text) ? text : refuse(name, text, values.join(", "), context);
}

function refuse(name: string, text: string, expected: string, context: AttributeContext): undefined {
  context.reportValue(name, text, expected);
  return undefined;
}

/** Of the attributes of a table those that are not written as we would write them, as they stand. */
export function listOddSpellings(attributes: Attributes, table: AttributeTable): Record<string, string> | undefined {
  let odd: Record<string, string> | undefined;
  for (const name in attributes) {
    const spec = table.get(name);
    const text = attributes[name] ?? "";
    const value = spec && readSpelling(text, spec.type);
    if (value !== undefined && String(value) !== text) (odd ??= {})[name] = text;
  }
  return odd;
}

/** What the text of a boolean or a number says; undefined for other types and for what cannot be read. */
export function readSpelling(text: string, type: AttributeType): boolean | number | undefined {
  if (type === "boolean") return ({ true: true, "1": true, false: false, "0": false } as const)[text.trim()];
  if (type === "double") return DOUBLE.test(text.trim()) ? Number(text) : undefined;
  return type in RANGES && INTEGER.test(text.trim()) ? Number(text) : undefined;
}

/** Attributes to keep as they are, but the known ones; the default namespace is the writer's business. */
export function listKept(attributes: Attributes, known?: readonly string[]): Record<string, string> | undefined {
  let kept: Record<string, string> | undefined;
  for (const name in attributes) {
    if (name === "xmlns" || known?.includes(name)) continue;
    (kept ??= {})[name] = attributes[name] ?? "";
  }
  return kept;
}
