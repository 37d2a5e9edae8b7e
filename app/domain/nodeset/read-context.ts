/** What all parts of the reader share: the text, what is being read, and the problems met. */
import type { XmlText } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { LocalizedText } from "../address-space/qualified-name";
import { problem, type Place, type Problem, type Result } from "../core/result";
import type { AttributeTable } from "./attribute-tables";
import { HeaderBuilder, type ModelDraft } from "./header-builder";
import { IdTable } from "./id-table";
import type { ReadLimits } from "./limits";
import type { DefinitionDraft, FieldDraft, NodeBuilder } from "./node-builder";
import { ProblemList } from "./problem-list";
import { readAttributes, type AttributeContext } from "./read-attributes";
import type { Attributes } from "./xml/scan-xml";
import { SiblingCounter } from "./sibling-counter";
import { PositionCounter } from "./xml/source-position";
import { StringCache } from "./xml/string-cache";

export type ArgumentDraft = { name: string; description: LocalizedText[] };

export class ReadContext {
  readonly source: string;
  readonly limits: ReadLimits;
  readonly problems: ProblemList;
  readonly header: HeaderBuilder;
  readonly cache: StringCache;
  readonly siblings = new SiblingCounter();
  /** Empty until the head is read. */
  ids = new IdTable([], [], new Map());
  isWhole = true;
  /** The node that is open, with what is open in it. */
  node: NodeBuilder | undefined;
  definition: DefinitionDraft | undefined;
  field: FieldDraft | undefined;
  argument: ArgumentDraft | undefined;
  /** Model and RequiredModel elements that are open. */
  readonly models: ModelDraft[] = [];
  readonly #positions: PositionCounter;
  readonly #attributeContext: AttributeContext;
  #elementOffset = 0;

  constructor(source: string, limits: ReadLimits) {
    this.source = source;
    this.limits = limits;
    this.problems = new ProblemList(limits.maxProblems);
    this.cache = new StringCache(source);
    this.header = new HeaderBuilder((found, offset) => this.report(found, offset));
    this.#positions = new PositionCounter(source);
    this.#attributeContext = {
      hasOddSpelling: false,
      toKey: (text, attribute) => this.toKey(text, this.#elementOffset, attribute),
      reportValue: (attribute, value, expected) => this.reportValue(attribute, value, expected, this.#elementOffset),
    };
  }

  at(offset: number): { readonly line: number; readonly column: number } {
    return this.#positions.at(offset);
  }

  /** Sets the fields of an element's attributes; answers those that stay as written. */
  readInto(
    target: object,
    attributes: Attributes,
    table: AttributeTable,
    handled: readonly string[],
    offset: number,
  ): Readonly<Record<string, string>> | undefined {
    this.#elementOffset = offset;
    return readAttributes(attributes, table, handled, target as Record<string, unknown>, this.#attributeContext);
  }

  /** Whether an element was read since the last question whose attributes are not written as we would write them. */
  takeOddSpelling(): boolean {
    const isOdd = this.#attributeContext.hasOddSpelling;
    if (isOdd) this.#attributeContext.hasOddSpelling = false;
    return isOdd;
  }

  toKey(text: string, offset: number, attribute?: string): NodeKey | undefined {
    return this.ids.findKnown(text) ?? this.take(this.ids.resolve(text), offset, attribute);
  }

  /** The value of a result; its problems are reported. */
  take<T>(result: Result<T>, offset: number, attribute?: string): T | undefined {
    for (const found of result.problems) this.report(found, offset, attribute);
    return result.ok ? result.value : undefined;
  }

  reportValue(attribute: string, value: string, expected: string, offset: number): void {
    this.report(problem("nodeset.attribute-value", { attribute, value, expected }), offset, attribute);
  }

  reportMissing(element: string, attribute: string, offset: number): void {
    this.report(problem("nodeset.attribute-missing", { element, attribute }), offset, attribute);
  }

  report(found: Problem, offset: number, attribute?: string): void {
    const node = this.node?.nodeIdText;
    const at: Place = {
      ...this.at(offset),
      ...(node !== undefined ? { node } : {}),
      ...(attribute !== undefined ? { attribute } : {}),
    };
    this.problems.add({ ...found, at });
  }
}

/** The list of unknown elements of a draft, made when it is first needed. */
export function othersOf(draft: { otherElements?: readonly XmlText[] | undefined }): XmlText[] {
  const list: XmlText[] = [...(draft.otherElements ?? [])];
  draft.otherElements = list;
  return list;
}
