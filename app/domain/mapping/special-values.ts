/**
 * Values of a measured number that are no measurement. The IODD's SingleValues come first; the values of the measuring
 * profiles apply only when the device names such a profile, since other devices use the same numbers otherwise.
 */
import type { IoddSimpleDatatype } from "../iodd/device-description";
import { LIMIT_HIGH, LIMIT_LOW, StatusCode, withLimit } from "./status";

/** `status` Good: a name only ("0 = disabled"); otherwise the value is no number and the status says why. */
export type SpecialValue = { readonly raw: number; readonly text: string; readonly status: number };

/** Profile identifiers of measuring sensors (the Community's list of profile identifiers; 23 by pattern, from memory). */
const MEASURING_PROFILES = new Set([10, 11, 12, 13, 16, 17, 18, 19, 20, 21, 22, 23]);

/** 16 bit (common to several public device manuals): no data, out of range above, out of range below. */
const PROFILE_VALUES_16: readonly SpecialValue[] = [
  { raw: 32_764, text: "No measurement data", status: StatusCode.Bad_SensorFailure },
  { raw: 32_760, text: "Out of range (+)", status: withLimit(StatusCode.Bad_SensorFailure, LIMIT_HIGH) },
  { raw: -32_760, text: "Out of range (−)", status: withLimit(StatusCode.Bad_SensorFailure, LIMIT_LOW) },
];

type Integer = Extract<IoddSimpleDatatype, { kind: "UIntegerT" | "IntegerT" }>;

/** All special values of an integer field. */
export function findSpecialValue(type: Integer, profiles: readonly number[], language: string): SpecialValue[] {
  const listed = type.singleValues.flatMap(({ value, name }) => {
    if (typeof value !== "number") return [];
    const text = name?.[language] ?? Object.values(name ?? {})[0] ?? "";
    return [{ raw: value, text, status: toStatus(type, value, Object.values(name ?? {})) }];
  });
  if (type.kind !== "IntegerT" || type.bitLength !== 16 || !profiles.some((p) => MEASURING_PROFILES.has(p)))
    return listed;
  return [...listed, ...PROFILE_VALUES_16.filter((p) => !listed.some((l) => l.raw === p.raw))];
}

/**
 * Only a measured number (one with a range, or with the profile's numbers among its values) has values that are no
 * measurement; in an enumeration every value is good. The meaning is taken from the profile's number, else from the name.
 */
function toStatus(type: Integer, raw: number, names: readonly string[]): number {
  const isInRange = type.ranges.some((r) => raw >= r.lower && raw <= r.upper);
  const isMeasured =
    type.ranges.length > 0 || type.singleValues.some((s) => PROFILE_VALUES_16.some((p) => p.raw === s.value));
  if (!isMeasured || isInRange) return StatusCode.Good;
  const words = names.join(" ").toLowerCase();
  if (/no (measurement )?(data|echo|target|value|signal)|invalid|failure|not available/.test(words))
    return StatusCode.Bad_SensorFailure;
  if (/out of (measuring )?range|over|under|exceed/.test(words)) {
    if (/\(\+\)|\+|above|high|over/.test(words)) return withLimit(StatusCode.Bad_SensorFailure, LIMIT_HIGH);
    if (/\(-\)|−|-|below|low|under/.test(words)) return withLimit(StatusCode.Bad_SensorFailure, LIMIT_LOW);
    return StatusCode.Bad_SensorFailure;
  }
  const profile =
    type.kind === "IntegerT" && type.bitLength === 16 ? PROFILE_VALUES_16.find((p) => p.raw === raw) : undefined;
  return profile?.status ?? StatusCode.Good;
}
