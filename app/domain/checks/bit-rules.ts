/** Words for masks: which bits are set that must not be. */

/** `bit 7, bit 9` of the bits of `mask` that are not in `allowed`; undefined where there are none. */
export function listSurplusBits(mask: number, allowed: number): string | undefined {
  const bits: string[] = [];
  for (let bit = 0; bit < 32; bit++) {
    const flag = 2 ** bit;
    if (Math.floor(mask / flag) % 2 === 1 && Math.floor(allowed / flag) % 2 === 0) bits.push(`bit ${bit}`);
  }
  return bits.length === 0 ? undefined : bits.join(", ");
}

/** The mask with the allowed bits only, without the sign that JavaScript's operators give to bit 31. */
export function keepBits(mask: number, allowed: number): number {
  return (mask & allowed) >>> 0;
}
