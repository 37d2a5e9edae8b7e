/** Values as element trees, each read once: values are immutable and shared by all states of a model. */
import type { XmlText } from "../address-space/node";
import { findChild, readXmlTree, type XmlElement } from "../core/xml-tree";

export type ValueTree =
  /** One element, as the schema demands. */
  | { readonly kind: "value"; readonly root: XmlElement }
  | { readonly kind: "empty" }
  /** No well-formed XML, or several elements. */
  | { readonly kind: "broken" };

const trees = new WeakMap<XmlText, ValueTree>();

export function readValueTree(value: XmlText): ValueTree {
  let tree = trees.get(value);
  if (!tree) trees.set(value, (tree = makeTree(value)));
  return tree;
}

/** The element of a value that is there and well formed. */
export function findValueRoot(value: XmlText | undefined): XmlElement | undefined {
  if (!value) return undefined;
  const tree = readValueTree(value);
  return tree.kind === "value" ? tree.root : undefined;
}

function makeTree(value: XmlText): ValueTree {
  const prefixes = Object.entries(value.prefixes ?? {})
    .map(([prefix, uri]) => ` xmlns${prefix === "" ? "" : `:${prefix}`}="${escapeAttribute(uri)}"`)
    .join("");
  const read = readXmlTree(`<Value${prefixes}>${value.xml}</Value>`);
  if (!read.ok) return { kind: "broken" };
  const [root, second] = read.value.children;
  if (!root) return { kind: "empty" };
  return second ? { kind: "broken" } : { kind: "value", root };
}

function escapeAttribute(text: string): string {
  return text.replace(/&/g, "&amp;").replace(/</g, "&lt;").replace(/"/g, "&quot;");
}

/** Whether the element says that it is null: `xsi:nil="true"`. */
export function isNil(element: XmlElement): boolean {
  return Object.entries(element.attributes).some(([name, text]) => /(^|:)nil$/.test(name) && (text === "true" || text === "1"));
}

/** Name of the element type of a list: `ListOfString` → `String`; undefined for anything else. */
export function listItemType(element: XmlElement): string | undefined {
  return element.name.startsWith("ListOf") ? element.name.slice(6) : undefined;
}

/** The ExtensionObjects of a value: the value itself, the items of a list, the elements of a matrix. */
export function listExtensionObjects(root: XmlElement | undefined): XmlElement[] {
  if (!root) return [];
  if (root.name === "ExtensionObject") return [root];
  const holder = root.name === "Matrix" ? findChild(root, "Elements") : root;
  return (holder?.children ?? []).filter((c) => c.name === "ExtensionObject");
}

/** The one element in an ExtensionObject's Body. */
export function findBody(extensionObject: XmlElement): XmlElement | undefined {
  return findChild(extensionObject, "Body")?.children[0];
}

export function findTypeId(extensionObject: XmlElement): string | undefined {
  return findChild(extensionObject, "TypeId", "Identifier")?.text.trim();
}

/** Bodies named after a standard structure, wherever they stand in the value. */
export function listBodies(value: XmlText | undefined, name: string): XmlElement[] {
  return listExtensionObjects(findValueRoot(value)).flatMap((e) => {
    const body = findBody(e);
    return body?.name === name ? [body] : [];
  });
}

/** Trimmed text of a field, "" where it is left out. */
export function textOf(element: XmlElement | undefined, ...path: readonly string[]): string {
  return findChild(element, ...path)?.text.trim() ?? "";
}
