/**
 * What a NodeSet2 file says, by a slow and obvious second way: the DOM of libxml2, no table of attributes, no classes.
 * Two files that say the same give equal descriptions, whatever their prefixes, the order of their namespaces, of their
 * nodes or of references at a node. Comments and stray text count, each with the element that follows it. It shares no
 * code with the reader and must stay so.
 */
import { XmlCData, XmlComment, XmlDocument, XmlElement, XmlText } from "libxml2-wasm";

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
  const text = typeof xml === "string" ? xml : decode(xml);
  // libxml2-wasm does not show processing instructions; as comments they are seen.
  const document = XmlDocument.fromString(text.replace(/<\?(?!xml\s)([^]*?)\?>/g, "<!--?$1?-->"));
  const tail = text.slice(text.lastIndexOf("UANodeSet")).replace(/^[^>]*>/, "");
  try {
    const description = describeRoot(document.root);
    const behind = tail.trim() === "" ? [] : [`behind ${tail.trim()}`];
    return { ...description, head: [...description.head, ...behind] };
  } finally {
    document.dispose();
  }
}

/** UTF-8, or UTF-16 by its mark: libxml2 is given text, so that its processing instructions can be changed before. */
function decode(bytes: Uint8Array): string {
  const [first, second] = bytes;
  const encoding =
    first === 0xff && second === 0xfe ? "utf-16le" : first === 0xfe && second === 0xff ? "utf-16be" : "utf-8";
  return new TextDecoder(encoding).decode(bytes);
}

function describeRoot(root: XmlElement): NodeSetDescription {
  const children = elementsOf(root);
  const marks = marksOf(root);
  const marksBefore = (index: number): readonly string[] => marks.before.get(index) ?? [];
  const uris = textsOf(children, "NamespaceUris");
  const aliases = new Map<string, string>();
  for (const table of children.filter((child) => child.name === "Aliases")) {
    for (const alias of elementsOf(table).filter((row) => row.namespaceUri === NODESET))
      aliases.set(alias.attr("Alias")?.value ?? "", alias.content.trim());
  }
  const tables = { uris: ["http://opcfoundation.org/UA/", ...uris], aliases };
  const isNode = (child: XmlElement): boolean => child.namespaceUri === NODESET && child.name.startsWith("UA");
  const isTable = (child: XmlElement): boolean => child.name === "NamespaceUris" || child.name === "Aliases";
  const attributes = root.attrs.map((attribute) => `@${attribute.name}=${attribute.value}`).sort();
  const heads = children.filter((child) => !isNode(child) && (!isTable(child) || hasMore(child)));
  const namesOfAliases = [...aliases].map(([alias, id]) => `alias ${alias}=${expandId(id, tables)}`).sort();
  const nodes = children.flatMap((child, index): [string, string][] => {
    if (!isNode(child)) return [];
    const text = [...marksBefore(index), describeElement(child, tables, "node", 0)].join("\n");
    return [[expandId(child.attr("NodeId")?.value ?? "", tables), text]];
  });
  return {
    namespaces: [...uris].sort(),
    head: [
      ...attributes,
      ...namesOfAliases,
      ...heads
        .map((child) => [describeElement(child, tables, "head", 0), ...marksBefore(children.indexOf(child))].join("\n"))
        .filter((line) => !/^\{[^}]*\}\w+ {2}""$/.test(line))
        .sort(),
      ...marks.end.map((mark) => `end ${mark}`),
    ],
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
  const marks = marksOf(element);
  const end = marks.end.map((mark) => `${indent}end ${mark}`);
  if (children.length === 0) {
    return [`${head} "${describeText(element, tables, place)}"`, ...end.filter((mark) => mark.includes("<!--"))].join(
      "\n",
    );
  }
  const lines = children.map((child, index) =>
    [describeElement(child, tables, inner, depth + 1), ...(marks.before.get(index) ?? [])].join(`\n${indent}before `),
  );
  const isUnordered = (inner === "node" || inner === "head") && element.namespaceUri === NODESET;
  // Between different elements the schema gives the order; among equal ones it is the file's, except for references.
  const ordered = isUnordered ? sortByName(lines, element.name === "References") : lines;
  return [head, ...ordered.filter((line) => !isEmptyReferences(line)).map((line) => indent + line), ...end].join("\n");
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
    .flatMap((child) => elementsOf(child).filter((row) => row.namespaceUri === NODESET))
    .map((uri) => uri.content.trim());
}

/** Comments and text that is more than space, in their order, in lists before each child and one behind the last. */
function marksOf(element: XmlElement): { before: ReadonlyMap<number, readonly string[]>; end: readonly string[] } {
  const before = new Map<number, readonly string[]>();
  let marks: string[] = [];
  let index = 0;
  for (let child = element.firstChild; child; child = child.next) {
    if (child instanceof XmlElement) {
      if (marks.length > 0) before.set(index, marks);
      marks = [];
      index++;
    } else if (child instanceof XmlComment) marks.push(`<!--${child.content}-->`);
    else if ((child instanceof XmlText || child instanceof XmlCData) && child.content.trim() !== "") {
      marks.push(child.content.trim());
    }
  }
  return { before, end: marks };
}

/** Whether a table holds more than its rows say. */
function hasMore(table: XmlElement): boolean {
  const hasMarks = (element: XmlElement): boolean => {
    const { before, end } = marksOf(element);
    return before.size > 0 || end.some((mark) => mark.startsWith("<!--"));
  };
  const isMore = (row: XmlElement): boolean =>
    row.namespaceUri !== NODESET || row.attrs.length > (row.name === "Alias" ? 1 : 0) || hasMarks(row);
  return table.attrs.length > 0 || hasMarks(table) || elementsOf(table).some(isMore);
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
