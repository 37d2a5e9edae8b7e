/**
 * XML text to Variants (OPC 10000-6 §5.3). Reading is tolerant where published files are: enumerations as numbers or as
 * `Name_Value`, fields left out (their default), TypeIds of the DataType instead of its encoding. A structure whose
 * DataType is not loaded, or whose body does not fit it, stays raw XML and says why; nothing is guessed and nothing lost.
 */
import { OPC_UA_NAMESPACE, parseNodeId, type NodeId } from "../../address-space/node-id";
import type { XmlText } from "../../address-space/node";
import type { LocalizedText, QualifiedName } from "../../address-space/qualified-name";
import { fail, ok, problem, type Problem, type Result } from "../../core/result";
import type { DataTypeLookup, StructureField, StructureShape } from "./data-type-shapes";
import { toXmlName } from "./data-type-shapes";
import { parseScalarText } from "./scalar-text";
import {
  isBuiltInType,
  type BuiltInType,
  type DataValue,
  type DiagnosticInfo,
  type ExpandedNodeId,
  type ExtensionObject,
  type RawStructure,
  type Scalar,
  type Variant,
} from "./variant";
import { readFragment, type FragmentElement } from "./xml-fragment";

const MAX_DEPTH = 100;

/**
 * The typed value. Problems: `value.empty` for a Value without an element, `value.element` for one that is no value,
 * `value.syntax` for text that is none of its type, `value.depth`, and those of the XML itself.
 */
export function readValue(value: XmlText, types: DataTypeLookup): Result<Variant> {
  const fragment = readFragment(value);
  if (!fragment.ok) return fragment;
  const element = fragment.value[0];
  if (!element) return fail(problem("value.empty"));
  const reader = new ValueReader(types);
  const variant = reader.readVariant(element, 0);
  return variant && reader.problems.length === 0 ? ok(variant) : fail(...reader.problems);
}

class ValueReader {
  readonly problems: Problem[] = [];
  readonly #types: DataTypeLookup;

  constructor(types: DataTypeLookup) {
    this.#types = types;
  }

  readVariant(element: FragmentElement, depth: number): Variant | undefined {
    if (depth > MAX_DEPTH) return this.#fail("value.depth", { limit: MAX_DEPTH });
    const { name } = element;
    if (name === "Matrix") return this.#readMatrix(element, depth);
    const itemType = name.startsWith("ListOf") ? name.slice(6) : undefined;
    if (itemType !== undefined && isBuiltInType(itemType)) {
      const values = element.children.map((child) => this.#readScalar(child, itemType, depth));
      return { type: itemType, shape: "array", values } as unknown as Variant;
    }
    if (!isBuiltInType(name)) return this.#fail("value.element", { name });
    return { type: name, shape: "scalar", value: this.#readScalar(element, name, depth) } as unknown as Variant;
  }

  #fail(code: string, data: Problem["data"]): undefined {
    this.problems.push(problem(code, data));
    return undefined;
  }

  #readMatrix(element: FragmentElement, depth: number): Variant | undefined {
    const { dimensions, items } = readMatrixParts(element);
    const type = items[0]?.name;
    if (type === undefined || !isBuiltInType(type)) return this.#fail("value.element", { name: type ?? "Matrix" });
    const values = items.map((item) => this.#readScalar(item, type, depth));
    if (dimensions.reduce((product, d) => product * d, 1) !== values.length) {
      return this.#fail("value.dimensions", { count: values.length, dimensions: dimensions.join(" × ") });
    }
    return { type, shape: "matrix", values, dimensions } as unknown as Variant;
  }

  #readScalar(element: FragmentElement, type: BuiltInType, depth: number): Scalar {
    switch (type) {
      case "XmlElement":
        return element.isNil || element.children.length === 0 ? null : element.content;
      case "NodeId":
        return this.#readNodeId(element);
      case "ExpandedNodeId":
        return this.#readExpandedNodeId(element);
      case "StatusCode":
        return Number(this.#parse("UInt32", findText(element, "Code") ?? "0"));
      case "QualifiedName":
        return element.isNil ? null : readQualifiedName(element);
      case "LocalizedText":
        return readLocalizedText(element);
      case "ExtensionObject":
        return this.#readExtensionObject(element, depth + 1);
      case "DataValue":
        return this.#readDataValue(element, depth + 1);
      case "Variant": {
        const inner = findChild(element, "Value")?.children[0];
        return inner ? (this.readVariant(inner, depth + 1) ?? null) : null;
      }
      case "DiagnosticInfo":
        return element.isNil ? null : this.#readDiagnosticInfo(element, depth + 1);
      case "Guid":
        return this.#parse("Guid", findText(element, "String") ?? element.text);
      case "String":
      case "ByteString":
        return element.isNil ? null : this.#parse(type, element.text);
      default:
        return this.#parse(type, element.text);
    }
  }

  #parse(type: BuiltInType, text: string): Scalar {
    const parsed = parseScalarText(type, text);
    if (parsed !== undefined) return parsed;
    this.#fail("value.syntax", { type, text: text.slice(0, 60) });
    return type === "Int64" || type === "UInt64" ? 0n : 0;
  }

  #readNodeId(element: FragmentElement): NodeId {
    const text = (findText(element, "Identifier") ?? "i=0").trim() || "i=0";
    const result = parseNodeId(text, []);
    if (result.ok) return result.value;
    this.problems.push(...result.problems);
    return NULL_NODE_ID;
  }

  #readExpandedNodeId(element: FragmentElement): ExpandedNodeId {
    const text = (findText(element, "Identifier") ?? "i=0").trim() || "i=0";
    const match = /^svr=(\d+);(.*)$/s.exec(text);
    const result = parseNodeId(match?.[2] ?? text, []);
    if (!result.ok) this.problems.push(...result.problems);
    const nodeId = result.ok ? result.value : NULL_NODE_ID;
    return match ? { ...nodeId, serverIndex: Number(match[1]) } : nodeId;
  }

  #readExtensionObject(element: FragmentElement, depth: number): ExtensionObject | null {
    if (element.isNil || element.children.length === 0) return null;
    const typeElement = findChild(element, "TypeId");
    const typeId = ((typeElement && findText(typeElement, "Identifier")) ?? "i=0").trim();
    const bodyElement = findChild(element, "Body");
    const raw = (reason: RawStructure["reason"]): RawStructure => ({
      kind: "raw",
      typeId,
      body: bodyElement?.content ?? { xml: "" },
      reason,
    });
    const body = bodyElement?.children[0];
    if (!body) return raw("no-body");
    if (body.name === "ByteString") return raw("binary-body");
    const shape = this.#types.findStructureByTypeId(typeId);
    if (!shape) return raw("unknown-type");
    return this.#readStructure(body, shape, depth) ?? raw("body-mismatch");
  }

  /** undefined where the body does not fit the DataType. */
  #readStructure(body: FragmentElement, shape: StructureShape, depth: number): ExtensionObject | undefined {
    if (depth > MAX_DEPTH) return this.#fail("value.depth", { limit: MAX_DEPTH });
    const fields: Record<string, Variant> = {};
    const byName = new Map(shape.fields.map((field) => [toXmlName(field.name), field]));
    for (const child of body.children) {
      const isControl =
        (shape.isUnion && child.name === "SwitchField") || (shape.hasOptionalFields && child.name === "EncodingMask");
      if (isControl) continue;
      const field = byName.get(child.name);
      const value = field && this.#readField(child, field, depth + 1);
      if (!field || !value) return undefined;
      fields[field.name] = value;
    }
    if (!shape.isUnion) addDefaults(shape, fields);
    return { kind: "structure", dataType: shape.dataType, fields };
  }

  #readField(element: FragmentElement, field: StructureField, depth: number): Variant | undefined {
    const type = field.builtInType;
    if (!type) return undefined;
    if (type === "Variant" && field.valueRank < 0)
      return { type, shape: "scalar", value: this.#readScalar(element, type, depth) as Variant | null };
    const read = (item: FragmentElement): Scalar | undefined => this.#readFieldItem(item, field, type, depth);
    if (field.valueRank === -1) return makeVariant(type, "scalar", [read(element)]);
    const matrix = readMatrixParts(element);
    if (matrix.dimensions.length > 1) return makeVariant(type, "matrix", matrix.items.map(read), matrix.dimensions);
    return makeVariant(type, "array", element.children.map(read));
  }

  #readFieldItem(
    element: FragmentElement,
    field: StructureField,
    type: BuiltInType,
    depth: number,
  ): Scalar | undefined {
    if (field.isInline) {
      if (element.isNil) return null;
      const shape = this.#types.findStructure(field.dataType);
      return shape && this.#readStructure(element, shape, depth);
    }
    if (field.isEnumeration) return this.#readEnumeration(element, field);
    return this.#readScalar(element, type, depth);
  }

  /** `Running_1` or `1`; a bare name is looked up. */
  #readEnumeration(element: FragmentElement, field: StructureField): Scalar | undefined {
    const text = element.text.trim();
    const digits = /(?:^|_)(-?\d+)$/.exec(text)?.[1];
    if (digits !== undefined) return this.#parse("Int32", digits);
    for (const [value, name] of this.#types.findEnumerationNames(field.dataType) ?? []) if (name === text) return value;
    return text === "" ? 0 : undefined;
  }

  #readDataValue(element: FragmentElement, depth: number): DataValue {
    const value = findChild(element, "Value")?.children[0];
    const variant = value && this.readVariant(value, depth);
    const status = findChild(element, "StatusCode");
    return {
      ...(variant ? { value: variant } : {}),
      ...(status ? { statusCode: Number(findText(status, "Code") ?? 0) } : {}),
      ...pickText(element, "SourceTimestamp", "sourceTimestamp"),
      ...pickNumber(element, "SourcePicoseconds", "sourcePicoseconds"),
      ...pickText(element, "ServerTimestamp", "serverTimestamp"),
      ...pickNumber(element, "ServerPicoseconds", "serverPicoseconds"),
    };
  }

  #readDiagnosticInfo(element: FragmentElement, depth: number): DiagnosticInfo | null {
    if (depth > MAX_DEPTH) return this.#fail("value.depth", { limit: MAX_DEPTH }) ?? null;
    const inner = findChild(element, "InnerDiagnosticInfo");
    const status = findChild(element, "InnerStatusCode");
    const innerInfo = inner && this.#readDiagnosticInfo(inner, depth + 1);
    return {
      ...pickNumber(element, "SymbolicId", "symbolicId"),
      ...pickNumber(element, "NamespaceUri", "namespaceUri"),
      ...pickNumber(element, "Locale", "locale"),
      ...pickNumber(element, "LocalizedText", "localizedText"),
      ...pickText(element, "AdditionalInfo", "additionalInfo"),
      ...(status ? { innerStatusCode: Number(findText(status, "Code") ?? 0) } : {}),
      ...(innerInfo ? { innerDiagnosticInfo: innerInfo } : {}),
    };
  }
}

const NULL_NODE_ID: NodeId = { namespaceUri: OPC_UA_NAMESPACE, type: "i", identifier: 0 };

/** undefined when one of the items could not be read. */
function makeVariant(
  type: BuiltInType,
  shape: Variant["shape"],
  items: readonly (Scalar | undefined)[],
  dimensions?: readonly number[],
): Variant | undefined {
  if (items.some((item) => item === undefined)) return undefined;
  if (shape === "scalar") return { type, shape, value: items[0] } as unknown as Variant;
  return { type, shape, values: items, ...(dimensions ? { dimensions } : {}) } as unknown as Variant;
}

/** A field that is left out has the default of its type (OPC 10000-6 §5.3.6); optional ones then are absent. */
function addDefaults(shape: StructureShape, fields: Record<string, Variant>): void {
  for (const field of shape.fields) {
    if (fields[field.name] !== undefined || field.isOptional || !field.builtInType) continue;
    const value =
      field.valueRank > 0
        ? makeVariant(field.builtInType, "array", [])
        : makeVariant(field.builtInType, "scalar", [getDefault(field.builtInType)]);
    if (value) fields[field.name] = value;
  }
}

/** The default of each built-in type (OPC 10000-6 §5.1.2). */
export function getDefault(type: BuiltInType): Scalar {
  switch (type) {
    case "Boolean":
      return false;
    case "Int64":
    case "UInt64":
      return 0n;
    case "DateTime":
      return "0001-01-01T00:00:00Z";
    case "Guid":
      return "00000000-0000-0000-0000-000000000000";
    case "NodeId":
    case "ExpandedNodeId":
      return NULL_NODE_ID;
    case "DataValue":
      return {};
    case "String":
    case "ByteString":
    case "XmlElement":
    case "QualifiedName":
    case "LocalizedText":
    case "ExtensionObject":
    case "Variant":
    case "DiagnosticInfo":
      return null;
    default:
      return 0;
  }
}

function readMatrixParts(element: FragmentElement): { dimensions: number[]; items: readonly FragmentElement[] } {
  const dimensions = findChild(element, "Dimensions")?.children.map((d) => Number(d.text)) ?? [];
  return { dimensions, items: findChild(element, "Elements")?.children ?? [] };
}

function readLocalizedText(element: FragmentElement): LocalizedText | null {
  if (element.isNil) return null;
  const locale = findText(element, "Locale");
  const text = findText(element, "Text");
  if (locale === undefined && text === undefined) return null;
  return { ...(locale === undefined ? {} : { locale }), text: text ?? "" };
}

function readQualifiedName(element: FragmentElement): QualifiedName {
  const index = (findText(element, "NamespaceIndex") ?? "0").trim();
  return {
    namespaceUri: index === "0" || index === "" ? OPC_UA_NAMESPACE : index,
    name: findText(element, "Name") ?? "",
  };
}

function findChild(element: FragmentElement, name: string): FragmentElement | undefined {
  return element.children.find((child) => child.name === name);
}

function findText(element: FragmentElement, name: string): string | undefined {
  const child = findChild(element, name);
  return child && !child.isNil ? child.text : undefined;
}

function pickText(element: FragmentElement, name: string, as: string): Record<string, string> {
  const text = findText(element, name);
  return text === undefined ? {} : { [as]: text };
}

function pickNumber(element: FragmentElement, name: string, as: string): Record<string, number> {
  const text = findText(element, name);
  return text === undefined ? {} : { [as]: Number(text) };
}
