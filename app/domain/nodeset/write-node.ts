/** Writes one node as XML: attributes in the order of the tables, children in the order of the schema. */
import type {
  ArgumentDescription,
  DataTypeDefinition,
  DataTypeField,
  DeclaredReference,
  Node,
  RolePermission,
  XmlText,
} from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { LocalizedText } from "../address-space/qualified-name";
import {
  DEFINITION_ATTRIBUTES,
  FIELD_ATTRIBUTES,
  NODE_ATTRIBUTES,
  type AttributeTable,
  type AttributeType,
} from "./attribute-tables";
import type { IdWriter } from "./id-writer";
import { joinPath, nameReference } from "./leftover-path";
import { LeftoverWriter, writeTable } from "./leftover-writer";
import { writeAround, writeWholeElement, type Declared } from "./write-fragments";
import { readSpelling } from "./read-attributes";
import { escapeAttribute, escapeText } from "./xml/escape";

export type WriteContext = {
  readonly ids: IdWriter;
  /** Prefix of the NodeSet's own elements with its colon; "" when they have none. */
  readonly prefix: string;
  /** What the root declares. */
  readonly declared: Declared;
  /** Starts of Reference elements that were written before, by reference type. */
  readonly referenceHeads: { readonly forward: Map<NodeKey, string>; readonly inverse: Map<NodeKey, string> };
};

/** What stands before a node in its file: comments and the like. */
export function writeBeforeNode(node: Node): string {
  return LeftoverWriter.of(node.leftovers, {})?.before("", "  ") ?? "";
}

export function writeNode(node: Node, context: WriteContext): string {
  const { ids, prefix } = context;
  const element = `${prefix}UA${node.nodeClass}`;
  const declared = withNodeDeclarations(context.declared, node.otherAttributes);
  const rest = LeftoverWriter.of(node.leftovers, declared);
  const head =
    `  <${element} NodeId="${escapeAttribute(ids.formatKey(node.key))}"` +
    ` BrowseName="${escapeAttribute(ids.formatName(node.browseName))}"` +
    writeAttributes(node, NODE_ATTRIBUTES[node.nodeClass], node.otherAttributes, ids, rest?.spellings(""));
  const body =
    writeCommon(node, context, declared, rest) +
    writeSpecific(node, context, declared, rest) +
    writeOthers(node, declared) +
    (rest?.inside("", "    ") ?? "");
  return body === "" ? `${head} />\n` : `${head}>\n${body}  </${element}>\n`;
}

/** Attributes by table, then those kept as written; where both have one, the table's holds. */
export function writeAttributes(
  fields: object,
  table: AttributeTable,
  others: Readonly<Record<string, string>> | undefined,
  ids: IdWriter,
  spellings?: Readonly<Record<string, string>>,
): string {
  let out = "";
  const values = fields as Readonly<Record<string, unknown>>;
  table.forEach(({ name, field, type }) => {
    const value = values[field];
    if (value === undefined) return;
    const spelling = spellings?.[name];
    const isAsWritten = spelling !== undefined && readSpelling(spelling, type) === value;
    out += ` ${name}="${isAsWritten ? escapeAttribute(spelling) : formatAttribute(value, type, name, ids)}"`;
  });
  if (!others) return out;
  for (const [name, value] of Object.entries(others)) {
    const spec = table.get(name);
    if (spec && values[spec.field] !== undefined) continue;
    out += ` ${name}="${escapeAttribute(value)}"`;
  }
  return out;
}

function formatAttribute(value: unknown, type: AttributeType, name: string, ids: IdWriter): string {
  if (type === "nodeId") {
    return escapeAttribute(name === "DataType" ? ids.formatType(value as NodeKey) : ids.formatKey(value as NodeKey));
  }
  return typeof value === "string" ? escapeAttribute(value) : String(value);
}

type Rest = LeftoverWriter | undefined;

function writeCommon(node: Node, context: WriteContext, declared: Declared, rest: Rest): string {
  const { prefix, ids } = context;
  let out =
    writeTexts("DisplayName", node.displayName, "    ", prefix, rest) +
    writeTexts("Description", node.description, "    ", prefix, rest);
  for (const category of node.category ?? []) out += writeLeaf("Category", category, category, "    ", prefix, rest);
  if (node.documentation !== undefined)
    out += writeLeaf("Documentation", node.documentation, undefined, "    ", prefix, rest);
  if (node.references.length > 0 || rest) out += writeReferences(node.references, context, rest);
  if (node.rolePermissions || rest) out += writeRolePermissions(node.rolePermissions, "    ", prefix, ids, rest, "");
  if ((node.extensions && node.extensions.length > 0) || rest) {
    const extensions = node.extensions ?? [];
    const body = extensions.map((one) => writeRaw("Extension", one, "      ", prefix, declared, rest, "Extensions"));
    out += writeTable({ name: "Extensions", prefix, indent: "    " }, body.join(""), rest, "Extensions");
  }
  return out;
}

/** An element whose content is kept raw and whose ids, if it has some, mean nothing to OPC UA. */
export function writeRaw(
  name: string,
  text: XmlText,
  indent: string,
  prefix: string,
  declared: Declared,
  rest: Rest,
  parent: string,
): string {
  const before = rest?.before(rest.next(parent, name), indent) ?? "";
  return `${before}${indent}${writeAround(prefix + name, text, declared, undefined)}\n`;
}

function writeReferences(references: readonly DeclaredReference[], context: WriteContext, rest: Rest): string {
  let body = "";
  for (const reference of references) body += writeReference(reference, context, rest);
  return writeTable({ name: "References", prefix: context.prefix, indent: "    " }, body, rest, "References");
}

function writeReference(reference: DeclaredReference, context: WriteContext, rest: Rest): string {
  const { ids, prefix, referenceHeads } = context;
  const { type, target, isForward, serverUri, otherAttributes } = reference;
  // A model has few reference types and tens of thousands of references.
  let head = (isForward ? referenceHeads.forward : referenceHeads.inverse).get(type);
  if (head === undefined) {
    head = `      <${prefix}Reference ReferenceType="${escapeAttribute(ids.formatType(type))}"${isForward ? "" : ' IsForward="false"'}`;
    (isForward ? referenceHeads.forward : referenceHeads.inverse).set(type, head);
  }
  if (otherAttributes) {
    if (otherAttributes.IsForward !== undefined)
      head = `      <${prefix}Reference ReferenceType="${escapeAttribute(ids.formatType(type))}"`;
    for (const [name, value] of Object.entries(otherAttributes)) head += ` ${name}="${escapeAttribute(value)}"`;
  }
  const text = escapeText(ids.formatTarget(target, serverUri));
  if (!rest) return `${head}>${text}</${prefix}Reference>\n`;
  const at = rest.next("References", "Reference", nameReference(reference));
  return `${rest.before(at, "      ")}${head}>${text}${rest.insideText(at)}</${prefix}Reference>\n`;
}

/** `parent` is the path of the element around, for leftovers. An empty list is written, an absent one is not. */
export function writeRolePermissions(
  permissions: readonly RolePermission[] | undefined,
  indent: string,
  prefix: string,
  ids: IdWriter,
  rest: Rest,
  parent: string,
): string {
  const at = joinPath(parent, "RolePermissions");
  let body = "";
  for (const { role, permissions: mask } of permissions ?? []) {
    const attribute = ` Permissions="${mask}"`;
    body += writeLeaf("RolePermission", ids.formatKey(role), undefined, `${indent}  `, prefix, rest, at, attribute);
  }
  return writeTable({ name: "RolePermissions", prefix, indent, isKept: permissions !== undefined }, body, rest, at);
}

function writeSpecific(node: Node, context: WriteContext, declared: Declared, rest: Rest): string {
  const { prefix, ids } = context;
  switch (node.nodeClass) {
    case "Variable":
    case "VariableType": {
      let out = rest?.before("Value", "    ") ?? "";
      if (node.value) out += `    ${writeAround(`${prefix}Value`, node.value, declared, ids)}\n`;
      if (node.nodeClass === "VariableType") return out;
      for (const translation of node.translations ?? []) {
        out += writeRaw("Translation", translation, "    ", prefix, declared, rest, "");
      }
      return out;
    }
    case "Method":
      return (node.argumentDescriptions ?? []).map((argument) => writeArgument(argument, prefix, rest)).join("");
    case "DataType":
      return node.definition ? writeDefinition(node.definition, context, declared, rest) : "";
    case "ReferenceType":
      return writeTexts("InverseName", node.inverseName, "    ", prefix, rest);
    default:
      return "";
  }
}

function writeArgument(argument: ArgumentDescription, prefix: string, rest: Rest): string {
  const at = rest?.next("", "ArgumentDescription") ?? "";
  const body =
    writeLeaf("Name", argument.name, undefined, "      ", prefix, rest, at) +
    writeTexts("Description", argument.description, "      ", prefix, rest, at);
  return writeTable({ name: "ArgumentDescription", prefix, indent: "    " }, body, rest, at);
}

function writeDefinition(
  definition: DataTypeDefinition,
  context: WriteContext,
  declared: Declared,
  rest: Rest,
): string {
  const { ids, prefix } = context;
  const head =
    `    <${prefix}Definition Name="${escapeAttribute(ids.formatName(definition.name))}"` +
    writeAttributes(definition, DEFINITION_ATTRIBUTES, definition.otherAttributes, ids, rest?.spellings("Definition"));
  const body =
    definition.fields.map((field) => writeField(field, context, declared, rest)).join("") +
    (definition.otherElements ?? []).map((other) => `      ${writeWholeElement(other, declared)}\n`).join("") +
    (rest?.inside("Definition", "      ") ?? "");
  const before = rest?.before("Definition", "    ") ?? "";
  return before + (body === "" ? `${head} />\n` : `${head}>\n${body}    </${prefix}Definition>\n`);
}

function writeField(field: DataTypeField, { ids, prefix }: WriteContext, declared: Declared, rest: Rest): string {
  const at = rest?.next("Definition", "Field", field.name) ?? "";
  const head =
    `      <${prefix}Field Name="${escapeAttribute(field.name)}"` +
    writeAttributes(field, FIELD_ATTRIBUTES, field.otherAttributes, ids, rest?.spellings(at));
  const body =
    writeTexts("DisplayName", field.displayName, "        ", prefix, rest, at) +
    writeTexts("Description", field.description, "        ", prefix, rest, at) +
    (field.otherElements ?? []).map((other) => `        ${writeWholeElement(other, declared)}\n`).join("") +
    (rest?.inside(at, "        ") ?? "");
  const before = rest?.before(at, "      ") ?? "";
  return before + (body === "" ? `${head} />\n` : `${head}>\n${body}      </${prefix}Field>\n`);
}

function writeTexts(
  name: string,
  texts: readonly LocalizedText[] | undefined,
  indent: string,
  prefix: string,
  rest: Rest,
  parent = "",
): string {
  let out = "";
  for (const { locale, text } of texts ?? []) {
    const attribute = locale === undefined ? "" : ` Locale="${escapeAttribute(locale)}"`;
    out += writeLeaf(name, text, locale, indent, prefix, rest, parent, attribute);
  }
  return out;
}

/** An element that holds text. `label` is what tells it from its siblings in leftovers, `parent` the path around it. */
export function writeLeaf(
  name: string,
  text: string,
  label: string | undefined,
  indent: string,
  prefix: string,
  rest: Rest,
  parent = "",
  attribute = "",
): string {
  const element = prefix + name;
  if (!rest) {
    return text === ""
      ? `${indent}<${element}${attribute} />\n`
      : `${indent}<${element}${attribute}>${escapeText(text)}</${element}>\n`;
  }
  const at = rest.next(parent, name, label);
  const head = `${rest.before(at, indent)}${indent}<${element}${attribute}${rest.attributes(at)}`;
  const content = escapeText(text) + rest.insideText(at);
  return content === "" ? `${head} />\n` : `${head}>${content}</${element}>\n`;
}

function writeOthers(node: Node, declared: Declared): string {
  return (node.otherElements ?? []).map((other) => `    ${writeWholeElement(other, declared)}\n`).join("");
}

function withNodeDeclarations(declared: Declared, attributes: Readonly<Record<string, string>> | undefined): Declared {
  const own = Object.entries(attributes ?? {}).filter(([name]) => name.startsWith("xmlns:"));
  if (own.length === 0) return declared;
  return { ...declared, ...Object.fromEntries(own.map(([name, uri]) => [name.slice(6), uri])) };
}
