/**
 * Transforms of a mapping: each is made once and then run for every sample. Those with a memory (deadband, average,
 * counter) keep it in the returned closure, one for each row of each machine.
 */
import { fail, ok, problem, type Result } from "../core/result";
import type { Transform } from "./mapping";
import { badSample, toNumber, type Sample, type SampleValue } from "./sample";
import { makeScaler } from "./scale";
import { isBad, LIMIT_HIGH, LIMIT_LOW, StatusCode } from "./status";

export type TransformStep = (sample: Sample) => Sample;

/** Makes a number of one unit a number of another; undefined when the dimensions differ. */
export type FindConversion = (from: string, to: string) => ((value: number) => number) | undefined;

/** Problems: `transform.unit-dimension`, `transform.lookup-order`. */
export function makeTransform(transform: Transform, findConversion: FindConversion): Result<TransformStep> {
  switch (transform.kind) {
    case "linear":
      return ok(onNumber(makeScaler(transform)));
    case "unit": {
      const convert = findConversion(transform.from, transform.to);
      if (!convert) return fail(problem("transform.unit-dimension", { from: transform.from, to: transform.to }));
      return ok(onNumber(convert));
    }
    case "bit":
      return ok(onValue((value) => readBit(value, transform.bit, transform.invert ?? false)));
    case "value-map":
      return ok(makeValueMap(transform));
    case "lookup":
      return makeLookup(transform.points);
    case "deadband":
      return ok(makeDeadband(transform.width));
    case "average":
      return ok(makeAverage(transform.samples));
    case "counter":
      return ok(makeCounter(transform.bits, transform.resets ?? false));
  }
}

/** Bad samples pass unchanged: no transform makes a value of them. */
function onValue(change: (value: SampleValue) => SampleValue | undefined): TransformStep {
  return (sample) => {
    if (isBad(sample.status)) return sample;
    const value = change(sample.value);
    if (value === undefined) return badSample(StatusCode.Bad_ConfigurationError, sample.time);
    return { value, status: sample.status, time: sample.time };
  };
}

function onNumber(change: (value: number) => number): TransformStep {
  return onValue((value) => {
    const number = toNumber(value);
    return number === undefined ? undefined : change(number);
  });
}

function readBit(value: SampleValue, bit: number, isInverted: boolean): boolean | undefined {
  const number = typeof value === "bigint" ? value : toNumber(value);
  if (number === undefined || (typeof number === "number" && !Number.isSafeInteger(number))) return undefined;
  return ((BigInt(number) >> BigInt(bit)) & 1n) === 1n ? !isInverted : isInverted;
}

function makeValueMap(transform: Extract<Transform, { kind: "value-map" }>): TransformStep {
  const table = new Map<number | string, number | string>(
    transform.entries.map(({ from, to }) => [typeof from === "boolean" ? Number(from) : from, to]),
  );
  const { otherwise } = transform;
  return (sample) => {
    if (isBad(sample.status)) return sample;
    const key = typeof sample.value === "string" ? sample.value : (toNumber(sample.value) ?? "");
    const value = table.get(key) ?? otherwise;
    // A raw value that the map does not know is no state of the machine; it must not look like one.
    return value === undefined ? badSample(StatusCode.Bad_ConfigurationError, sample.time) : { ...sample, value };
  };
}

function makeLookup(points: readonly (readonly [number, number])[]): Result<TransformStep> {
  const sorted = [...points].sort((a, b) => a[0] - b[0]);
  if (sorted.some((p, i) => i > 0 && p[0] === sorted[i - 1]?.[0])) return fail(problem("transform.lookup-order"));
  const [first, last] = [sorted[0], sorted.at(-1)];
  if (!first || !last) throw new RangeError("A lookup table needs points");
  return ok((sample) => {
    if (isBad(sample.status)) return sample;
    const x = toNumber(sample.value);
    if (x === undefined) return badSample(StatusCode.Bad_ConfigurationError, sample.time);
    // Outside the table the end value holds; the limit bits tell a reader on which side.
    if (x < first[0]) return atEnd(sample, first[1], LIMIT_LOW);
    if (x > last[0]) return atEnd(sample, last[1], LIMIT_HIGH);
    const upper = sorted.findIndex((p) => p[0] >= x);
    const [right, left] = [sorted[upper] ?? last, sorted[Math.max(0, upper - 1)] ?? first];
    const share = right[0] === left[0] ? 0 : (x - left[0]) / (right[0] - left[0]);
    return { ...sample, value: left[1] + share * (right[1] - left[1]) };
  });
}

function atEnd(sample: Sample, value: number, limit: number): Sample {
  return { value, status: StatusCode.Uncertain_EngineeringUnitsExceeded | limit, time: sample.time };
}

function makeDeadband(width: number): TransformStep {
  let held: Sample | undefined;
  return (sample) => {
    const value = toNumber(sample.value);
    const before = held ? toNumber(held.value) : undefined;
    const isSteady = value !== undefined && before !== undefined && held?.status === sample.status;
    if (held && isSteady && Math.abs(value - before) <= width) return { ...held, time: sample.time };
    held = sample;
    return sample;
  };
}

/** The mean of what is good so far; a Bad sample empties the window, since a mean across a gap would hide it. */
function makeAverage(samples: number): TransformStep {
  const window: number[] = [];
  return (sample) => {
    const value = isBad(sample.status) ? undefined : toNumber(sample.value);
    if (value === undefined) {
      window.length = 0;
      return isBad(sample.status) ? sample : badSample(StatusCode.Bad_ConfigurationError, sample.time);
    }
    window.push(value);
    if (window.length > samples) window.shift();
    return { ...sample, value: window.reduce((sum, v) => sum + v, 0) / window.length };
  };
}

function makeCounter(bits: number, resets: boolean): TransformStep {
  const modulus = 2 ** bits;
  let last: number | undefined;
  let total = 0;
  return (sample) => {
    const value = isBad(sample.status) ? undefined : toNumber(sample.value);
    if (value === undefined)
      return isBad(sample.status) ? sample : badSample(StatusCode.Bad_ConfigurationError, sample.time);
    if (last === undefined) total = value;
    else if (value >= last) total += value - last;
    else total += resets ? value : value + modulus - last;
    last = value;
    return { ...sample, value: total };
  };
}
