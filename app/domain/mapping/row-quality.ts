/**
 * Quality rules of a row. Which case takes which status code is the project's choice, adjustable for each row; meanings of
 * the codes: OPC 10000-8 §7.3.2. What a rule leaves alone costs nothing when the mapping runs.
 */
import type { FieldPlan } from "./decode-frame";
import type { QualityRules } from "./mapping";
import type { Sample } from "./sample";
import { makeScaler } from "./scale";
import { LIMIT_HIGH, LIMIT_LOW, StatusCode } from "./status";

export type SampleChange = (sample: Sample) => Sample;

type Range = { readonly low: number; readonly high: number };

/** EURange: what is likely in normal operation. InstrumentRange: what the instrument can deliver (OPC 10000-8 §5.3.2.2). */
export type TargetRanges = { readonly range?: Range; readonly instrumentRange?: Range };

const LIMIT_BITS = 0x0700;

/** On the source's sample: process data marked invalid, and values outside of what the sensor measures. */
export function makePrepare(rules: QualityRules | undefined, field: FieldPlan | undefined): SampleChange | undefined {
  const isInvalidFailure = rules?.invalid === "Bad_SensorFailure";
  const limits = rules?.outOfRange === "Uncertain_SensorNotAccurate" && field ? findLimits(field) : undefined;
  if (!isInvalidFailure && !limits) return undefined;
  return (sample) => {
    if (isInvalidFailure && sample.status === StatusCode.Bad) return { ...sample, status: StatusCode.Bad_SensorFailure };
    const base = (sample.status & 0xffff0000) >>> 0;
    const bits = sample.status & LIMIT_BITS;
    if (!limits || base !== StatusCode.Bad_SensorFailure || bits === 0) return sample;
    const value = bits === LIMIT_HIGH ? limits.high : limits.low;
    return { value, status: StatusCode.Uncertain_SensorNotAccurate | bits, time: sample.time };
  };
}

/** The field's ranges as physical values; undefined where the device names none. */
function findLimits(field: FieldPlan): Range | undefined {
  const ranges = "ranges" in field.type ? field.type.ranges : [];
  if (ranges.length === 0) return undefined;
  const scale = makeScaler(field);
  const ends = ranges.flatMap((r) => [scale(r.lower), scale(r.upper)]);
  return { low: Math.min(...ends), high: Math.max(...ends) };
}

/** On the result: a number beyond InstrumentRange is uncertain, one beyond EURange only where the row says so. */
export function makeFinish(rules: QualityRules | undefined, ranges: TargetRanges | undefined): SampleChange | undefined {
  const checked = rules?.beyondRange === "Uncertain_EngineeringUnitsExceeded" ? ranges?.range : undefined;
  const limits = [ranges?.instrumentRange, checked].filter((r) => r !== undefined);
  if (limits.length === 0) return undefined;
  const low = Math.max(...limits.map((r) => r.low));
  const high = Math.min(...limits.map((r) => r.high));
  return (sample) => {
    const { value, status } = sample;
    if (status !== StatusCode.Good || typeof value !== "number") return sample;
    if (value < low) return { ...sample, status: StatusCode.Uncertain_EngineeringUnitsExceeded | LIMIT_LOW };
    if (value > high) return { ...sample, status: StatusCode.Uncertain_EngineeringUnitsExceeded | LIMIT_HIGH };
    return sample;
  };
}
