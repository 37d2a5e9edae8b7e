/**
 * Variants to XML text (OPC 10000-6 §5.3). The text is complete in itself: it declares its namespaces and names nodes and
 * namespaces by URI. It is indented as the content of a Value in a NodeSet2 file, so that files stay readable line by line.
 */
import { formatNodeId, OPC_UA_NAMESPACE } from "../../address-space/node-id";
import type { XmlText } from "../../address-space/node";
import type { LocalizedText, QualifiedName } from "../../address-space/qualified-name";
import { TYPES_XML_NAMESPACE } from "../nodeset-xml";
import { escapeAttribute, escapeText } from "../xml/escape";
import { type DataTypeLookup, type StructureField, type StructureShape, toXmlName } from "./data-type-shapes";
import type {
  BuiltInType,
  DataValue,
  DiagnosticInfo,
  ExpandedNodeId,
  ExtensionObject,
  Scalar,
  StructureValue,
  Variant,
} from "./variant";

const XSI = "http://www.w3.org/2001/XMLSchema-instance";
/** The indentation of a Value's content, and of its end tag, in the files that we write. */
const CONTENT_INDENT = 6;
const END_INDENT = 4;

/** An element before it becomes text: a leaf has `text`, raw content has `raw`. */
export type WrittenElement = {
  readonly name: string;
  readonly attributes?: Readonly<Record<string, string>>;
  readonly text?: string;
  readonly raw?: string;
  readonly children?: readonly WrittenElement[];
};
type Element = WrittenElement;

/** The XML text of a Variant. Structures need `types` for names, order and encodings of fields. */
export function writeValue(variant: Variant, types: DataTypeLookup): XmlText {
  const xml = printElement(toElement(variant, types), CONTENT_INDENT);
  return { xml: `\n${xml}\n${" ".repeat(END_INDENT)}` };
}

/** What `writeValue` prints. */
export function toElement(variant: Variant, types: DataTypeLookup): WrittenElement {
  return withAttributes(new ValueWriter(types).writeVariant(variant), { xmlns: TYPES_XML_NAMESPACE });
}

function withAttributes(element: Element, attributes: Readonly<Record<string, string>>): Element {
  return { ...element, attributes: { ...attributes, ...element.attributes } };
}

/** With its children below each other, all lines indented by so many spaces. */
export function printElement(element: WrittenElement, indent: number): string {
  const pad = " ".repeat(indent);
  const attributes = Object.entries(element.attributes ?? {})
    .map(([name, value]) => ` ${name}="${escapeAttribute(value)}"`)
    .join("");
  const open = `${pad}<${element.name}${attributes}`;
  if (element.raw !== undefined) return `${open}>${element.raw}</${element.name}>`;
  if (element.text !== undefined) return `${open}>${escapeText(element.text)}</${element.name}>`;
  if (!element.children || element.children.length === 0) return `${open}/>`;
  const inner = element.children.map((child) => printElement(child, indent + 2)).join("\n");
  return `${open}>\n${inner}\n${pad}</${element.name}>`;
}

const leaf = (name: string, text: string): Element => ({ name, text });
const branch = (name: string, children: readonly Element[]): Element => ({ name, children });

class ValueWriter {
  readonly #types: DataTypeLookup;

  constructor(types: DataTypeLookup) {
    this.#types = types;
  }

  writeVariant(variant: Variant): Element {
    switch (variant.shape) {
      case "scalar":
        return this.#scalar(variant.type, variant.type, variant.value);
      case "array":
        return branch(`ListOf${variant.type}`, this.#items(variant));
      case "matrix":
        return branch("Matrix", [
          branch(
            "Dimensions",
            variant.dimensions.map((d) => leaf("UInt32", String(d))),
          ),
          branch("Elements", this.#items(variant)),
        ]);
    }
  }

  #items(variant: Exclude<Variant, { shape: "scalar" }>): Element[] {
    return variant.values.map((value) => this.#scalar(variant.type, variant.type, value));
  }

  /** One value as an element of the given name. */
  #scalar(name: string, type: BuiltInType, value: Scalar): Element {
    if (value === null) return { name, attributes: { "xmlns:xsi": XSI, "xsi:nil": "true" } };
    switch (type) {
      case "Float":
      case "Double":
        return leaf(name, formatDouble(value as number));
      case "Guid":
        return branch(name, [leaf("String", value as string)]);
      case "XmlElement":
        return { name, ...rawContent(value as XmlText) };
      case "NodeId":
      case "ExpandedNodeId":
        return branch(name, [leaf("Identifier", formatExpandedNodeId(value as ExpandedNodeId))]);
      case "StatusCode":
        return branch(name, [leaf("Code", String(value as number))]);
      case "QualifiedName":
        return branch(name, qualifiedNameParts(value as QualifiedName));
      case "LocalizedText":
        return branch(name, localizedTextParts(value as LocalizedText));
      case "ExtensionObject":
        return this.#extensionObject(name, value as ExtensionObject);
      case "DataValue":
        return branch(name, this.#dataValueParts(value as DataValue));
      case "Variant":
        return branch(name, [branch("Value", [this.writeVariant(value as Variant)])]);
      case "DiagnosticInfo":
        return branch(name, diagnosticParts(value as DiagnosticInfo));
      default:
        return leaf(name, String(value));
    }
  }

  #extensionObject(name: string, value: ExtensionObject): Element {
    if (value.kind === "raw") {
      const typeId = branch("TypeId", [leaf("Identifier", value.typeId)]);
      return branch(
        name,
        value.reason === "no-body" ? [typeId] : [typeId, { name: "Body", ...rawContent(value.body) }],
      );
    }
    const shape = this.#requireShape(value);
    const body = branch(shape.elementName, this.#structureParts(shape, value));
    const isStandard = shape.xmlNamespace === TYPES_XML_NAMESPACE;
    return branch(name, [
      branch("TypeId", [leaf("Identifier", shape.typeId)]),
      branch("Body", [isStandard ? body : withAttributes(body, { xmlns: shape.xmlNamespace })]),
    ]);
  }

  #requireShape(value: StructureValue): StructureShape {
    const shape = this.#types.findStructure(value.dataType);
    if (!shape) throw new RangeError(`The structure ${value.dataType} is not loaded`);
    return shape;
  }

  #structureParts(shape: StructureShape, value: StructureValue): Element[] {
    const present = shape.fields.filter((field) => value.fields[field.name] !== undefined);
    const parts = present.map((field) => this.#field(shape, field, value.fields[field.name] as Variant));
    if (shape.isUnion) {
      const chosen = present[0];
      return [leaf("SwitchField", String(chosen ? shape.fields.indexOf(chosen) + 1 : 0)), ...parts.slice(0, 1)];
    }
    if (shape.hasOptionalFields) return [leaf("EncodingMask", String(getEncodingMask(shape, value))), ...parts];
    return parts;
  }

  #field(shape: StructureShape, field: StructureField, variant: Variant): Element {
    const element = this.#fieldContent(toXmlName(field.name), field, variant);
    if (shape.xmlNamespace === field.contentNamespace || !element.children?.length) return element;
    return {
      ...element,
      children: element.children.map((child) => withAttributes(child, { xmlns: field.contentNamespace })),
    };
  }

  #fieldContent(name: string, field: StructureField, variant: Variant): Element {
    const { itemName } = field;
    const one = (value: Scalar, as: string): Element => {
      if (field.isInline && variant.type === "ExtensionObject")
        return this.#inlineStructure(as, value as ExtensionObject | null);
      if (field.isEnumeration && variant.type === "Int32")
        return leaf(as, this.#enumerationText(field, value as number));
      if (field.builtInType === "Variant")
        return this.#scalar(as, "Variant", variant.type === "Variant" ? value : toVariant(variant, value));
      return this.#scalar(as, variant.type, value);
    };
    switch (variant.shape) {
      case "scalar":
        return one(variant.value, name);
      case "array":
        if (field.builtInType === "Variant" && field.valueRank === -1) return this.#scalar(name, "Variant", variant);
        return branch(
          name,
          variant.values.map((value) => one(value, itemName)),
        );
      case "matrix":
        return branch(name, [
          branch(
            "Dimensions",
            variant.dimensions.map((d) => leaf("Int32", String(d))),
          ),
          branch(
            "Elements",
            variant.values.map((value) => one(value, itemName)),
          ),
        ]);
    }
  }

  #inlineStructure(name: string, value: ExtensionObject | null): Element {
    if (value === null) return { name };
    if (value.kind === "raw") return { name, ...rawContent(value.body) };
    const shape = this.#requireShape(value);
    return branch(name, this.#structureParts(shape, value));
  }

  /** OPC 10000-6 §5.3.1.2: inside a structure an enumeration is `Name_Value`. */
  #enumerationText(field: StructureField, value: number): string {
    const name = this.#types.findEnumerationNames(field.dataType)?.get(value);
    return name === undefined ? String(value) : `${name}_${value}`;
  }

  #dataValueParts(value: DataValue): Element[] {
    const parts: Element[] = [];
    if (value.value) parts.push(branch("Value", [this.writeVariant(value.value)]));
    if (value.statusCode !== undefined) parts.push(branch("StatusCode", [leaf("Code", String(value.statusCode))]));
    if (value.sourceTimestamp !== undefined) parts.push(leaf("SourceTimestamp", value.sourceTimestamp));
    if (value.sourcePicoseconds !== undefined) parts.push(leaf("SourcePicoseconds", String(value.sourcePicoseconds)));
    if (value.serverTimestamp !== undefined) parts.push(leaf("ServerTimestamp", value.serverTimestamp));
    if (value.serverPicoseconds !== undefined) parts.push(leaf("ServerPicoseconds", String(value.serverPicoseconds)));
    return parts;
  }
}

/** Bits in the order of the optional fields (OPC 10000-6 §5.3.6). */
export function getEncodingMask(shape: StructureShape, value: StructureValue): number {
  return shape.fields
    .filter((field) => field.isOptional)
    .reduce((mask, field, i) => (value.fields[field.name] === undefined ? mask : mask + 2 ** i), 0);
}

function toVariant(variant: Variant, value: Scalar): Variant {
  return { type: variant.type, shape: "scalar", value } as Variant;
}

function rawContent(xml: XmlText): { raw: string; attributes: Readonly<Record<string, string>> } {
  const attributes: Record<string, string> = { ...xml.attributes };
  for (const [prefix, uri] of Object.entries(xml.prefixes ?? {}))
    attributes[prefix === "" ? "xmlns" : `xmlns:${prefix}`] = uri;
  return { raw: xml.xml, attributes };
}

/** xs:double: `INF`, `-INF`, `NaN`. */
function formatDouble(value: number): string {
  if (value === Infinity) return "INF";
  if (value === -Infinity) return "-INF";
  return Object.is(value, -0) ? "-0" : String(value);
}

function formatExpandedNodeId(id: ExpandedNodeId): string {
  const local = formatNodeId(id);
  return id.serverIndex === undefined ? local : `svr=${id.serverIndex};${local}`;
}

function qualifiedNameParts(name: QualifiedName): Element[] {
  const index = name.namespaceUri === OPC_UA_NAMESPACE ? "0" : name.namespaceUri;
  return [leaf("NamespaceIndex", index), leaf("Name", name.name)];
}

function localizedTextParts(text: LocalizedText): Element[] {
  return [...(text.locale === undefined ? [] : [leaf("Locale", text.locale)]), leaf("Text", text.text)];
}

function diagnosticParts(info: DiagnosticInfo): Element[] {
  const parts: Element[] = [];
  if (info.symbolicId !== undefined) parts.push(leaf("SymbolicId", String(info.symbolicId)));
  if (info.namespaceUri !== undefined) parts.push(leaf("NamespaceUri", String(info.namespaceUri)));
  if (info.locale !== undefined) parts.push(leaf("Locale", String(info.locale)));
  if (info.localizedText !== undefined) parts.push(leaf("LocalizedText", String(info.localizedText)));
  if (info.additionalInfo !== undefined) parts.push(leaf("AdditionalInfo", info.additionalInfo));
  if (info.innerStatusCode !== undefined)
    parts.push(branch("InnerStatusCode", [leaf("Code", String(info.innerStatusCode))]));
  if (info.innerDiagnosticInfo) parts.push(branch("InnerDiagnosticInfo", diagnosticParts(info.innerDiagnosticInfo)));
  return parts;
}
