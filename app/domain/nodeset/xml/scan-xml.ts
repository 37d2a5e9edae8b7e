/**
 * XML as a stream of events with offsets, over the tokenizer saxes. DTDs are refused, so no entity beyond the five
 * predefined ones is ever expanded; depth and attributes are bounded before anything is kept.
 */
import { SaxesParser } from "saxes";
import { problem, type Problem } from "../../core/result";
import type { ReadLimits } from "../limits";
import { PositionCounter } from "./source-position";

export type Attributes = Readonly<Record<string, string>>;

/** Offsets are UTF-16 units from the start of the text; `end` is behind the closing bracket. */
export interface XmlHandler {
  /** `declares` says that one of the attributes declares a namespace. */
  open(name: string, attributes: Attributes, start: number, end: number, declares: boolean): void;
  /** For an element in one tag `start` equals `end`. */
  close(name: string, start: number, end: number): void;
  /** Text and CDATA, entities resolved; one run of text may come in several pieces. */
  text(text: string): void;
  comment(text: string): void;
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

const ELEMENTS_PER_QUESTION = 512;

/** Answers the problem that ended the scan early, undefined when the document is whole and well-formed. */
export function scanXml(text: string, handler: XmlHandler, options: ScanOptions): Problem | undefined {
  const scan = new Scan(text, handler, options);
  try {
    scan.run();
    return undefined;
  } catch (error) {
    if (error instanceof ScanStop) return error.problem;
    throw error;
  }
}

class Scan {
  readonly #text: string;
  readonly #handler: XmlHandler;
  readonly #options: ScanOptions;
  readonly #parser = new SaxesParser({ position: false, xmlns: false, fragment: false });
  #depth = 0;
  #attributes = 0;
  #declares = false;
  #elements = 0;
  #hasRoot = false;
  #ending = false;

  constructor(text: string, handler: XmlHandler, options: ScanOptions) {
    this.#text = text;
    this.#handler = handler;
    this.#options = options;
  }

  run(): void {
    const parser = this.#parser;
    parser.on("error", (error) => this.#fail(error.message));
    parser.on("doctype", () => this.#stop("xml.doctype"));
    parser.on("opentagstart", () => this.#openStart());
    parser.on("attribute", (attribute) => this.#attribute(attribute.name));
    parser.on("opentag", (tag) => this.#open(tag.name, tag.attributes));
    parser.on("closetag", (tag) => this.#close(tag.name, tag.isSelfClosing));
    parser.on("text", (text) => this.#handler.text(text));
    parser.on("cdata", (text) => this.#handler.text(text));
    parser.on("comment", (text) => this.#handler.comment(text));
    parser.write(this.#text);
    this.#ending = true;
    parser.close();
  }

  #openStart(): void {
    this.#attributes = 0;
    this.#declares = false;
    this.#hasRoot = true;
    const { limits, shouldStop, onProgress } = this.#options;
    if (++this.#depth > limits.maxDepth) this.#stop("limit.depth", { limit: limits.maxDepth });
    if (++this.#elements % ELEMENTS_PER_QUESTION !== 0) return;
    if (shouldStop?.()) this.#stop("limit.time", { limit: limits.maxSeconds });
    onProgress?.(this.#parser.position, this.#text.length);
  }

  #attribute(name: string): void {
    const { maxAttributes } = this.#options.limits;
    if (++this.#attributes > maxAttributes) this.#stop("limit.attributes", { limit: maxAttributes });
    if (name.charCodeAt(0) === 120 && name.startsWith("xmlns")) this.#declares = true;
  }

  #open(name: string, attributes: Attributes): void {
    const end = this.#parser.position;
    this.#handler.open(name, attributes, this.#text.lastIndexOf("<", end - 1), end, this.#declares);
  }

  #close(name: string, isSelfClosing: boolean): void {
    this.#depth--;
    const end = this.#parser.position;
    this.#handler.close(name, isSelfClosing ? end : this.#text.lastIndexOf("<", end - 1), end);
  }

  #fail(message: string): never {
    const detail = message.replace(/\.$/, "");
    if (!this.#hasRoot) this.#stop("xml.not-xml", { detail });
    this.#stop(this.#ending ? "xml.truncated" : "xml.not-well-formed", { detail });
  }

  #stop(code: string, data?: Problem["data"]): never {
    const offset = this.#ending ? this.#text.length : Math.max(0, this.#parser.position - 1);
    throw new ScanStop(problem(code, data, new PositionCounter(this.#text).at(offset)));
  }
}
