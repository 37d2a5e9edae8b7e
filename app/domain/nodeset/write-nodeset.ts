/**
 * Writes a NodeSet2 file (OPC 10000-6 Annex F). The same content gives the same bytes: UTF-8, LF, two spaces a level,
 * attributes and children in fixed order, nodes and references in the order of the model.
 */
import type { ModelEntry, ModelHeader } from "../address-space/model-header";
import type { Node } from "../address-space/node";
import type { NodeId, NodeKey } from "../address-space/node-id";
import { MODEL_ATTRIBUTES } from "./attribute-tables";
import { toCanonicalOrder } from "./canonical-order";
import { IdWriter } from "./id-writer";
import { NODESET_XML_NAMESPACE } from "./nodeset-xml";
import { BEHIND_ROOT } from "./leftover-path";
import { LeftoverWriter, writeTable } from "./leftover-writer";
import { writeWholeElement } from "./write-fragments";
import {
  writeAttributes,
  writeBeforeNode,
  writeLeaf,
  writeNode,
  writeRaw,
  writeRolePermissions,
  type WriteContext,
} from "./write-node";
import { escapeAttribute } from "./xml/escape";

export type WriteOptions = {
  /** Types first, parents before children, else by id; default is the order of the model. */
  readonly canonicalOrder?: boolean;
  /** The present NodeId of a node of a required model, where it may differ from the id that its key was made from. */
  readonly findNodeId?: (key: NodeKey) => NodeId | undefined;
};

export type WrittenNodeSet = {
  readonly xml: string;
  /** The line, 1-based, in which the element of each node starts. */
  readonly lines: ReadonlyMap<NodeKey, number>;
};

/** Only declared references are written; that both ends declare what interoperability asks for is the commands' part. */
export function writeNodeSet(
  content: { readonly header: ModelHeader; readonly nodes: readonly Node[] },
  options: WriteOptions = {},
): WrittenNodeSet {
  const { header } = content;
  const nodes = options.canonicalOrder ? toCanonicalOrder(content.nodes) : inModelOrder(content.nodes);
  const ids = new IdWriter(header, nodes, options.findNodeId ?? (() => undefined));
  const root = makeRoot(header);
  const context: WriteContext = {
    ids,
    prefix: root.prefix,
    declared: root.declared,
    referenceHeads: { forward: new Map(), inverse: new Map() },
  };
  // Nodes before the head: they decide which namespaces and aliases the head must list.
  const parts: string[] = [];
  const heights = nodes.map((node) => {
    const before = node.leftovers ? writeBeforeNode(node) : "";
    const part = writeNode(node, context);
    parts.push(before, part);
    // Counting at once also makes one string of the many that the part was put together from.
    return { before: countLineBreaks(before), own: countLineBreaks(part) };
  });
  const rest = LeftoverWriter.of(header.leftovers, root.declared);
  const head = writeHead(header, root, context, rest);
  const tail = `${rest?.inside("", "  ") ?? ""}</${root.prefix}UANodeSet>\n${rest?.inside(BEHIND_ROOT, "") ?? ""}`;
  let lines: ReadonlyMap<NodeKey, number> | undefined;
  return {
    xml: `${head}${parts.join("")}${tail}`,
    get lines() {
      return (lines ??= toLines(nodes, heights, countLineBreaks(head) + 1));
    },
  };
}

/** Lines that one node takes, and those of the comments before it. */
type Height = { readonly before: number; readonly own: number };

/** The first line of each node, from the number of lines that each takes. */
function toLines(nodes: readonly Node[], heights: readonly Height[], first: number): ReadonlyMap<NodeKey, number> {
  let line = first;
  return new Map(
    nodes.map((node, i) => {
      const height = heights[i] ?? { before: 0, own: 0 };
      const start = line + height.before;
      line = start + height.own;
      return [node.key, start];
    }),
  );
}

function inModelOrder(nodes: readonly Node[]): readonly Node[] {
  const isSorted = nodes.every((node, i) => i === 0 || (nodes[i - 1]?.order ?? 0) <= node.order);
  return isSorted ? nodes : [...nodes].sort((a, b) => a.order - b.order);
}

type Root = {
  readonly prefix: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly declared: Readonly<Record<string, string>>;
};

/** Keeps the root's declarations as they were and finds the prefix of the NodeSet's own elements among them. */
function makeRoot(header: ModelHeader): Root {
  const attributes: Record<string, string> = { ...header.rootAttributes };
  const declared: Record<string, string> = {};
  for (const [name, uri] of Object.entries(attributes)) {
    if (name === "xmlns") declared[""] = uri;
    else if (name.startsWith("xmlns:")) declared[name.slice(6)] = uri;
  }
  let prefix = Object.entries(declared).find(([, uri]) => uri === NODESET_XML_NAMESPACE)?.[0];
  if (declared[""] === NODESET_XML_NAMESPACE) prefix = "";
  if (prefix === undefined) {
    prefix = declared[""] === undefined ? "" : "ua";
    attributes[prefix === "" ? "xmlns" : `xmlns:${prefix}`] = NODESET_XML_NAMESPACE;
    declared[prefix] = NODESET_XML_NAMESPACE;
  }
  return { prefix: prefix === "" ? "" : `${prefix}:`, attributes, declared };
}

function writeHead(header: ModelHeader, root: Root, context: WriteContext, rest: LeftoverWriter | undefined): string {
  const { ids, prefix, declared } = context;
  let out = '<?xml version="1.0" encoding="utf-8"?>\n';
  for (const comment of header.headComments ?? []) out += `<!--${comment}-->\n`;
  out += rest?.before("", "") ?? "";
  out += `<${prefix}UANodeSet${writeRootAttributes(header, root)}>\n`;
  // The models come first in time: their roles may need a namespace that the table lacks.
  const models = header.models.map((model) => writeModel("Model", model, "    ", context, rest, "Models")).join("");
  const aliases = (header.aliases ?? ids.listUsedAliases())
    .map(([alias, key]) => {
      const attribute = ` Alias="${escapeAttribute(alias)}"`;
      return writeLeaf("Alias", ids.formatKey(key), alias, "    ", prefix, rest, "Aliases", attribute);
    })
    .join("");
  const extensions = (header.extensions ?? [])
    .map((extension) => writeRaw("Extension", extension, "    ", prefix, declared, rest, "Extensions"))
    .join("");
  const table = (name: string, body: string): string => writeTable({ name, prefix, indent: "  " }, body, rest, name);
  const uris = (name: string, list: readonly string[]): string =>
    table(name, list.map((uri) => writeLeaf("Uri", uri, uri, "    ", prefix, rest, name)).join(""));
  out += uris("NamespaceUris", ids.namespaceUris) + uris("ServerUris", ids.serverUris);
  out += table("Models", models) + table("Aliases", aliases) + table("Extensions", extensions);
  for (const other of header.otherElements ?? []) out += `  ${writeWholeElement(other, declared)}\n`;
  return out;
}

function writeRootAttributes(header: ModelHeader, root: Root): string {
  const modified = header.lastModified === undefined ? "" : ` LastModified="${escapeAttribute(header.lastModified)}"`;
  const others = Object.entries(root.attributes).map(([name, value]) => ` ${name}="${escapeAttribute(value)}"`);
  return modified + others.join("");
}

function writeModel(
  element: string,
  model: ModelEntry,
  indent: string,
  context: WriteContext,
  rest: LeftoverWriter | undefined,
  parent: string,
): string {
  const { prefix, ids } = context;
  const at = rest?.next(parent, element, model.modelUri) ?? "";
  const head =
    `${indent}<${prefix}${element} ModelUri="${escapeAttribute(model.modelUri)}"` +
    writeAttributes(model, MODEL_ATTRIBUTES, model.otherAttributes, ids, rest?.spellings(at));
  const inner = `${indent}  `;
  const required = model.requiredModels.map((one) => writeModel("RequiredModel", one, inner, context, rest, at));
  const body =
    writeRolePermissions(model.rolePermissions, inner, prefix, ids, rest, at) +
    required.join("") +
    (model.otherElements ?? []).map((other) => `${inner}${writeWholeElement(other, context.declared)}\n`).join("") +
    (rest?.inside(at, inner) ?? "");
  const before = rest?.before(at, indent) ?? "";
  return before + (body === "" ? `${head} />\n` : `${head}>\n${body}${indent}</${prefix}${element}>\n`);
}

function countLineBreaks(text: string): number {
  let count = 0;
  for (let at = text.indexOf("\n"); at >= 0; at = text.indexOf("\n", at + 1)) count++;
  return count;
}
