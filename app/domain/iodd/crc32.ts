/**
 * CRC-32 (IEEE 802.3, as in zlib). The stamp of an IODD is this sum over the octets of the file with the value of the
 * attribute `crc` emptied; found by running it over the Community's published example descriptions, no clause at hand.
 */
const TABLE = Uint32Array.from({ length: 256 }, (_, index) => {
  let value = index;
  for (let bit = 0; bit < 8; bit++) value = value & 1 ? (value >>> 1) ^ 0xedb88320 : value >>> 1;
  return value >>> 0;
});

export function crc32(octets: Uint8Array): number {
  let sum = 0xffffffff;
  for (let i = 0; i < octets.length; i++) sum = (sum >>> 8) ^ (TABLE[(sum ^ (octets[i] ?? 0)) & 0xff] ?? 0);
  return (sum ^ 0xffffffff) >>> 0;
}

/** The CRC that the stamp should carry; undefined when the file has no stamp. */
export function countStampCrc(octets: Uint8Array): number | undefined {
  const found = findCrcValue(octets);
  if (!found) return undefined;
  const [start, end] = found;
  const rest = new Uint8Array(octets.length - (end - start));
  rest.set(octets.subarray(0, start));
  rest.set(octets.subarray(end), start);
  return crc32(rest);
}

/** Where the digits of the last `crc="…"` stand; searched from the end, since the Stamp is the last element. */
function findCrcValue(octets: Uint8Array): readonly [start: number, end: number] | undefined {
  const mark = [0x63, 0x72, 0x63, 0x3d, 0x22]; // crc="
  for (let at = octets.length - mark.length; at >= 0; at--) {
    if (!mark.every((octet, i) => octets[at + i] === octet)) continue;
    const start = at + mark.length;
    const end = octets.indexOf(0x22, start);
    return end < 0 ? undefined : [start, end];
  }
  return undefined;
}
