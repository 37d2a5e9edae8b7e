/** Writes one node as XML: attributes in the order of the tables, children in the order of the schema. */
import type { DataTypeDefinition, DataTypeField, DeclaredReference, Node, RolePermission } from "../address-space/node";
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
import { writeAround, writeWholeElement, type Declared } from "./write-fragments";
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

export function writeNode(node: Node, context: WriteContext): string {
  const { ids, prefix } = context;
  const element = `${prefix}UA${node.nodeClass}`;
  const head =
    `  <${element} NodeId="${escapeAttribute(ids.formatKey(node.key))}"` +
    ` BrowseName="${escapeAttribute(ids.formatName(node.browseName))}"` +
    writeAttributes(node, NODE_ATTRIBUTES[node.nodeClass], node.otherAttributes, ids);
  const declared = withNodeDeclarations(context.declared, node.otherAttributes);
  const body =
    writeCommon(node, context, declared) + writeSpecific(node, context, declared) + writeOthers(node, declared);
  return body === "" ? `${head} />\n` : `${head}>\n${body}  </${element}>\n`;
}

/** Attributes by table, then those kept as written; where both have one, the table's holds. */
export function writeAttributes(
  fields: object,
  table: AttributeTable,
  others: Readonly<Record<string, string>> | undefined,
  ids: IdWriter,
): string {
  let out = "";
  const values = fields as Readonly<Record<string, unknown>>;
  table.forEach(({ name, field, type }) => {
    const value = values[field];
    if (value !== undefined) out += ` ${name}="${formatAttribute(value, type, name, ids)}"`;
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

function writeCommon(node: Node, context: WriteContext, declared: Declared): string {
  const { prefix, ids } = context;
  let out =
    writeTexts("DisplayName", node.displayName, "    ", prefix) +
    writeTexts("Description", node.description, "    ", prefix);
  for (const category of node.category ?? []) out += writeText(`${prefix}Category`, category, "    ");
  if (node.documentation !== undefined) out += writeText(`${prefix}Documentation`, node.documentation, "    ");
  if (node.references.length > 0) {
    out += `    <${prefix}References>\n`;
    for (const reference of node.references) out += writeReference(reference, context);
    out += `    </${prefix}References>\n`;
  }
  if (node.rolePermissions) out += writeRolePermissions(node.rolePermissions, "    ", prefix, ids);
  if (node.extensions && node.extensions.length > 0) {
    out += `    <${prefix}Extensions>\n`;
    for (const extension of node.extensions) {
      out += `      ${writeAround(`${prefix}Extension`, extension, declared, undefined)}\n`;
    }
    out += `    </${prefix}Extensions>\n`;
  }
  return out;
}

function writeReference(reference: DeclaredReference, context: WriteContext): string {
  const { ids, prefix, referenceHeads } = context;
  const { type, target, isForward, serverUri, otherAttributes } = reference;
  // A model has few reference types and tens of thousands of references.
  let head = (isForward ? referenceHeads.forward : referenceHeads.inverse).get(type);
  if (head === undefined) {
    head = `      <${prefix}Reference ReferenceType="${escapeAttribute(ids.formatType(type))}"${isForward ? "" : ' IsForward="false"'}`;
    (isForward ? referenceHeads.forward : referenceHeads.inverse).set(type, head);
  }
  if (otherAttributes) {
    for (const [name, value] of Object.entries(otherAttributes)) head += ` ${name}="${escapeAttribute(value)}"`;
  }
  return `${head}>${escapeText(ids.formatTarget(target, serverUri))}</${prefix}Reference>\n`;
}

export function writeRolePermissions(
  permissions: readonly RolePermission[],
  indent: string,
  prefix: string,
  ids: IdWriter,
): string {
  if (permissions.length === 0) return `${indent}<${prefix}RolePermissions />\n`;
  let out = `${indent}<${prefix}RolePermissions>\n`;
  for (const { role, permissions: mask } of permissions) {
    out += `${indent}  <${prefix}RolePermission Permissions="${mask}">${escapeText(ids.formatKey(role))}</${prefix}RolePermission>\n`;
  }
  return `${out}${indent}</${prefix}RolePermissions>\n`;
}

function writeSpecific(node: Node, context: WriteContext, declared: Declared): string {
  const { prefix, ids } = context;
  switch (node.nodeClass) {
    case "Variable":
    case "VariableType": {
      let out = node.value ? `    ${writeAround(`${prefix}Value`, node.value, declared, ids)}\n` : "";
      if (node.nodeClass === "VariableType") return out;
      for (const translation of node.translations ?? []) {
        out += `    ${writeAround(`${prefix}Translation`, translation, declared, undefined)}\n`;
      }
      return out;
    }
    case "Method":
      return (node.argumentDescriptions ?? []).map((argument) => writeArgument(argument, prefix)).join("");
    case "DataType":
      return node.definition ? writeDefinition(node.definition, context, declared) : "";
    case "ReferenceType":
      return writeTexts("InverseName", node.inverseName, "    ", prefix);
    default:
      return "";
  }
}

function writeArgument(
  argument: { readonly name: string; readonly description: readonly LocalizedText[] },
  prefix: string,
): string {
  const body =
    writeText(`${prefix}Name`, argument.name, "      ") +
    writeTexts("Description", argument.description, "      ", prefix);
  return `    <${prefix}ArgumentDescription>\n${body}    </${prefix}ArgumentDescription>\n`;
}

function writeDefinition(definition: DataTypeDefinition, context: WriteContext, declared: Declared): string {
  const { ids, prefix } = context;
  const head =
    `    <${prefix}Definition Name="${escapeAttribute(ids.formatName(definition.name))}"` +
    writeAttributes(definition, DEFINITION_ATTRIBUTES, definition.otherAttributes, ids);
  const body =
    definition.fields.map((field) => writeField(field, context, declared)).join("") +
    (definition.otherElements ?? []).map((other) => `      ${writeWholeElement(other, declared)}\n`).join("");
  return body === "" ? `${head} />\n` : `${head}>\n${body}    </${prefix}Definition>\n`;
}

function writeField(field: DataTypeField, { ids, prefix }: WriteContext, declared: Declared): string {
  const head =
    `      <${prefix}Field Name="${escapeAttribute(field.name)}"` +
    writeAttributes(field, FIELD_ATTRIBUTES, field.otherAttributes, ids);
  const body =
    writeTexts("DisplayName", field.displayName, "        ", prefix) +
    writeTexts("Description", field.description, "        ", prefix) +
    (field.otherElements ?? []).map((other) => `        ${writeWholeElement(other, declared)}\n`).join("");
  return body === "" ? `${head} />\n` : `${head}>\n${body}      </${prefix}Field>\n`;
}

function writeTexts(name: string, texts: readonly LocalizedText[] | undefined, indent: string, prefix: string): string {
  let out = "";
  for (const { locale, text } of texts ?? []) {
    const attribute = locale === undefined ? "" : ` Locale="${escapeAttribute(locale)}"`;
    out += writeText(`${prefix}${name}`, text, indent, attribute);
  }
  return out;
}

export function writeText(element: string, text: string, indent: string, attribute = ""): string {
  return text === ""
    ? `${indent}<${element}${attribute} />\n`
    : `${indent}<${element}${attribute}>${escapeText(text)}</${element}>\n`;
}

function writeOthers(node: Node, declared: Declared): string {
  return (node.otherElements ?? []).map((other) => `    ${writeWholeElement(other, declared)}\n`).join("");
}

function withNodeDeclarations(declared: Declared, attributes: Readonly<Record<string, string>> | undefined): Declared {
  const own = Object.entries(attributes ?? {}).filter(([name]) => name.startsWith("xmlns:"));
  if (own.length === 0) return declared;
  return { ...declared, ...Object.fromEntries(own.map(([name, uri]) => [name.slice(6), uri])) };
}
