/** The part of the source that is being kept raw: one at a time, with the number of elements that are open in it. */
import type { XmlText } from "../address-space/node";
import { RawCapture, type CaptureMode } from "./raw-capture";
import type { ReadContext } from "./read-context";
import type { NamespaceScopes } from "./xml/namespace-scopes";
import type { Attributes } from "./xml/scan-xml";

export type CapturedElement = {
  readonly name: string;
  readonly attributes: Attributes;
  readonly start: number;
  readonly end: number;
  readonly depth: number;
};

export class OpenCapture {
  /** Elements that are open in it, the outermost included; 0 when nothing is being kept. */
  depth = 0;
  readonly #context: ReadContext;
  readonly #scopes: NamespaceScopes;
  #capture: RawCapture | undefined;
  #into: ((text: XmlText) => void) | undefined;

  constructor(context: ReadContext, scopes: NamespaceScopes) {
    this.#context = context;
    this.#scopes = scopes;
  }

  begin(mode: CaptureMode, element: CapturedElement, rootDefaultUri: string, into: (text: XmlText) => void): void {
    const { source, ids } = this.#context;
    this.#capture = new RawCapture(
      source,
      mode,
      element,
      this.#scopes,
      rootDefaultUri,
      ids.namespaceUris,
      (found, offset) => this.#context.report(found, offset),
    );
    this.#into = into;
    this.depth = 1;
  }

  open(name: string, attributes: Attributes, start: number, end: number, depth: number): void {
    this.depth++;
    this.#capture?.open(name, attributes, start, end, depth);
  }

  text(start: number, end: number, resolved: string | undefined): void {
    this.#capture?.text(start, end, resolved);
  }

  /** `outer` is the depth of the element around the capture. */
  close(name: string, start: number, end: number, outer: number): void {
    this.depth--;
    const depth = outer + this.depth;
    const capture = this.#capture;
    if (this.depth > 0) {
      capture?.close(name, start, depth);
      this.#scopes.leave(depth);
      return;
    }
    this.#capture = undefined;
    this.#scopes.leave(depth);
    if (capture) this.#into?.(capture.finish(start, end));
  }
}
