/**
 * How many items of a list are called by one name. Lists only grow while a file is read, so what was counted before is
 * not counted again: a file with a million comments costs a million steps and not a million times a million.
 */
export class SiblingCounter {
  readonly #known = new WeakMap<object, { done: number; readonly counts: Map<string | undefined, number> }>();

  /** `nameOf` must be the same for one list at every call. */
  count<T>(list: readonly T[], nameOf: (item: T) => string | undefined, name: string | undefined): number {
    let known = this.#known.get(list);
    if (!known) {
      known = { done: 0, counts: new Map() };
      this.#known.set(list, known);
    }
    for (; known.done < list.length; known.done++) {
      const one = nameOf(list[known.done] as T);
      known.counts.set(one, (known.counts.get(one) ?? 0) + 1);
    }
    return known.counts.get(name) ?? 0;
  }
}
