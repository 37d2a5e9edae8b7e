/** Conversions of mapped values against an independent library of units (mathjs) and against fixed points. */
import { unit } from "mathjs";
import { describe, expect, it } from "vitest";
import { findConversion } from "~/domain/mapping/find-conversion";

/** UN/CEFACT code and the same unit in mathjs. */
const pairs: readonly (readonly [from: string, to: string, theirFrom: string, theirTo: string])[] = [
  ["MMT", "MTR", "mm", "m"],
  ["INH", "MMT", "inch", "mm"],
  ["FOT", "MTR", "ft", "m"],
  ["BAR", "PAL", "bar", "Pa"],
  ["A97", "BAR", "hPa", "bar"],
  ["KPA", "BAR", "kPa", "bar"],
  ["MPA", "BAR", "MPa", "bar"],
  ["PS", "BAR", "psi", "bar"],
  ["KWT", "WTT", "kW", "W"],
  ["KWH", "JOU", "kWh", "J"],
  ["WHR", "JOU", "Wh", "J"],
  ["MIN", "SEC", "minute", "s"],
  ["HUR", "SEC", "hour", "s"],
  ["C26", "SEC", "ms", "s"],
  ["GRM", "KGM", "g", "kg"],
  ["TNE", "KGM", "tonne", "kg"],
  ["LTR", "MTQ", "liter", "m^3"],
  ["MLT", "LTR", "ml", "liter"],
  ["KMH", "MTS", "km/hour", "m/s"],
  ["C16", "MTS", "mm/s", "m/s"],
  ["4K", "AMP", "mA", "A"],
  ["2Z", "VLT", "mV", "V"],
  ["KHZ", "HTZ", "kHz", "Hz"],
  ["DD", "C81", "deg", "rad"],
  ["MQH", "MQS", "m^3/hour", "m^3/s"],
  ["CEL", "KEL", "degC", "K"],
  ["FAH", "CEL", "degF", "degC"],
  ["KEL", "FAH", "K", "degF"],
];

describe("conversions of mapped values", () => {
  it.each(pairs)("%s → %s agrees with mathjs", (from, to, theirFrom, theirTo) => {
    const forth = findConversion(from, to);
    const back = findConversion(to, from);
    if (!forth || !back) throw new RangeError(`${from} → ${to}`);
    for (const value of [-40, 0, 1, 12.5, 1234.5]) {
      const theirs = unit(value, theirFrom).toNumber(theirTo);
      expect(Math.abs(forth(value) - theirs)).toBeLessThanOrEqual(1e-9 * Math.max(1, Math.abs(theirs)));
      expect(back(forth(value))).toBeCloseTo(value, 8);
    }
  });

  // SI brochure, 9th edition, §2.3.1: 0 °C = 273.15 K; −40 °C = −40 °F by definition of the Fahrenheit scale; water boils at 212 °F.
  it.each([
    [0, "CEL", "KEL", 273.15],
    [-40, "CEL", "FAH", -40],
    [100, "CEL", "FAH", 212],
    [0, "KEL", "CEL", -273.15],
  ])("%d %s is %s %d", (value, from, to, wanted) => {
    expect(findConversion(String(from), String(to))?.(value)).toBeCloseTo(wanted, 10);
  });

  it("refuses units that measure different things", () => {
    expect(findConversion("MMT", "BAR")).toBeUndefined();
    expect(findConversion("KWH", "NU")).toBeUndefined();
  });
});
