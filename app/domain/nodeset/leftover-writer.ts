/** Writes leftovers back beside the elements that they belong to. Only made for nodes and headers that have some. */
import type { Leftover } from "../address-space/node";
import { joinPath, toStep } from "./leftover-path";
import { writeWholeElement, type Declared } from "./write-fragments";
import { escapeAttribute } from "./xml/escape";

export class LeftoverWriter {
  readonly #leftovers: ReadonlyMap<string, Leftover>;
  readonly #declared: Declared;
  readonly #counts = new Map<string, number>();

  private constructor(leftovers: readonly Leftover[], declared: Declared) {
    this.#leftovers = new Map(leftovers.map((one) => [one.at, one]));
    this.#declared = declared;
  }

  static of(leftovers: readonly Leftover[] | undefined, declared: Declared): LeftoverWriter | undefined {
    return leftovers === undefined ? undefined : new LeftoverWriter(leftovers, declared);
  }

  /** The path of the next element of this name; to be asked once for each, in the order of writing. */
  next(parent: string, element: string, name?: string): string {
    const first = joinPath(parent, toStep(element, name, 1));
    const nth = (this.#counts.get(first) ?? 0) + 1;
    this.#counts.set(first, nth);
    return joinPath(parent, toStep(element, name, nth));
  }

  /** Lines before the element. */
  before(at: string, indent: string): string {
    return (this.#leftovers.get(at)?.before ?? []).map((mark) => `${indent}${mark}\n`).join("");
  }

  /** How attributes of an element that has an object of its own were written; see `Leftover.attributes`. */
  spellings(at: string): Readonly<Record<string, string>> | undefined {
    return this.#leftovers.get(at)?.attributes;
  }

  attributes(at: string): string {
    return Object.entries(this.#leftovers.get(at)?.attributes ?? {})
      .map(([name, value]) => ` ${name}="${escapeAttribute(value)}"`)
      .join("");
  }

  /** Lines at the end of the content of an element that holds elements. */
  inside(at: string, indent: string): string {
    return this.#parts(at)
      .map((part) => `${indent}${part}\n`)
      .join("");
  }

  /** The same for an element that holds text, where no space may be added. */
  insideText(at: string): string {
    return this.#parts(at).join("");
  }

  #parts(at: string): string[] {
    const leftover = this.#leftovers.get(at);
    const elements = (leftover?.elements ?? []).map((element) => writeWholeElement(element, this.#declared));
    return [...elements, ...(leftover?.inside ?? [])];
  }
}

/** An element that holds elements. Without body it is not written, unless something is left over at it. */
export function writeTable(
  element: { readonly name: string; readonly prefix: string; readonly indent: string; readonly isKept?: boolean },
  body: string,
  rest: LeftoverWriter | undefined,
  at: string,
): string {
  const { name, prefix, indent, isKept } = element;
  const attributes = rest?.attributes(at) ?? "";
  const content = body + (rest?.inside(at, `${indent}  `) ?? "");
  const before = rest?.before(at, indent) ?? "";
  if (content === "" && attributes === "" && !isKept) return before;
  const head = `${before}${indent}<${prefix}${name}${attributes}`;
  return content === "" ? `${head} />\n` : `${head}>\n${content}${indent}</${prefix}${name}>\n`;
}
