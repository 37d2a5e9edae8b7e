/**
 * Bits of a process data block (OPC 30120 §12.2, IODD bitOffset rule): the octets in transmission order are one
 * big-endian number; bit offset 0 is the lowest bit of the last octet.
 */

export type BitReader = (octets: Uint8Array) => number;

/** With up to 7 bits of shift such a field fits the 53 bits of a double; wider ones are read as bigint. */
export const MAX_NUMBER_BITS = 46;

/**
 * A reader of an unsigned field of 1 … 46 bits at `bitOffset` in a block of `length` octets. Made once a field, so that
 * reading a frame does no arithmetic on positions. Throws RangeError when the field does not lie in the block.
 */
export function makeUnsignedReader(length: number, bitOffset: number, bitLength: number): BitReader {
  const last = length - 1 - (bitOffset >> 3);
  const first = length - 1 - ((bitOffset + bitLength - 1) >> 3);
  if (first < 0 || bitLength < 1 || bitLength > MAX_NUMBER_BITS) {
    throw new RangeError(`No field of ${bitLength} bits at ${bitOffset} in ${length} octets`);
  }
  const shift = bitOffset & 7;
  const span = last - first + 1;
  const mask = bitLength === 32 ? 0xffffffff : (1 << bitLength) - 1;
  if (span === 1) return (o) => ((o[last] ?? 0) >>> shift) & mask;
  if (span === 2) return (o) => ((((o[first] ?? 0) << 8) | (o[last] ?? 0)) >>> shift) & mask;
  if (span === 3) {
    return (o) => ((((o[first] ?? 0) << 16) | ((o[first + 1] ?? 0) << 8) | (o[last] ?? 0)) >>> shift) & mask;
  }
  if (span === 4) {
    const read = (o: Uint8Array): number =>
      (((o[first] ?? 0) << 24) | ((o[first + 1] ?? 0) << 16) | ((o[first + 2] ?? 0) << 8) | (o[last] ?? 0)) >>> shift;
    return bitLength === 32 ? (o) => read(o) >>> 0 : (o) => (read(o) & mask) >>> 0;
  }
  const divisor = 2 ** shift;
  const firstMask = 0xff >>> (7 - ((bitOffset + bitLength - 1) & 7));
  return (o) => {
    let value = (o[first] ?? 0) & firstMask;
    for (let i = first + 1; i <= last; i++) value = value * 256 + (o[i] ?? 0);
    return Math.floor(value / divisor);
  };
}

/** The same for two's complement. */
export function makeSignedReader(length: number, bitOffset: number, bitLength: number): BitReader {
  const read = makeUnsignedReader(length, bitOffset, bitLength);
  const half = 2 ** (bitLength - 1);
  const full = 2 ** bitLength;
  return (o) => {
    const value = read(o);
    return value >= half ? value - full : value;
  };
}

/** An unsigned field of any length up to 64 bits. */
export function readBigUnsigned(octets: Uint8Array, bitOffset: number, bitLength: number): bigint {
  const last = octets.length - 1 - (bitOffset >> 3);
  const first = octets.length - 1 - ((bitOffset + bitLength - 1) >> 3);
  let value = 0n;
  for (let i = first; i <= last; i++) value = (value << 8n) | BigInt(octets[i] ?? 0);
  return BigInt.asUintN(bitLength, value >> BigInt(bitOffset & 7));
}

export function readBigSigned(octets: Uint8Array, bitOffset: number, bitLength: number): bigint {
  return BigInt.asIntN(bitLength, readBigUnsigned(octets, bitOffset, bitLength));
}

/** Writes the low `bitLength` bits of a value into its place; all other bits stay as they are. */
export function writeBits(octets: Uint8Array, bitOffset: number, bitLength: number, value: bigint): void {
  for (let bit = 0; bit < bitLength; bit++) {
    const at = bitOffset + bit;
    const index = octets.length - 1 - (at >> 3);
    const mask = 1 << (at & 7);
    const octet = octets[index] ?? 0;
    octets[index] = (value >> BigInt(bit)) & 1n ? octet | mask : octet & ~mask;
  }
}

/** Whole octets of a field that need not start at an octet's edge. */
export function readOctets(octets: Uint8Array, bitOffset: number, count: number): Uint8Array {
  const found = new Uint8Array(count);
  for (let i = 0; i < count; i++) {
    found[count - 1 - i] = Number(readBigUnsigned(octets, bitOffset + 8 * i, 8));
  }
  return found;
}

/** Hexadecimal pairs in transmission order; spaces are allowed. Undefined for anything else. */
export function parseHex(text: string): Uint8Array | undefined {
  const digits = text.replace(/\s+/g, "");
  if (digits.length === 0 || digits.length % 2 !== 0 || !/^[0-9a-f]+$/i.test(digits)) return undefined;
  return Uint8Array.from({ length: digits.length / 2 }, (_, i) => Number.parseInt(digits.slice(2 * i, 2 * i + 2), 16));
}

export function formatHex(octets: Uint8Array): string {
  return Array.from(octets, (octet) => octet.toString(16).toUpperCase().padStart(2, "0")).join(" ");
}
