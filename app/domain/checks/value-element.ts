/**
 * A small reader for values. A model holds thousands of them, a few elements each, and a tokenizer for whole files costs
 * more to set up than such a text to read. Entities other than the five of XML and character references, document types
 * and wrong nesting are answered with undefined.
 */
export type ValueElement = {
  /** Name without prefix. */
  readonly name: string;
  readonly namespaceUri: string;
  /** Attributes by name as written. */
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: readonly ValueElement[];
  /** All character data directly in the element. */
  readonly text: string;
};

type Open = {
  readonly qualifiedName: string;
  readonly scope: Readonly<Record<string, string>>;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: ValueElement[];
  text: string;
};

const MAX_DEPTH = 200;
const TOKEN =
  /<!--[\s\S]*?-->|<\?[\s\S]*?\?>|<!\[CDATA\[([\s\S]*?)\]\]>|<(\/?)([^\s<>/!?="']+)((?:\s+[^\s<>/="']+\s*=\s*(?:"[^"<]*"|'[^'<]*'))*)\s*(\/?)>|([^<]+)/y;
const ATTRIBUTE = /([^\s=]+)\s*=\s*(?:"([^"]*)"|'([^']*)')/g;
const NONE: Readonly<Record<string, string>> = {};

/** The elements at the top of the text; undefined when it is not well-formed. Text beside elements is left out. */
export function readValueElements(
  xml: string,
  prefixes: Readonly<Record<string, string>> = NONE,
): readonly ValueElement[] | undefined {
  const top: Open = { qualifiedName: "", scope: prefixes, attributes: NONE, children: [], text: "" };
  const open: Open[] = [top];
  TOKEN.lastIndex = 0;
  while (TOKEN.lastIndex < xml.length) {
    const token = TOKEN.exec(xml);
    if (!token) return undefined;
    const [, cdata, slash, name, attributes, isEmpty, text] = token;
    const at = open.at(-1) ?? top;
    if (text !== undefined) {
      const decoded = decode(text);
      if (decoded === undefined) return undefined;
      at.text += decoded;
    } else if (cdata !== undefined) at.text += cdata;
    else if (name !== undefined && slash) {
      if (open.length < 2 || at.qualifiedName !== name) return undefined;
      open.pop();
      open.at(-1)?.children.push(close(at));
    } else if (name !== undefined) {
      const started = start(name, attributes ?? "", at.scope);
      if (!started || open.length > MAX_DEPTH) return undefined;
      if (isEmpty) at.children.push(close(started));
      else open.push(started);
    }
  }
  return open.length === 1 ? top.children : undefined;
}

function start(qualifiedName: string, text: string, outer: Readonly<Record<string, string>>): Open | undefined {
  if (text === "") return { qualifiedName, scope: outer, attributes: NONE, children: [], text: "" };
  const attributes: Record<string, string> = {};
  let scope = outer;
  for (const [, name = "", double, single] of text.matchAll(ATTRIBUTE)) {
    const value = decode(double ?? single ?? "");
    if (value === undefined) return undefined;
    attributes[name] = value;
    if (name === "xmlns") scope = { ...scope, "": value };
    else if (name.startsWith("xmlns:")) scope = { ...scope, [name.slice(6)]: value };
  }
  return { qualifiedName, scope, attributes, children: [], text: "" };
}

function close({ qualifiedName, scope, attributes, children, text }: Open): ValueElement {
  const colon = qualifiedName.indexOf(":");
  const prefix = colon < 0 ? "" : qualifiedName.slice(0, colon);
  return { name: qualifiedName.slice(colon + 1), namespaceUri: scope[prefix] ?? "", attributes, children, text };
}

const ENTITIES: Readonly<Record<string, string>> = { lt: "<", gt: ">", amp: "&", quot: '"', apos: "'" };

function decode(text: string): string | undefined {
  if (!text.includes("&")) return text;
  let isKnown = true;
  const decoded = text.replace(
    /&(?:#x([0-9a-f]{1,6})|#(\d{1,7})|(\w+));|&/gi,
    (_whole, hex?: string, decimal?: string, name?: string) => {
      const code = hex === undefined ? (decimal === undefined ? undefined : Number(decimal)) : Number.parseInt(hex, 16);
      if (code !== undefined && code <= 0x10ffff) return String.fromCodePoint(code);
      const known = name === undefined ? undefined : ENTITIES[name];
      if (known === undefined) isKnown = false;
      return known ?? "";
    },
  );
  return isKnown ? decoded : undefined;
}

export function findChild(element: ValueElement | undefined, ...path: readonly string[]): ValueElement | undefined {
  let at = element;
  for (const name of path) at = at?.children.find((c) => c.name === name);
  return at;
}

/** The element and all below it, in no promised order. */
export function walkValue(root: ValueElement | undefined): ValueElement[] {
  const found: ValueElement[] = root ? [root] : [];
  for (const element of found) found.push(...element.children);
  return found;
}
