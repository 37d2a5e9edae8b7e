/**
 * Strings cut out of one text, where the same few come again and again: names of elements, `HasProperty`, `i=40`. What was
 * cut out lately is answered again instead of being made anew, which spares allocation and hashing.
 */
const SLOTS = 2048;
const LONGEST = 40;

export class StringCache {
  readonly #text: string;
  readonly #slots: string[] = new Array<string>(SLOTS).fill("");

  constructor(text: string) {
    this.#text = text;
  }

  /** The same as `text.slice(start, end)`. */
  slice(start: number, end: number): string {
    const text = this.#text;
    const length = end - start;
    if (length === 0) return "";
    if (length > LONGEST) return text.slice(start, end);
    const first = text.charCodeAt(start);
    const middle = text.charCodeAt(start + (length >> 1));
    const last = text.charCodeAt(end - 1);
    const slot = (length * 37 + first * 131 + middle * 71 + last * 257) & (SLOTS - 1);
    const known = this.#slots[slot] ?? "";
    if (known.length === length && text.startsWith(known, start)) return known;
    const made = text.slice(start, end);
    this.#slots[slot] = made;
    return made;
  }
}
