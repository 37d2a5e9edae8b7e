/**
 * Keeps a part of the source as XmlText: the very characters, with two exceptions that make it independent of the file.
 * Namespace indices inside a Value become URIs, and a default namespace that the file's root does not give is written
 * into the part's own outermost elements. Prefixes that an outer element declared are listed.
 */
import { parseNodeId } from "../address-space/node-id";
import type { XmlText } from "../address-space/node";
import { problem, type Problem } from "../core/result";
import { TYPES_XML_NAMESPACE } from "./nodeset-xml";
import { escapeAttribute, escapeText } from "./xml/escape";
import { getLocalName, type NamespaceScopes } from "./xml/namespace-scopes";
import type { Attributes } from "./xml/scan-xml";

/** What of the element is kept: all of it, what is between its tags, the same with indices replaced, or nothing. */
export type CaptureMode = "whole" | "content" | "value" | "nothing";

type Edit = { readonly start: number; readonly end: number; readonly text: string };

export class RawCapture {
  readonly #source: string;
  readonly #mode: CaptureMode;
  readonly #depth: number;
  readonly #scopes: NamespaceScopes;
  readonly #rootDefaultUri: string;
  readonly #namespaceUris: readonly string[];
  readonly #report: (found: Problem, offset: number) => void;
  readonly #start: number;
  readonly #attributes: Record<string, string> | undefined;
  #prefixes: Record<string, string> | undefined;
  #edits: Edit[] | undefined;
  #indexStart = -1;
  #indexText = "";
  /** Depth of an XmlElement that is open: what is in it means nothing to OPC UA. */
  #freeDepth = Number.POSITIVE_INFINITY;

  /** To be made when the element opens, after its own declarations are in force. `depth` is the element's depth. */
  constructor(
    source: string,
    mode: CaptureMode,
    element: { name: string; attributes: Attributes; start: number; end: number; depth: number },
    scopes: NamespaceScopes,
    rootDefaultUri: string,
    namespaceUris: readonly string[],
    report: (found: Problem, offset: number) => void,
  ) {
    this.#source = source;
    this.#mode = mode;
    this.#scopes = scopes;
    this.#rootDefaultUri = rootDefaultUri;
    this.#namespaceUris = namespaceUris;
    this.#report = report;
    const isWhole = mode === "whole";
    this.#depth = isWhole ? element.depth - 1 : element.depth;
    this.#start = isWhole ? element.start : element.end;
    if (isWhole) this.#notePrefixes(element.name, element.attributes, element.start, element.depth);
    else this.#attributes = this.#takeAttributes(element.attributes);
  }

  /** An element inside opens; its declarations are in force already. */
  open(name: string, attributes: Attributes, start: number, end: number, depth: number): void {
    this.#notePrefixes(name, attributes, start, depth);
    this.#indexStart = -1;
    if (this.#mode !== "value" || depth > this.#freeDepth) return;
    const local = getLocalName(name);
    if (local !== "Identifier" && local !== "NamespaceIndex" && local !== "XmlElement") return;
    if (this.#scopes.uriOf(name) !== TYPES_XML_NAMESPACE) return;
    if (local === "XmlElement") {
      this.#freeDepth = depth;
      return;
    }
    this.#indexStart = end;
    this.#indexText = "";
  }

  text(start: number, end: number, resolved: string | undefined): void {
    if (this.#indexStart >= 0) this.#indexText += resolved ?? this.#source.slice(start, end);
  }

  /** An element inside closes; `start` is the start of its end tag. */
  close(name: string, start: number, depth: number): void {
    if (depth === this.#freeDepth) this.#freeDepth = Number.POSITIVE_INFINITY;
    if (this.#indexStart < 0) return;
    const replaced =
      getLocalName(name) === "NamespaceIndex"
        ? this.#replaceIndex(this.#indexText)
        : this.#replaceInIdentifier(this.#indexText);
    if (replaced !== undefined)
      (this.#edits ??= []).push({ start: this.#indexStart, end: start, text: escapeText(replaced) });
    this.#indexStart = -1;
  }

  /** The element itself closes: `start` and `end` of its end tag. */
  finish(start: number, end: number): XmlText {
    const stop = this.#mode === "whole" ? end : start;
    const xml = this.#mode === "nothing" || stop <= this.#start ? "" : this.#slice(stop);
    return {
      xml,
      ...(this.#prefixes ? { prefixes: this.#prefixes } : {}),
      ...(this.#attributes ? { attributes: this.#attributes } : {}),
    };
  }

  #slice(stop: number): string {
    if (!this.#edits) return this.#source.slice(this.#start, stop);
    let out = "";
    let at = this.#start;
    for (const edit of this.#edits) {
      out += this.#source.slice(at, edit.start) + edit.text;
      at = edit.end;
    }
    return out + this.#source.slice(at, stop);
  }

  /** What the tag around the content carries: its declarations are prefixes of the content, used in names or not. */
  #takeAttributes(attributes: Attributes): Record<string, string> | undefined {
    let kept: Record<string, string> | undefined;
    for (const name in attributes) {
      const value = attributes[name] ?? "";
      if (name.startsWith("xmlns:")) (this.#prefixes ??= {})[name.slice(6)] = value;
      else if (name !== "xmlns") (kept ??= {})[name] = value;
    }
    return kept;
  }

  #notePrefixes(name: string, attributes: Attributes, start: number, depth: number): void {
    const colon = name.indexOf(":");
    if (colon >= 0) this.#notePrefix(name.slice(0, colon));
    else this.#noteDefault(name, start, depth);
    for (const attribute in attributes) {
      const at = attribute.indexOf(":");
      if (at > 0) this.#notePrefix(attribute.slice(0, at));
      if (attribute.endsWith(":type")) this.#notePrefix((attributes[attribute] ?? "").split(":")[0] ?? "");
    }
  }

  #notePrefix(prefix: string): void {
    if (prefix === "xmlns" || prefix === "xml") return;
    const binding = this.#scopes.find(prefix);
    if (binding && binding.depth <= this.#depth) (this.#prefixes ??= {})[prefix] = binding.uri;
  }

  #noteDefault(name: string, start: number, depth: number): void {
    const binding = this.#scopes.find("");
    if (!binding || binding.depth > this.#depth) return;
    if (binding.uri === this.#rootDefaultUri) (this.#prefixes ??= {})[""] = binding.uri;
    else if (depth === this.#depth + 1) {
      const at = start + 1 + name.length;
      (this.#edits ??= []).push({ start: at, end: at, text: ` xmlns="${escapeAttribute(binding.uri)}"` });
    }
  }

  #replaceIndex(text: string): string | undefined {
    const digits = text.trim();
    if (!/^\d{1,5}$/.test(digits) || Number(digits) === 0) return undefined;
    const uri = this.#namespaceUris[Number(digits)];
    if (uri === undefined) this.#reportIndex(digits, Number(digits));
    return uri;
  }

  #replaceInIdentifier(text: string): string | undefined {
    const match = /^(svr=\d+;)?(ns=(\d+);.*)$/s.exec(text.trim());
    if (!match || Number(match[3]) === 0) return undefined;
    const rest = match[2] ?? "";
    const uri = this.#namespaceUris[Number(match[3])];
    if (uri === undefined) {
      this.#reportIndex(rest, Number(match[3]));
      return undefined;
    }
    const id = parseNodeId(rest, this.#namespaceUris);
    if (!id.ok) for (const found of id.problems) this.#report(found, this.#indexStart);
    const escaped = uri.replace(/%/g, "%25").replace(/;/g, "%3B");
    return `${match[1] ?? ""}nsu=${escaped};${rest.slice(rest.indexOf(";") + 1)}`;
  }

  #reportIndex(text: string, index: number): void {
    this.#report(
      problem("node-id.namespace-index", { text, index, count: this.#namespaceUris.length }),
      this.#indexStart,
    );
  }
}
