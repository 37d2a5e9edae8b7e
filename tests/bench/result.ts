/** One measured figure beside its reference, measured in the same run on the same files. */
export type BenchResult = {
  readonly name: string;
  readonly value: number;
  readonly unit: string;
  /** The reference's figure in the same unit; null where there is none. */
  readonly reference: number | null;
  /** value ÷ reference. */
  readonly ratio: number | null;
  /** Highest ratio that is asked for; null where none is. */
  readonly target: number | null;
  /** Highest value that is asked for; null where none is. */
  readonly limit: number | null;
  readonly met: boolean | null;
};

/** `target` is the highest ratio of value to reference that is asked for. */
export function compare(name: string, unit: string, value: number, reference: number, target: number): BenchResult {
  const ratio = value / reference;
  return {
    name,
    value: round(value),
    unit,
    reference: round(reference),
    ratio: round(ratio),
    target,
    limit: null,
    met: ratio <= target,
  };
}

/** A figure that is only recorded. */
export function record(name: string, unit: string, value: number): BenchResult {
  return { name, value: round(value), unit, reference: null, ratio: null, target: null, limit: null, met: null };
}

/** A figure that may not exceed `highest`. */
export function limit(name: string, unit: string, value: number, highest: number): BenchResult {
  return { ...record(name, unit, value), limit: highest, met: value <= highest };
}

/** One line for a person. */
export function formatResult(result: BenchResult): string {
  const { name, value, unit, reference, ratio, target, met } = result;
  const verdict = met ? "met" : "not met";
  const figure = `${name}: ${value} ${unit}`;
  if (result.limit !== null) return `${figure} (asked for: at most ${result.limit} ${unit}, ${verdict})`;
  if (reference === null || ratio === null) return figure;
  const wanted = target === null ? "" : ` (asked for: at most ${target} ×, ${verdict})`;
  return `${figure}, reference ${reference} ${unit}, ${ratio} ×${wanted}`;
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = Math.floor(sorted.length / 2);
  const upper = sorted[middle];
  const lower = sorted[sorted.length % 2 === 0 ? middle - 1 : middle];
  if (upper === undefined || lower === undefined) throw new RangeError("No values");
  return (lower + upper) / 2;
}

function round(value: number): number {
  return Number(value.toPrecision(4));
}
