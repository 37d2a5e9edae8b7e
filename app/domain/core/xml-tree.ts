/**
 * A small element tree with places, for files that are read whole (device descriptions). Entities and document types are
 * refused, depth and attributes are limited, so that a hostile file costs no more than its own length.
 */
import { SaxesParser, type SaxesTagNS } from "saxes";
import { fail, ok, problem, type Place, type Problem, type Result } from "./result";

export type XmlElement = {
  /** Name without prefix. */
  readonly name: string;
  readonly namespaceUri: string;
  /** Attributes by name as written, with prefix. */
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: readonly XmlElement[];
  /** All character data directly in the element. */
  readonly text: string;
  readonly line: number;
  readonly column: number;
};

export type XmlTreeLimits = { readonly characters: number; readonly depth: number; readonly attributes: number };

export const XML_TREE_LIMITS: XmlTreeLimits = { characters: 50_000_000, depth: 200, attributes: 256 };

type OpenElement = { -readonly [K in keyof XmlElement]: XmlElement[K] } & { children: XmlElement[] };

/** Reads one document. Problems: `xml.too-large`, `xml.doctype`, `xml.depth`, `xml.attributes`, `xml.syntax`, `xml.empty`. */
export function readXmlTree(text: string, limits: XmlTreeLimits = XML_TREE_LIMITS): Result<XmlElement> {
  if (text.length > limits.characters) {
    return fail(problem("xml.too-large", { size: text.length, limit: limits.characters }));
  }
  const parser = new SaxesParser({ xmlns: true, position: true });
  const open: OpenElement[] = [];
  let root: OpenElement | undefined;
  let stopped: Problem | undefined;
  const stop = (found: Problem): void => {
    stopped ??= found;
  };
  const here = (): Place => ({ line: parser.line, column: parser.column });

  parser.on("doctype", () => stop(problem("xml.doctype", undefined, here())));
  parser.on("error", (error) => stop(problem("xml.syntax", { message: toSyntaxMessage(error.message) }, here())));
  parser.on("opentag", (tag: SaxesTagNS) => {
    if (open.length >= limits.depth) return stop(problem("xml.depth", { limit: limits.depth }, here()));
    const names = Object.keys(tag.attributes);
    if (names.length > limits.attributes) {
      return stop(
        problem("xml.attributes", { name: tag.local, count: names.length, limit: limits.attributes }, here()),
      );
    }
    const attributes: Record<string, string> = {};
    for (const name of names) attributes[name] = tag.attributes[name]?.value ?? "";
    const element: OpenElement = {
      name: tag.local,
      namespaceUri: tag.uri,
      attributes,
      children: [],
      text: "",
      line: parser.line,
      column: parser.column,
    };
    open.at(-1)?.children.push(element);
    root ??= element;
    open.push(element);
  });
  parser.on("closetag", () => void open.pop());
  const addText = (data: string): void => {
    const element = open.at(-1);
    if (element) element.text += data;
  };
  parser.on("text", addText);
  parser.on("cdata", addText);

  for (let at = 0; at < text.length && !stopped; at += CHUNK) parser.write(text.slice(at, at + CHUNK));
  if (!stopped) parser.close();
  if (stopped) return fail(stopped);
  return root ? ok(root) : fail(problem("xml.empty"));
}

/** Text is fed in small pieces, so that a file that breaks a limit is left at once (looking up prefixes costs the depth). */
const CHUNK = 4_096;

function toSyntaxMessage(message: string): string {
  return message.replace(/^\d+:\d+: /, "").replace(/\.$/, "");
}

export function listChildren(element: XmlElement, name: string): XmlElement[] {
  return element.children.filter((c) => c.name === name);
}

export function findChild(element: XmlElement | undefined, ...path: readonly string[]): XmlElement | undefined {
  let at = element;
  for (const name of path) at = at?.children.find((c) => c.name === name);
  return at;
}
