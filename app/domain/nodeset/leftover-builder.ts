/** Collects what a file holds beside what the schema knows, for one node or one header; see `Leftover`. */
import type { Leftover, XmlText } from "../address-space/node";

type Draft = {
  at: string;
  attributes?: Record<string, string>;
  elements?: XmlText[];
  before?: string[];
  inside?: string[];
};

function append<T>(list: T[] | undefined, items: readonly T[]): T[] {
  if (!list) return [...items];
  for (const item of items) list.push(item);
  return list;
}

export class LeftoverBuilder {
  readonly #drafts = new Map<string, Draft>();

  /** Adds to what was noted of the element before; empty lists add nothing. */
  note(part: Leftover): void {
    const draft = this.#drafts.get(part.at) ?? { at: part.at };
    if (part.attributes) draft.attributes = { ...draft.attributes, ...part.attributes };
    for (const list of ["before", "inside"] as const) {
      const marks = part[list];
      if (marks && marks.length > 0) draft[list] = append(draft[list], marks);
    }
    if (part.elements && part.elements.length > 0) draft.elements = append(draft.elements, part.elements);
    if (Object.keys(draft).length > 1) this.#drafts.set(part.at, draft);
  }

  /** Undefined when nothing was noted, the usual case. */
  build(): readonly Leftover[] | undefined {
    return this.#drafts.size === 0 ? undefined : [...this.#drafts.values()];
  }
}
