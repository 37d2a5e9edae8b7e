/** A value on its way from a source to a Variable. Status and time travel with it through every transform. */
import { isBad, isGood, StatusCode } from "./status";

export type SampleValue = number | bigint | boolean | string | null;

export type Sample = {
  readonly value: SampleValue;
  /** OPC UA status code with limit bits. Bad carries null (OPC 10000-4 §7.11.1). */
  readonly status: number;
  /** Milliseconds since 1970: when the source acquired the value. */
  readonly time: number;
};

export function badSample(status: number, time: number): Sample {
  return { value: null, status, time };
}

/** The status of a result over several inputs: the worst; the first of equals, so that its limit bits stay. */
export function worstStatus(samples: readonly Sample[]): number {
  const rank = (status: number): number => (isBad(status) ? 2 : isGood(status) ? 0 : 1);
  let worst: number = StatusCode.Good;
  for (const { status } of samples) if (rank(status) > rank(worst)) worst = status;
  return worst;
}

/** The number that arithmetic works on; undefined for text and null. Booleans count as 0 and 1. */
export function toNumber(value: SampleValue): number | undefined {
  switch (typeof value) {
    case "number":
      return value;
    case "bigint":
    case "boolean":
      return Number(value);
    default:
      return undefined;
  }
}
