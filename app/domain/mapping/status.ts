/**
 * Status codes that a mapped value can carry. Numbers: OPC 10000-4 §7.38.2 and the published list of status codes; which
 * case takes which code is the project's choice after OPC 10000-8 §7.3.2. Limit bits: OPC 10000-4 §7.38.1.
 */
export const StatusCode = {
  Good: 0x00000000,
  Good_LocalOverride: 0x00960000,
  Uncertain_NoCommunicationLastUsable: 0x408f0000,
  Uncertain_SensorNotAccurate: 0x40930000,
  Uncertain_EngineeringUnitsExceeded: 0x40940000,
  Uncertain_SubNormal: 0x40950000,
  Uncertain_SimulatedValue: 0x42090000,
  Bad: 0x80000000,
  Bad_NoCommunication: 0x80310000,
  Bad_WaitingForInitialData: 0x80320000,
  Bad_ConfigurationError: 0x80890000,
  Bad_NotConnected: 0x808a0000,
  Bad_DeviceFailure: 0x808b0000,
  Bad_SensorFailure: 0x808c0000,
  Bad_NoValue: 0x80f00000,
} as const;

/** InfoType DataValue with the limit bits low or high. */
export const LIMIT_LOW = 0x0500;
export const LIMIT_HIGH = 0x0600;

/** A status with limit bits, as an unsigned number. */
export function withLimit(status: number, limit: number): number {
  return (status | limit) >>> 0;
}

/** The name, with the side of a limit that was met: `Bad_SensorFailure (high)`. */
export function formatStatusWithLimit(code: number): string {
  const bits = code & 0x0700;
  const side = bits === LIMIT_LOW ? " (low)" : bits === LIMIT_HIGH ? " (high)" : bits === 0x0700 ? " (constant)" : "";
  return `${formatStatus(code)}${side}`;
}

/** The name without limit bits; the hexadecimal number for a code outside the table. */
export function formatStatus(code: number): string {
  const base = (code & 0xffff0000) >>> 0;
  const found = Object.entries(StatusCode).find(([, value]) => value === base);
  return found ? found[0] : formatQuality(base);
}

/** `0x808C0000`. */
export function formatQuality(code: number): string {
  return `0x${(code >>> 0).toString(16).toUpperCase().padStart(8, "0")}`;
}

export function isGood(code: number): boolean {
  return code >>> 30 === 0;
}

export function isBad(code: number): boolean {
  return code >>> 31 === 1;
}
