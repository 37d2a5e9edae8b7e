import fc from "fast-check";
import { describe, expect, it } from "vitest";
import {
  canConvert,
  convert,
  findUnits,
  fromEuInformation,
  listUnits,
  toEuInformation,
  toUnitCode,
  toUnitId,
  unitByCode,
  unitById,
} from "~/domain/units/units";

/** Code, unitId, symbol as printed in OPC 10000-8 §5.6.3.4 (°C) and its published table UNECE_to_OPCUA.csv, read by hand. */
const PUBLISHED: readonly (readonly [code: string, unitId: number, symbol: string])[] = [
  ["CEL", 4408652, "°C"],
  ["BAR", 4342098, "bar"],
  ["MMT", 5066068, "mm"],
  ["P1", 20529, "%"],
  ["RPM", 5394509, "r/min"],
  ["M46", 5059638, "r/min"],
  ["C16", 4403510, "mm/s"],
  ["KWH", 4937544, "kW·h"],
  ["AMP", 4279632, "A"],
  ["VLT", 5655636, "V"],
  ["HTZ", 4740186, "Hz"],
  ["SEC", 5457219, "s"],
  ["KGM", 4933453, "kg"],
  ["MQH", 5067080, "m³/h"],
  ["4K", 13387, "mA"],
  ["2Z", 12890, "mV"],
  ["C62", 4404786, "1"],
  ["A97", 4274487, "hPa"],
  ["KWT", 4937556, "kW"],
];

describe("unit ids", () => {
  it("are those of the published table", () => {
    for (const [code, unitId, symbol] of PUBLISHED) {
      expect([code, toUnitId(code), unitByCode(code)?.symbol]).toEqual([code, unitId, symbol]);
      expect(unitById(unitId)?.code).toBe(code);
    }
  });

  it("go to codes and back for every row; the table has as many rows as the published one", () => {
    expect(listUnits()).toHaveLength(1827);
    for (const unit of listUnits()) expect(toUnitCode(unit.unitId)).toBe(unit.code);
    expect(toUnitCode(-1)).toBeUndefined();
    expect(toUnitCode(0)).toBeUndefined();
    expect(toUnitCode(1082)).toBeUndefined();
  });

  it("make EUInformation and find the unit of one", () => {
    const celsius = unitByCode("CEL");
    const value = celsius && toEuInformation(celsius);
    expect(value).toEqual({
      namespaceUri: "http://www.opcfoundation.org/UA/units/un/cefact",
      unitId: 4408652,
      displayName: { text: "°C" },
      description: { text: "degree Celsius" },
    });
    expect(value && fromEuInformation(value)?.code).toBe("CEL");
    expect(value && fromEuInformation({ ...value, namespaceUri: "urn:other" })).toBeUndefined();
  });
});

describe("findUnits", () => {
  const first = (query: string): string | undefined => findUnits(query)[0]?.code;

  it("finds by symbol, code, name and what people type", () => {
    const cases: Record<string, string> = {
      "°C": "CEL",
      degC: "CEL",
      CEL: "CEL",
      cel: "CEL",
      "degree celsius": "CEL",
      "mm/s": "C16",
      "millimeter per second": "C16",
      rpm: "RPM",
      "r/min": "RPM",
      "%": "P1",
      percent: "P1",
      kWh: "KWH",
      bar: "BAR",
      psi: "PS",
      "m³/h": "MQH",
      "m3/h": "MQH",
      kW: "KWT",
      hPa: "A97",
      hectopascal: "A97",
      µm: "4H",
      um: "4H",
      mA: "4K",
      MHz: "MHZ",
      mHz: "MTZ",
      ohm: "OHM",
    };
    expect(Object.fromEntries(Object.keys(cases).map((query) => [query, first(query)]))).toEqual(cases);
  });

  it("answers common units for an empty query, nothing for nonsense, and never more than asked", () => {
    expect(findUnits("", 3).map((u) => u.code)).toEqual(["CEL", "P1", "BAR"]);
    expect(findUnits("zzqx")).toEqual([]);
    expect(findUnits("meter", 5)).toHaveLength(5);
  });
});

describe("convert", () => {
  const to = (value: number, from: string, target: string): number => {
    const result = convert(value, from, target);
    return result.ok ? result.value : NaN;
  };

  it("keeps the definitions of the SI brochure and of the yard and pound agreement", () => {
    expect(to(25, "CEL", "KEL")).toBeCloseTo(298.15, 10);
    expect(to(212, "FAH", "CEL")).toBeCloseTo(100, 10);
    expect(to(-40, "CEL", "FAH")).toBeCloseTo(-40, 10);
    expect(to(491.67, "A48", "CEL")).toBeCloseTo(0, 10);
    expect(to(1, "BAR", "A97")).toBeCloseTo(1000, 10);
    expect(to(1, "KWH", "JOU")).toBe(3_600_000);
    expect(to(60, "RPM", "HTZ")).toBeCloseTo(1, 12);
    expect(to(180, "DD", "C81")).toBeCloseTo(Math.PI, 12);
    expect(to(1, "INH", "MMT")).toBeCloseTo(25.4, 12);
    expect(to(1, "PS", "PAL")).toBeCloseTo(6894.757293168361, 6);
    expect(to(50, "P1", "C62")).toBe(0.5);
    expect(to(3.6, "KMH", "MTS")).toBeCloseTo(1, 12);
    expect(to(60, "L2", "MQH")).toBeCloseTo(3.6, 12);
  });

  it("refuses units that only share a dimension", () => {
    expect(convert(1, "NU", "JOU").problems[0]?.code).toBe("unit.other-quantity");
    expect(convert(1, "KWT", "KVA").problems[0]?.code).toBe("unit.other-quantity");
    expect(convert(1, "CEL", "BAR").problems[0]?.code).toBe("unit.other-quantity");
    expect(convert(1, "XXX", "BAR").problems[0]?.code).toBe("unit.unknown");
  });

  it("back and forth is the start, for every pair that can be converted", () => {
    const codes = listUnits().map((u) => u.code);
    fc.assert(
      fc.property(
        fc.constantFrom(...codes),
        fc.nat(2000),
        fc.double({ min: -1e6, max: 1e6, noNaN: true }),
        (from, shift, value) => {
          const others = codes.filter((code) => canConvert(from, code));
          const target = others[shift % Math.max(1, others.length)] ?? from;
          const back = to(to(value, from, target), target, from);
          expect(Math.abs(back - value)).toBeLessThan(1e-6 * Math.max(1, Math.abs(value)));
        },
      ),
      { numRuns: 200 },
    );
  });
});
