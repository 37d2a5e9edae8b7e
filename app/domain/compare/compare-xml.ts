/** Whether two kept XML texts mean the same: prefixes, declarations and white space between elements do not count. */
import type { XmlText } from "../address-space/node";
import { readXmlTree, type XmlElement } from "../core/xml-tree";

export function isSameXml(a: XmlText | undefined, b: XmlText | undefined): boolean {
  if (a === undefined || b === undefined) return a === b;
  if (a.xml === b.xml && JSON.stringify(a.prefixes ?? {}) === JSON.stringify(b.prefixes ?? {})) return true;
  const [left, right] = [readXmlText(a), readXmlText(b)];
  return left !== undefined && right !== undefined && isSameElement(left, right);
}

/** The kept text as a tree below one element that declares its prefixes; undefined when it is no well-formed XML. */
export function readXmlText(text: XmlText): XmlElement | undefined {
  const declarations = Object.entries(text.prefixes ?? {})
    .map(
      ([prefix, uri]) =>
        ` xmlns${prefix === "" ? "" : `:${prefix}`}="${uri.replace(/&/g, "&amp;").replace(/"/g, "&quot;").replace(/</g, "&lt;")}"`,
    )
    .join("");
  const tree = readXmlTree(`<v${declarations}>${text.xml}</v>`);
  return tree.ok ? tree.value : undefined;
}

function isSameElement(a: XmlElement, b: XmlElement): boolean {
  if (a.name !== b.name || a.namespaceUri !== b.namespaceUri || a.children.length !== b.children.length) return false;
  // Between child elements white space is layout; in a leaf it is the value.
  const isLeaf = a.children.length === 0;
  if (isLeaf ? a.text !== b.text : a.text.trim() !== b.text.trim()) return false;
  if (!isSameAttributes(a, b)) return false;
  return a.children.every((child, i) => {
    const other = b.children[i];
    return other !== undefined && isSameElement(child, other);
  });
}

function isSameAttributes(a: XmlElement, b: XmlElement): boolean {
  const listOf = (e: XmlElement): string =>
    Object.entries(e.attributes)
      .filter(([name]) => name !== "xmlns" && !name.startsWith("xmlns:"))
      .map(([name, value]) => `${name}=${value}`)
      .sort()
      .join("\n");
  return listOf(a) === listOf(b);
}

/** The first descendant with this name. */
export function findDescendant(element: XmlElement | undefined, name: string): XmlElement | undefined {
  if (!element) return undefined;
  for (const child of element.children) {
    if (child.name === name) return child;
    const found = findDescendant(child, name);
    if (found) return found;
  }
  return undefined;
}
