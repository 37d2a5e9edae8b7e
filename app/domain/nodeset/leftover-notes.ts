/**
 * Takes note, while a file is read, of what has no other place in the model: unknown attributes and elements of tables and
 * texts, comments, processing instructions, stray text. It stands beside the reader's states and costs next to nothing
 * until there is something to note.
 */
import type { Leftover, XmlText } from "../address-space/node";
import { DEFINITION_ATTRIBUTES, FIELD_ATTRIBUTES, MODEL_ATTRIBUTES, NODE_ATTRIBUTES } from "./attribute-tables";
import { LeftoverBuilder } from "./leftover-builder";
import type { LeafReader } from "./leaf-reader";
import { BEHIND_ROOT, joinPath, toStep } from "./leftover-path";
import type { ReadContext } from "./read-context";
import { listKept, listOddSpellings } from "./read-attributes";
import { findPath, isTable, type State } from "./reader-states";
import type { Attributes } from "./xml/scan-xml";

const SPACE = 32;
const CDATA_HEAD = "<![CDATA[";

export class LeftoverNotes {
  readonly #context: ReadContext;
  readonly #states: readonly State[];
  /** Comments and the like that wait for the element that follows. */
  #marks: string[] = [];
  #beforeLeaf: string[] = [];
  #inLeaf: XmlText[] = [];

  constructor(context: ReadContext, states: readonly State[]) {
    this.#context = context;
    this.#states = states;
  }

  mark(start: number, end: number): void {
    this.#marks.push(this.#context.source.slice(start, end));
  }

  /** Text where only elements belong; white space says nothing. */
  text(start: number, end: number): void {
    const { source } = this.#context;
    for (let at = start; at < end; at++) {
      if (source.charCodeAt(at) <= SPACE) continue;
      const isCdata = source.startsWith(CDATA_HEAD, start - CDATA_HEAD.length);
      this.#marks.push(isCdata ? `${CDATA_HEAD}${source.slice(start, end)}]]>` : source.slice(start, end).trim());
      return;
    }
  }

  /** An element has opened and is the innermost of the states. */
  open(state: State, attributes: Attributes): void {
    if (state === "leaf") {
      if (this.#marks.length > 0) this.#beforeLeaf = this.takeMarks();
      return;
    }
    const isOdd = this.#context.takeOddSpelling();
    const kept = isTable(state) ? listKept(attributes) : isOdd ? this.#listSpellings(state, attributes) : undefined;
    if (this.#marks.length === 0 && !kept) return;
    this.#note({ at: this.#path(), ...(kept ? { attributes: kept } : {}), before: this.takeMarks() });
  }

  /** An Extension, a Value or a Translation opens, whose content is kept as it is. */
  openCaptured(element: string, isInHeader: boolean): void {
    if (this.#marks.length === 0) return;
    const { node, header } = this.#context;
    const before = {
      Extension: (isInHeader ? header.extensions : node?.extensions)?.length ?? 0,
      Translation: node?.translations?.length ?? 0,
    }[element];
    const at = joinPath(this.#path(), toStep(element, undefined, (before ?? 0) + 1));
    this.#note({ at, before: this.takeMarks() });
  }

  /** An unknown element in a table or a text. */
  addElement(text: XmlText): void {
    if (this.#states.at(-1) === "leaf") this.#inLeaf.push(text);
    else this.#note({ at: this.#path(), elements: [text] });
  }

  closeLeaf(leaf: LeafReader): void {
    const attributes = leaf.listUnknownAttributes();
    if (!attributes && this.#marks.length + this.#beforeLeaf.length + this.#inLeaf.length === 0) return;
    this.#note({
      at: joinPath(findPath(this.#states.slice(0, -1), this.#context), leaf.toStep()),
      ...(attributes ? { attributes } : {}),
      before: this.#beforeLeaf,
      elements: this.#inLeaf,
      inside: this.takeMarks(),
    });
    this.#beforeLeaf = [];
    this.#inLeaf = [];
  }

  /** The innermost element, which is no leaf, closes. */
  close(): void {
    if (this.#marks.length > 0) this.#note({ at: this.#path(), inside: this.takeMarks() });
  }

  /** The file ends. */
  finish(): void {
    if (this.#marks.length > 0) this.#context.header.leftovers.note({ at: BEHIND_ROOT, inside: this.takeMarks() });
  }

  #listSpellings(state: State, attributes: Attributes): Record<string, string> | undefined {
    const nodeClass = this.#context.node?.fields.nodeClass;
    if (state === "node") return nodeClass && listOddSpellings(attributes, NODE_ATTRIBUTES[nodeClass]);
    if (state === "field") return listOddSpellings(attributes, FIELD_ATTRIBUTES);
    if (state === "definition") return listOddSpellings(attributes, DEFINITION_ATTRIBUTES);
    return state === "model" ? listOddSpellings(attributes, MODEL_ATTRIBUTES) : undefined;
  }

  #path(): string {
    return findPath(this.#states, this.#context);
  }

  /** Comments and the like that stand before the element that opens. */
  takeMarks(): string[] {
    const marks = this.#marks;
    if (marks.length > 0) this.#marks = [];
    return marks;
  }

  #note(leftover: Leftover): void {
    const { node, header } = this.#context;
    if (node) (node.leftovers ??= new LeftoverBuilder()).note(leftover);
    else header.leftovers.note(leftover);
  }
}
