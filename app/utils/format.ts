/** Figures as the screens write them: groups of three apart by a thin space, minus as U+2212. */

const thin = "\u202f";

/** 1318 → `1 318`. */
export function formatCount(value: number): string {
  const text = Math.abs(value)
    .toString()
    .replace(/\B(?=(\d{3})+(?!\d))/g, thin);
  return value < 0 ? `\u2212${text}` : text;
}
