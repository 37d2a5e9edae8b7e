/** Octets of an IO-Link parameter as a value: big endian, integers alone in 1, 2, 4 or 8 octets, text cut at the first zero. */
import type { InputReference } from "./mapping";
import { readText } from "./read-text";
import type { SampleValue } from "./sample";

type Encoding = NonNullable<Extract<InputReference, { kind: "parameter" }>["encoding"]>;

/** Undefined where the octets cannot be such a value. Without an encoding: text where all octets can be text, else unsigned. */
export function decodeParameter(octets: Uint8Array, encoding?: Encoding): SampleValue | undefined {
  switch (encoding ?? guess(octets)) {
    case "text":
      return readText(octets);
    case "boolean":
      return octets.length === 0 ? undefined : octets.some((octet) => octet !== 0);
    case "float":
      return octets.length === 4 ? toView(octets).getFloat32(0) : octets.length === 8 ? toView(octets).getFloat64(0) : undefined;
    case "unsigned":
    case "signed":
      return readInteger(octets, encoding === "signed");
  }
}

function guess(octets: Uint8Array): Encoding {
  const end = octets.indexOf(0);
  const shown = end < 0 ? octets : octets.subarray(0, end);
  const isText = octets.length > 1 && shown.length > 0 && shown.every((octet) => octet >= 0x20 && octet !== 0x7f);
  const isPadded = end < 0 || octets.subarray(end).every((octet) => octet === 0);
  return isText && isPadded ? "text" : "unsigned";
}

function readInteger(octets: Uint8Array, isSigned: boolean): SampleValue | undefined {
  if (octets.length === 0 || octets.length > 8) return undefined;
  let value = 0n;
  for (const octet of octets) value = (value << 8n) | BigInt(octet);
  const whole = isSigned ? BigInt.asIntN(octets.length * 8, value) : value;
  return whole >= -9007199254740991n && whole <= 9007199254740991n ? Number(whole) : whole;
}

function toView(octets: Uint8Array): DataView {
  return new DataView(octets.buffer, octets.byteOffset, octets.byteLength);
}
