import { assertNever } from "../core/result";
import type { BuiltInType, Motion } from "./motion";
import { INTEGER_RANGES } from "./motion";

/** Motions that answer a number. */
export type MovingMotion = Exclude<Motion, { kind: "static" | "clock" }>;

/**
 * The value at a time. Pure: the same motion and time answer the same value, so that two servers of one model agree and
 * a value is computed only when somebody reads it.
 *
 * @param seconds since the start of the simulation, not negative
 * @param offset part of a period that an element of an array lies behind the first, 0 … 1
 */
export function simulateNumber(motion: MovingMotion, seconds: number, offset = 0): number {
  switch (motion.kind) {
    case "sine": {
      const turn = seconds / motion.period + motion.phase + offset;
      return motion.low + ((1 + Math.sin(2 * Math.PI * turn)) / 2) * (motion.high - motion.low);
    }
    case "ramp": {
      const turn = fraction(seconds / motion.period + motion.phase + offset);
      const up = turn < 0.5 ? turn * 2 : 2 - turn * 2;
      return motion.low + up * (motion.high - motion.low);
    }
    case "rise": {
      const span = motion.high - motion.low;
      return motion.low + fraction((seconds * motion.perSecond) / span + motion.phase + offset) * span;
    }
    case "steps": {
      const { values } = motion;
      const at = Math.floor(seconds / motion.secondsEach + (motion.phase + offset) * values.length) % values.length;
      return values[at] ?? 0;
    }
    case "count":
      return (motion.start + Math.floor(seconds * motion.perSecond)) % (motion.last + 1);
    default:
      return assertNever(motion);
  }
}

/** Brings a number into the data type: whole and within bounds for integers, single precision for Float. */
export function fitToType(value: number, type: BuiltInType): number {
  const range = INTEGER_RANGES[type];
  if (range) return Math.min(range[1], Math.max(range[0], Math.round(value)));
  return type === "Float" ? Math.fround(value) : value;
}

function fraction(value: number): number {
  return value - Math.floor(value);
}
