/** Ranges in values (OPC 10000-8 §5.6.2). */
import { listBodiesBelow, makeTreeQuestion, textOf } from "./value-xml";

export type RangeValue = { readonly low: number; readonly high: number };

const NO_RANGES: readonly RangeValue[] = [];

/** The ranges of a value; a limit that is left out is 0, one that cannot be read is NaN. */
export const listRanges = makeTreeQuestion(NO_RANGES, (root) =>
  listBodiesBelow(root, "Range").map((body) => ({
    low: toNumber(textOf(body, "Low")),
    high: toNumber(textOf(body, "High")),
  })),
);

function toNumber(text: string): number {
  if (text === "") return 0;
  if (text === "INF" || text === "+INF") return Infinity;
  return text === "-INF" ? -Infinity : Number(text);
}

export function formatRange({ low, high }: RangeValue): string {
  return `${formatNumber(low)} … ${formatNumber(high)}`;
}

function formatNumber(value: number): string {
  return String(value).replace("-", "−");
}

/** Whether the one range lies within the other; limits that are not known do not count. */
export function isWithin(inner: RangeValue, outer: RangeValue): boolean {
  return !(inner.low < outer.low || inner.high > outer.high);
}
