/** Single values made lists of one, and back. */
import type { XmlText } from "../address-space/node";
import type { ValueElement } from "./value-element";
import { listItemType } from "./value-xml";

const TYPES = "http://opcfoundation.org/UA/2008/02/Types.xsd";

/** `<Double>1</Double>` in `<ListOfDouble>…`; undefined for what is a list or a matrix already. */
export function wrapInList(value: XmlText, type: string): XmlText | undefined {
  if (type === "Matrix" || type.startsWith("ListOf")) return undefined;
  return { ...value, xml: `<ListOf${type} xmlns="${TYPES}">${value.xml.trim()}</ListOf${type}>` };
}

/** The one item of a list; undefined where there are none or several, or where prefixes would be lost. */
export function unwrapList({ xml }: XmlText, root: ValueElement): XmlText | undefined {
  const type = listItemType(root);
  if (type === undefined || root.children.length !== 1) return undefined;
  const inner = /^<ListOf\w+[^>]*>([\s\S]*)<\/ListOf\w+>$/.exec(xml.trim())?.[1]?.trim();
  if (inner === undefined || !inner.startsWith(`<${type}`)) return undefined;
  return { xml: inner.replace(`<${type}`, `<${type} xmlns="${TYPES}"`) };
}
