/**
 * The XML text of a value that was edited, as near to the text that a file gave it as can be: what did not change keeps its
 * spelling and its white space, so that one edit changes only its own lines in a version-control system.
 *
 * The text is read into elements with their offsets and held against the elements that the writer would make of the value
 * before and after. Where these two are the same, nothing is touched; where only a text differs, that text is put in; rows
 * that come or go take their white space along. Where text and writer differ in their elements, that element is written anew.
 */
import type { XmlText } from "../../address-space/node";
import { READ_LIMITS } from "../limits";
import { escapeAttribute, escapeText } from "../xml/escape";
import { getLocalName, NamespaceScopes } from "../xml/namespace-scopes";
import { scanXml, type Attributes } from "../xml/scan-xml";
import type { DataTypeLookup } from "./data-type-shapes";
import { readValue } from "./read-value";
import { isSameValue } from "./same-value";
import type { Variant } from "./variant";
import { printElement, toElement, writeValue, type WrittenElement } from "./write-value";

/** `before` is what `text` reads as. Always a text that reads as `after`. */
export function rewriteValue(text: XmlText, before: Variant, after: Variant, types: DataTypeLookup): XmlText {
  const root = readPlaces(text);
  if (!root) return writeValue(after, types);
  const edits: TextEdit[] = [];
  new Rewriter(text.xml, edits).compare(root, toElement(before, types), toElement(after, types), "");
  const xml = applyEdits(text.xml, edits);
  const read = readValue({ ...text, xml }, types);
  return read.ok && isSameValue(read.value, after) ? { ...text, xml } : writeValue(after, types);
}

type TextEdit = { readonly from: number; readonly to: number; readonly text: string };

/** Edits never overlap; of two at one place the first comes first. */
function applyEdits(text: string, edits: readonly TextEdit[]): string {
  let result = "";
  let at = 0;
  for (const edit of [...edits].sort((a, b) => a.from - b.from || a.to - b.to)) {
    result += text.slice(at, edit.from) + edit.text;
    at = edit.to;
  }
  return result + text.slice(at);
}

/** An element of the text: where it stands, and which namespace a name without prefix has inside of it. */
type Place = {
  readonly name: string;
  readonly defaultNamespace: string;
  readonly start: number;
  readonly openEnd: number;
  closeStart: number;
  end: number;
  readonly children: Place[];
};

/** The one element of a Value; undefined where there is another number of them. */
function readPlaces(value: XmlText): Place | undefined {
  const declared = Object.entries(value.prefixes ?? {});
  const head = `<v${declared.map(([prefix, uri]) => ` ${prefix === "" ? "xmlns" : `xmlns:${prefix}`}="${escapeAttribute(uri)}"`).join("")}>`;
  const reader = new PlaceReader(head.length);
  if (scanXml(`${head}${value.xml}</v>`, reader, { limits: READ_LIMITS })) return undefined;
  const [root, ...others] = reader.root?.children ?? [];
  return others.length === 0 ? root : undefined;
}

class PlaceReader {
  readonly #offset: number;
  readonly #scopes = new NamespaceScopes();
  readonly #open: Place[] = [];
  root: Place | undefined;

  constructor(offset: number) {
    this.#offset = offset;
  }

  open(name: string, attributes: Attributes, start: number, end: number): void {
    this.#scopes.declare(this.#open.length + 1, attributes);
    const place: Place = {
      name: getLocalName(name),
      defaultNamespace: this.#scopes.defaultUri,
      start: start - this.#offset,
      openEnd: end - this.#offset,
      closeStart: end - this.#offset,
      end: end - this.#offset,
      children: [],
    };
    this.#open.at(-1)?.children.push(place);
    this.root ??= place;
    this.#open.push(place);
  }

  close(_name: string, start: number, end: number): void {
    const place = this.#open.pop();
    this.#scopes.leave(this.#open.length + 1);
    if (!place) return;
    place.closeStart = start - this.#offset;
    place.end = Math.max(place.openEnd, end - this.#offset);
  }

  text(): void {
    // Texts are taken from between the tags.
  }

  mark(): void {
    // Comments stay where they are.
  }
}

class Rewriter {
  readonly #text: string;
  readonly #edits: TextEdit[];

  constructor(text: string, edits: TextEdit[]) {
    this.#text = text;
    this.#edits = edits;
  }

  /** `namespace` is the one that the writer's elements have around them. */
  compare(place: Place, before: WrittenElement, after: WrittenElement, namespace: string): void {
    if (isSame(before, after)) return;
    const isLeaf = before.text !== undefined && after.text !== undefined && place.children.length === 0;
    if (isLeaf && before.name === after.name && isSame(before.attributes, after.attributes))
      this.#setText(place, after);
    else if (this.#isSameFrame(place, before, after))
      this.#compareChildren(place, before, after, after.attributes?.["xmlns"] ?? namespace);
    else this.#replace(place, after, namespace);
  }

  #setText(place: Place, after: WrittenElement): void {
    const text = escapeText(after.text ?? "");
    if (place.openEnd < place.end) this.#edits.push({ from: place.openEnd, to: place.closeStart, text });
    else {
      // `<String/>` opens up.
      const tag = this.#text.slice(place.start, place.openEnd);
      const name = /^<([^\s/>]+)/.exec(tag)?.[1] ?? place.name;
      this.#edits.push({ from: place.start, to: place.end, text: `${tag.replace(/\s*\/>$/, ">")}${text}</${name}>` });
    }
  }

  /** Both have children, and the text has those that the writer would have written before. */
  #isSameFrame(place: Place, before: WrittenElement, after: WrittenElement): boolean {
    const written = before.children;
    if (!written || !after.children || before.name !== after.name || place.children.length === 0) return false;
    if (!isSame(before.attributes, after.attributes) || after.children.length === 0) return false;
    return (
      written.length === place.children.length && written.every((child, i) => child.name === place.children[i]?.name)
    );
  }

  #compareChildren(place: Place, before: WrittenElement, after: WrittenElement, namespace: string): void {
    const old = before.children ?? [];
    const now = after.children ?? [];
    let head = 0;
    while (head < old.length && head < now.length && isSame(old[head], now[head])) head++;
    let tail = 0;
    while (tail < old.length - head && tail < now.length - head && isSame(old.at(-1 - tail), now.at(-1 - tail))) tail++;
    const pairs = Math.min(old.length, now.length) - head - tail;
    for (let i = head; i < head + pairs; i++) {
      const [child, was, is] = [place.children[i], old[i], now[i]];
      if (child && was && is) this.compare(child, was, is, namespace);
    }
    for (let i = head + pairs; i < old.length - tail; i++) this.#remove(place, i);
    this.#insert(place, head + pairs, now.slice(head + pairs, now.length - tail), namespace);
  }

  /** The row with the white space before it. */
  #remove(place: Place, index: number): void {
    const child = place.children[index];
    if (child) this.#edits.push({ from: this.#endBefore(place, index), to: child.end, text: "" });
  }

  #insert(place: Place, index: number, added: readonly WrittenElement[], namespace: string): void {
    const [first] = place.children;
    if (added.length === 0 || !first) return;
    const space = this.#text.slice(place.openEnd, first.start);
    const at = this.#endBefore(place, index);
    const isPlain = space.trim() === "";
    const text = added
      .map((element) => (isPlain ? space : "") + this.#print(element, place, namespace, space))
      .join("");
    this.#edits.push({ from: at, to: at, text });
  }

  #endBefore(place: Place, index: number): number {
    return index === 0 ? place.openEnd : (place.children[index - 1]?.end ?? place.openEnd);
  }

  #replace(place: Place, after: WrittenElement, namespace: string): void {
    const lineStart = this.#text.lastIndexOf("\n", place.start) + 1;
    const space = this.#text.slice(lineStart, place.start);
    const text = this.#print(after, place, namespace, space.trim() === "" ? `\n${space}` : "");
    this.#edits.push({ from: place.start, to: place.end, text });
  }

  /** With its namespace where the text around it has another one. */
  #print(element: WrittenElement, around: Place, namespace: string, space: string): string {
    const own = element.attributes?.["xmlns"] ?? namespace;
    const needsName = own !== "" && around.defaultNamespace !== own;
    const named = needsName ? { ...element, attributes: { xmlns: own, ...element.attributes } } : element;
    const indent = space.length - (space.lastIndexOf("\n") + 1);
    return printElement(named, space.includes("\n") ? indent : 0).trimStart();
  }
}

function isSame(a: unknown, b: unknown): boolean {
  return isSameValue(a, b);
}
