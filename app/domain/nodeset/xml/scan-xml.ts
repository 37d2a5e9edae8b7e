/**
 * XML as a stream of events with offsets. A NodeSet is millions of characters of which few matter, so the text is walked
 * by offsets: text between elements is not even cut out unless the handler asks for it. Everything that XML 1.0 calls not
 * well-formed is refused at its place. DTDs are refused, so no entity beyond the five predefined ones is ever expanded;
 * depth and attributes are bounded before anything is kept.
 */
import { problem, type Problem } from "../../core/result";
import type { ReadLimits } from "../limits";
import { PositionCounter } from "./source-position";
import { StringCache } from "./string-cache";
import { findNameEnd, findReferenced } from "./xml-characters";

export type Attributes = Readonly<Record<string, string>>;

/** Of the attributes of one element: none has a colon, some has, or some declares a namespace. */
export type AttributeHint = "plain" | "prefixed" | "declaring";

/** Offsets are UTF-16 units from the start of the text; `end` is behind the closing bracket. */
export interface XmlHandler {
  open(name: string, attributes: Attributes, start: number, end: number, hint: AttributeHint): void;
  /** For an element in one tag `start` equals `end`. */
  close(name: string, start: number, end: number): void;
  /** Character data: as it stands between the offsets, unless `resolved` says what references in it mean. */
  text(start: number, end: number, resolved: string | undefined): void;
  /** A comment or a processing instruction. */
  mark(start: number, end: number): void;
}

export type ScanOptions = {
  readonly limits: ReadLimits;
  /** Asked now and then; true ends the scan with the problem `limit.time`. */
  readonly shouldStop?: () => boolean;
  readonly onProgress?: (done: number, total: number) => void;
};

/** Thrown by handlers and by the scan itself to end it; never leaves `scanXml`. */
export class ScanStop extends Error {
  readonly problem: Problem;

  constructor(stopped: Problem) {
    super(stopped.code);
    this.problem = stopped;
  }
}

/** Answers the problem that ended the scan early, undefined when the document is whole and well-formed. */
export function scanXml(text: string, handler: XmlHandler, options: ScanOptions): Problem | undefined {
  try {
    new XmlScan(text, handler, options).run();
    return undefined;
  } catch (error) {
    if (error instanceof ScanStop) return error.problem;
    throw error;
  }
}

const ELEMENTS_PER_QUESTION = 512;
const ILLEGAL = /[^\t\n\r\u0020-\uFFFD]/;
// Engines interpret a pattern the first time and compile it for the second: let the first be a short text.
ILLEGAL.test("");
const NOT_SPACE = /[^ \t\n\r]/;

const TAB = 9;
const LF = 10;
const CR = 13;
const SPACE = 32;
const EXCLAMATION = 33;
const QUOTE = 34;
const AMPERSAND = 38;
const APOSTROPHE = 39;
const SLASH = 47;
const LESS = 60;
const EQUALS = 61;
const GREATER = 62;
const QUESTION = 63;

/** Objects with fast properties and no inherited names, so that an attribute may be called `constructor`. */
const AttributeBag = function () {} as unknown as new () => Record<string, string>;
AttributeBag.prototype = Object.create(null);
const NO_ATTRIBUTES: Attributes = Object.freeze(new AttributeBag());

class XmlScan {
  readonly #text: string;
  readonly #handler: XmlHandler;
  readonly #options: ScanOptions;
  readonly #open: string[] = [];
  readonly #hasCdataEnd: boolean;
  readonly #cache: StringCache;
  #at = 0;
  #nextAmpersand: number;
  #elements = 0;
  #hasRoot = false;

  constructor(text: string, handler: XmlHandler, options: ScanOptions) {
    this.#text = text;
    this.#handler = handler;
    this.#options = options;
    this.#hasCdataEnd = text.includes("]]>");
    this.#cache = new StringCache(text);
    this.#nextAmpersand = findFrom(text, "&", 0);
  }

  run(): void {
    const text = this.#text;
    const illegal = ILLEGAL.exec(text);
    if (text.charCodeAt(0) === 0xfeff) this.#at = 1;
    if (text.startsWith("<?xml", this.#at) && isSpace(text.charCodeAt(this.#at + 5))) this.#readDeclaration();
    for (;;) {
      const tag = text.indexOf("<", this.#at);
      const end = tag < 0 ? text.length : tag;
      if (illegal && illegal.index < end) this.#failOnCharacter(illegal.index);
      if (end > this.#at) this.#readText(this.#at, end);
      if (tag < 0) break;
      this.#at = tag;
      const next = text.charCodeAt(tag + 1);
      if (next === SLASH) this.#readEndTag(tag);
      else if (next === EXCLAMATION) this.#readMarkup(tag);
      else if (next === QUESTION) this.#readInstruction(tag);
      else this.#readStartTag(tag);
      if (illegal && illegal.index < this.#at) this.#failOnCharacter(illegal.index);
    }
    this.#finish();
  }

  #finish(): void {
    const open = this.#open.at(-1);
    if (open !== undefined) this.#truncated(`the element ${open} is not closed`);
    if (!this.#hasRoot) this.#stop("xml.not-xml", "there is no root element", 0);
  }

  #readText(start: number, end: number): void {
    const text = this.#text;
    if (this.#open.length === 0) {
      const first = text.slice(start, end).search(NOT_SPACE);
      if (first < 0) return;
      if (!this.#hasRoot) this.#stop("xml.not-xml", "it does not begin with an element", start + first);
      this.#fail("text stands behind the root element", start + first);
    }
    if (this.#hasCdataEnd) {
      const cdata = text.slice(start, end).indexOf("]]>");
      if (cdata >= 0) this.#fail("“]]>” stands in text", start + cdata);
    }
    if (this.#nextAmpersand < start) this.#nextAmpersand = findFrom(text, "&", start);
    this.#handler.text(start, end, this.#nextAmpersand < end ? this.#resolve(start, end) : undefined);
  }

  /** The text between the offsets with its references replaced. */
  #resolve(start: number, end: number): string {
    const text = this.#text;
    let out = "";
    let at = start;
    for (let reference = text.indexOf("&", at); reference >= 0 && reference < end; reference = text.indexOf("&", at)) {
      const close = text.indexOf(";", reference);
      const name = close < 0 || close >= end ? "" : text.slice(reference + 1, close);
      const character = findReferenced(name);
      if (character === undefined) this.#failOnReference(name, reference);
      out += text.slice(at, reference) + character;
      at = close + 1;
    }
    return out + text.slice(at, end);
  }

  #failOnReference(name: string, offset: number): never {
    if (/^[^\s&;<]{1,40}$/.test(name)) this.#fail(`there is no entity &${name};`, offset);
    const isLast = offset + 40 > this.#text.length && /^&[^\s&;<]*$/.test(this.#text.slice(offset));
    if (isLast) this.#truncated("a reference has no end");
    this.#fail("“&” stands alone; write &amp;", offset);
  }

  #readStartTag(start: number): void {
    const text = this.#text;
    const nameEnd = findNameEnd(text, start + 1);
    if (nameEnd === start + 1) {
      if (nameEnd >= text.length) this.#truncated("a tag has no name");
      this.#fail("“<” stands in text; write &lt;", start);
    }
    const name = this.#cache.slice(start + 1, nameEnd);
    if (this.#open.length === 0) this.#checkRoot(start);
    this.#countElement(start);
    let attributes: Record<string, string> | undefined;
    let hint: AttributeHint = "plain";
    let count = 0;
    let at = nameEnd;
    for (;;) {
      const next = skipSpace(text, at);
      const code = text.charCodeAt(next);
      if (code === GREATER) {
        at = next + 1;
        this.#at = at;
        this.#handler.open(name, attributes ?? NO_ATTRIBUTES, start, at, hint);
        this.#open.push(name);
        return;
      }
      if (code === SLASH) {
        if (text.charCodeAt(next + 1) !== GREATER) this.#failOrTruncated("“/” stands alone in a tag", next, next + 1);
        at = next + 2;
        this.#at = at;
        this.#handler.open(name, attributes ?? NO_ATTRIBUTES, start, at, hint);
        this.#handler.close(name, at, at);
        return;
      }
      const attributeEnd = findNameEnd(text, next);
      if (attributeEnd === next) this.#failOrTruncated(`the tag ${name} is not closed`, next, next);
      if (next === at) this.#fail("a space is missing before the attribute", next);
      if (++count > this.#options.limits.maxAttributes) this.#stopAtLimit("limit.attributes", "maxAttributes", start);
      const attribute = this.#cache.slice(next, attributeEnd);
      attributes ??= new AttributeBag();
      if (attributes[attribute] !== undefined) this.#fail(`the attribute ${attribute} stands twice`, next);
      at = this.#readValue(attribute, attributeEnd, attributes);
      if (attribute.startsWith("xmlns") && (attribute.length === 5 || attribute.charCodeAt(5) === 58))
        hint = "declaring";
      else if (hint === "plain" && attribute.includes(":")) hint = "prefixed";
    }
  }

  /** Reads `="value"` behind an attribute's name; answers the offset behind it. */
  #readValue(attribute: string, from: number, attributes: Record<string, string>): number {
    const text = this.#text;
    const equals = skipSpace(text, from);
    if (text.charCodeAt(equals) !== EQUALS)
      this.#failOrTruncated(`the attribute ${attribute} has no value`, equals, equals);
    const open = skipSpace(text, equals + 1);
    const quote = text.charCodeAt(open);
    if (quote !== QUOTE && quote !== APOSTROPHE) {
      this.#failOrTruncated(`the value of ${attribute} has no quotes`, open, open);
    }
    let isPlain = true;
    for (let at = open + 1; at < text.length; at++) {
      const code = text.charCodeAt(at);
      if (code === quote) {
        attributes[attribute] = isPlain ? this.#cache.slice(open + 1, at) : this.#normalise(open + 1, at);
        return at + 1;
      }
      if (code === LESS) this.#fail(`the value of ${attribute} has no end, or holds “<”; write &lt;`, at);
      if (code === AMPERSAND || code === TAB || code === LF || code === CR) isPlain = false;
    }
    this.#truncated(`the value of ${attribute} has no end`);
  }

  /** White space in values is a space each; what references mean stays as it is (XML 1.0 §3.3.3). */
  #normalise(start: number, end: number): string {
    const text = this.#text;
    if (text.indexOf("&", start) >= end) return text.slice(start, end).replace(/[\t\n\r]/g, " ");
    let out = "";
    for (let at = start; at < end;) {
      const reference = findFrom(text, "&", at);
      const stop = Math.min(reference, end);
      out += text.slice(at, stop).replace(/[\t\n\r]/g, " ");
      if (stop === end) break;
      const close = findFrom(text, ";", stop) + 1;
      out += this.#resolve(stop, Math.min(close, end));
      at = close;
    }
    return out;
  }

  #checkRoot(start: number): void {
    if (this.#hasRoot) this.#fail("a second root element begins", start);
    this.#hasRoot = true;
  }

  #countElement(start: number): void {
    const { limits, shouldStop, onProgress } = this.#options;
    if (this.#open.length >= limits.maxDepth) this.#stopAtLimit("limit.depth", "maxDepth", start);
    if (++this.#elements % ELEMENTS_PER_QUESTION !== 0) return;
    if (shouldStop?.()) this.#stopAtLimit("limit.time", "maxSeconds", start);
    onProgress?.(start, this.#text.length);
  }

  #readEndTag(start: number): void {
    const text = this.#text;
    const name = this.#open.pop();
    if (name === undefined) this.#fail("an end tag has no start", start);
    const nameEnd = start + 2 + name.length;
    const isName = text.startsWith(name, start + 2);
    const at = isName ? skipSpace(text, nameEnd) : start;
    if (text.charCodeAt(at) !== GREATER) {
      const end = findNameEnd(text, start + 2);
      if (end >= text.length || (isName && at >= text.length)) this.#truncated(`the element ${name} is not closed`);
      this.#fail(`the element ${name} is not closed before </${text.slice(start + 2, end)}>`, start);
    }
    this.#at = at + 1;
    this.#handler.close(name, start, at + 1);
  }

  /** Comment, CDATA, or a document type, which is refused. */
  #readMarkup(start: number): void {
    const text = this.#text;
    if (text.startsWith("<!--", start)) {
      const end = text.indexOf("--", start + 4);
      if (end < 0) this.#truncated("a comment has no end");
      if (text.charCodeAt(end + 2) !== GREATER) this.#failOrTruncated("“--” stands in a comment", end, end + 2);
      this.#at = end + 3;
      this.#handler.mark(start, end + 3);
      return;
    }
    if (text.startsWith("<![CDATA[", start)) {
      if (this.#open.length === 0) this.#fail("CDATA stands outside of the root element", start);
      const end = text.indexOf("]]>", start + 9);
      if (end < 0) this.#truncated("a CDATA section has no end");
      this.#at = end + 3;
      this.#handler.text(start + 9, end, undefined);
      return;
    }
    if (text.startsWith("<!DOCTYPE", start)) this.#stop("xml.doctype", "", start);
    this.#failOrTruncated("“<!” begins nothing that is known", start, start + 9);
  }

  #readInstruction(start: number): void {
    const text = this.#text;
    const nameEnd = findNameEnd(text, start + 2);
    const end = text.indexOf("?>", nameEnd);
    if (end < 0) this.#truncated("a processing instruction has no end");
    const name = text.slice(start + 2, nameEnd);
    if (name === "") this.#fail("a processing instruction has no name", start);
    if (name.toLowerCase() === "xml") this.#fail("the XML declaration does not stand at the very start", start);
    if (end > nameEnd && !isSpace(text.charCodeAt(nameEnd))) this.#fail("a processing instruction has no name", start);
    this.#at = end + 2;
    this.#handler.mark(start, end + 2);
  }

  #readDeclaration(): void {
    const start = this.#at;
    const end = this.#text.indexOf("?>", start);
    if (end < 0) this.#truncated("the XML declaration has no end");
    const isRight =
      /^<\?xml\s+version\s*=\s*(["'])1\.[0-9]+\1(?:\s+encoding\s*=\s*(["'])[A-Za-z][\w.-]*\2)?(?:\s+standalone\s*=\s*(["'])(?:yes|no)\3)?\s*$/;
    if (!isRight.test(this.#text.slice(start, end))) this.#fail("the XML declaration is not as it should be", start);
    this.#at = end + 2;
  }

  #failOnCharacter(offset: number): never {
    const code = this.#text.charCodeAt(offset).toString(16).toUpperCase().padStart(4, "0");
    if (!this.#hasRoot) this.#stop("xml.not-xml", `the character U+${code} stands in it`, offset);
    this.#fail(`the character U+${code} may not stand in XML`, offset);
  }

  /** Broken at `offset`, unless the text ends where something was still expected. */
  #failOrTruncated(detail: string, offset: number, expectedAt: number): never {
    if (expectedAt >= this.#text.length) this.#truncated(detail);
    this.#fail(detail, offset);
  }

  #fail(detail: string, offset: number): never {
    this.#stop("xml.not-well-formed", detail, offset);
  }

  #truncated(detail: string): never {
    this.#stop("xml.truncated", detail, this.#text.length);
  }

  #stop(code: string, detail: string, offset: number): never {
    throw new ScanStop(problem(code, { detail }, new PositionCounter(this.#text).at(offset)));
  }

  #stopAtLimit(code: string, limit: keyof ReadLimits, offset: number): never {
    const data = { limit: this.#options.limits[limit] };
    throw new ScanStop(problem(code, data, new PositionCounter(this.#text).at(offset)));
  }
}

function isSpace(code: number): boolean {
  return code === SPACE || code === LF || code === TAB || code === CR;
}

function skipSpace(text: string, from: number): number {
  let at = from;
  while (isSpace(text.charCodeAt(at))) at++;
  return at;
}

/** As `indexOf`, but beyond every offset when there is none. */
function findFrom(text: string, part: string, from: number): number {
  const at = text.indexOf(part, from);
  return at < 0 ? Number.MAX_SAFE_INTEGER : at;
}
