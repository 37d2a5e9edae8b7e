/**
 * What a NodeSet2 file says, by a slow and obvious second way: the DOM of libxml2, no table of attributes, no classes.
 * Two files that say the same give equal descriptions, whatever their prefixes, the order of their namespaces, of their
 * nodes or of references at a node. It shares no code with the reader and must stay so.
 */
import { XmlDocument, XmlElement } from "libxml2-wasm";

const NODESET = "http://opcfoundation.org/UA/2011/03/UANodeSet.xsd";
const TYPES = "http://opcfoundation.org/UA/2008/02/Types.xsd";
const ID_ATTRIBUTES = new Set(["NodeId", "ParentNodeId", "DataType", "MethodDeclarationId", "ReferenceType"]);
const NAME_PARENTS = new Set(["Definition"]);

export type NodeSetDescription = {
  readonly namespaces: readonly string[];
  readonly head: readonly string[];
  /** By NodeId with namespace URI; a NodeId that is given twice is listed twice. */
  readonly nodes: readonly (readonly [id: string, text: string])[];
};

type Tables = { readonly uris: readonly string[]; readonly aliases: ReadonlyMap<string, string> };

export function describeNodeSetTree(xml: Uint8Array | string): NodeSetDescription {
  const document = typeof xml === "string" ? XmlDocument.fromString(xml) : XmlDocument.fromBuffer(xml);
  try {
    return describeRoot(document.root);
  } finally {
    document.dispose();
  }
}

function describeRoot(root: XmlElement): NodeSetDescription {
  const children = elementsOf(root);
  const uris = textsOf(children, "NamespaceUris");
  const aliases = new Map<string, string>();
  for (const table of children.filter((child) => child.name === "Aliases")) {
    for (const alias of elementsOf(table)) aliases.set(alias.attr("Alias")?.value ?? "", alias.content.trim());
  }
  const tables = { uris: ["http://opcfoundation.org/UA/", ...uris], aliases };
  const isNode = (child: XmlElement): boolean => child.namespaceUri === NODESET && child.name.startsWith("UA");
  const isTable = (child: XmlElement): boolean => child.name === "NamespaceUris" || child.name === "Aliases";
  const attributes = root.attrs.map((attribute) => `@${attribute.name}=${attribute.value}`).sort();
  const heads = children.filter((child) => !isNode(child) && !isTable(child) && elementsOf(child).length > 0);
  const namesOfAliases = [...aliases].map(([alias, id]) => `alias ${alias}=${expandId(id, tables)}`).sort();
  const nodes = children.filter(isNode).map((child): [string, string] => {
    return [expandId(child.attr("NodeId")?.value ?? "", tables), describeElement(child, tables, "node", 0)];
  });
  return {
    namespaces: [...uris].sort(),
    head: [...attributes, ...namesOfAliases, ...heads.map((child) => describeElement(child, tables, "head", 0)).sort()],
    nodes: nodes.sort((a, b) => (a[0] < b[0] ? -1 : a[0] > b[0] ? 1 : 0)),
  };
}

/** "value" is the inside of a Value, where ids are elements; "free" is XML that means nothing to OPC UA. */
type Place = "node" | "head" | "value" | "free";

function findInner(element: XmlElement, place: Place): Place {
  if (place === "node" && element.name === "Value" && element.namespaceUri === NODESET) return "value";
  return place === "value" && element.name === "XmlElement" && element.namespaceUri === TYPES ? "free" : place;
}

function describeElement(element: XmlElement, tables: Tables, place: Place, depth: number): string {
  const inner = findInner(element, place);
  const attributes = element.attrs
    .map(
      ({ namespaceUri, name, value }) =>
        `@{${namespaceUri}}${name}=${describeAttribute(element, name, value, tables, place)}`,
    )
    .sort();
  const children = elementsOf(element);
  const indent = "  ".repeat(depth + 1);
  const head = `{${element.namespaceUri}}${element.name} ${attributes.join(" ")}`;
  if (children.length === 0) return `${head} "${describeText(element, tables, place)}"`;
  const lines = children.map((child) => describeElement(child, tables, inner, depth + 1));
  const isUnordered = (inner === "node" || inner === "head") && element.namespaceUri === NODESET;
  // Between different elements the schema gives the order; among equal ones it is the file's, except for references.
  const ordered = isUnordered ? sortByName(lines, element.name === "References") : lines;
  return [head, ...ordered.filter((line) => !isEmptyReferences(line)).map((line) => indent + line)].join("\n");
}

function sortByName(lines: readonly string[], fully: boolean): string[] {
  const nameOf = (line: string): string => line.slice(0, line.indexOf(" "));
  return lines
    .map((line, index) => ({ line, index }))
    .sort((a, b) => {
      const left = fully ? a.line : nameOf(a.line);
      const right = fully ? b.line : nameOf(b.line);
      return left < right ? -1 : left > right ? 1 : a.index - b.index;
    })
    .map(({ line }) => line);
}

/** An element References without references says nothing. */
function isEmptyReferences(line: string): boolean {
  return line === `{${NODESET}}References  ""`;
}

function describeAttribute(element: XmlElement, name: string, value: string, tables: Tables, place: Place): string {
  if (place === "value" || place === "free" || element.namespaceUri !== NODESET) return value;
  if (ID_ATTRIBUTES.has(name)) return expandId(value, tables);
  if (name === "BrowseName" || (name === "Name" && NAME_PARENTS.has(element.name))) return expandName(value, tables);
  return value;
}

function describeText(element: XmlElement, tables: Tables, place: Place): string {
  const text = element.content;
  if (place === "value" && element.namespaceUri === TYPES) {
    if (element.name === "Identifier" && /^\s*(svr=\d+;)?ns=/.test(text)) return expandId(text.trim(), tables);
    if (element.name === "NamespaceIndex" && Number(text) > 0) return tables.uris[Number(text)] ?? `index ${text}`;
  }
  if (place === "value" || place === "free" || element.namespaceUri !== NODESET) return text;
  return element.name === "Reference" || element.name === "RolePermission" ? expandId(text.trim(), tables) : text;
}

function expandId(text: string, { uris, aliases }: Tables): string {
  const resolved = aliases.get(text) ?? text;
  const match = /^(svr=\d+;)?(?:ns=(\d+);)?(.*)$/s.exec(resolved);
  const index = Number(match?.[2] ?? "0");
  return `${match?.[1] ?? ""}{${uris[index] ?? `index ${index}`}}${match?.[3] ?? ""}`;
}

function expandName(text: string, { uris }: Tables): string {
  const match = /^(\d+):(.*)$/s.exec(text);
  return match ? `{${uris[Number(match[1])] ?? ""}}${match[2] ?? ""}` : `{${uris[0] ?? ""}}${text}`;
}

function textsOf(children: readonly XmlElement[], name: string): string[] {
  return children
    .filter((child) => child.name === name)
    .flatMap((child) => elementsOf(child).map((uri) => uri.content.trim()));
}

function elementsOf(element: XmlElement): XmlElement[] {
  const found: XmlElement[] = [];
  for (let child = element.firstChild; child; child = child.next) if (child instanceof XmlElement) found.push(child);
  return found;
}

/** Comments at the head of a file. */
export function listHeadComments(xml: string): string[] {
  const root = xml.search(/<[^\s!?/>:]*:?UANodeSet[\s>/]/);
  return [...xml.slice(0, root).matchAll(/<!--([^]*?)-->/g)].map((match) => match[1] ?? "");
}
