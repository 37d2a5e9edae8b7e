/** Numbers that look random and are the same in every run: a failure can be repeated. */
export type Random = {
  /** A whole number from 0 up to, but without, `limit`. */
  below(limit: number): number;
};

/** Mulberry32, started from the characters of `seed`. */
export function makeRandom(seed: string): Random {
  let state = 0;
  for (const character of seed) state = Math.imul(state ^ (character.codePointAt(0) ?? 0), 2654435761);
  return {
    below(limit) {
      state = (state + 0x6d2b79f5) | 0;
      let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
      mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
      return Math.floor((((mixed ^ (mixed >>> 14)) >>> 0) / 4294967296) * limit);
    },
  };
}
