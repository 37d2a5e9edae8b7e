/** Lines and columns of offsets in a text, both 1-based, columns in UTF-16 units. */

export type Position = { readonly line: number; readonly column: number };

/** Counts lines onward from the last question, so that questions in rising order cost one pass over the text. */
export class PositionCounter {
  readonly #text: string;
  #line = 1;
  #lineStart = 0;
  #nextBreak: number;

  constructor(text: string) {
    this.#text = text;
    this.#nextBreak = text.indexOf("\n");
  }

  at(offset: number): Position {
    if (offset < this.#lineStart) this.#restart();
    while (this.#nextBreak >= 0 && this.#nextBreak < offset) {
      this.#line++;
      this.#lineStart = this.#nextBreak + 1;
      this.#nextBreak = this.#text.indexOf("\n", this.#lineStart);
    }
    return { line: this.#line, column: offset - this.#lineStart + 1 };
  }

  #restart(): void {
    this.#line = 1;
    this.#lineStart = 0;
    this.#nextBreak = this.#text.indexOf("\n");
  }
}

/** The places of many offsets, which should stand in rising order. */
export function toPositions<K>(text: string, offsets: ReadonlyMap<K, number>): ReadonlyMap<K, Position> {
  const counter = new PositionCounter(text);
  return new Map([...offsets].map(([key, offset]) => [key, counter.at(offset)]));
}
