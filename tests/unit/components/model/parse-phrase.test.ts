import { describe, expect, it } from "vitest";
import { parsePhrase, toMemberName, type SpokenType } from "~/components/model/parse-phrase";
import { StandardDataType as D, StandardType as T } from "~/domain/address-space/standard-ids";

const units: Record<string, string> = { "%": "P1", "°C": "CEL", "mm/s": "C16", kWh: "KWH", "degree Celsius": "CEL", mm: "MMT", V: "VLT" };
const parse = (phrase: string) => parsePhrase(phrase, (text) => units[text]);

describe("a phrase about a signal", () => {
  it("takes the unit from its end and makes an analog member", () => {
    expect(parse("oil level %")).toEqual({
      kind: "Variable",
      name: "OilLevel",
      typeDefinition: T.AnalogUnitRangeType,
      dataType: D.Float,
      unit: "P1",
    });
    expect(parse("gearbox temperature [°C]")).toMatchObject({ name: "GearboxTemperature", unit: "CEL" });
    expect(parse("gearbox temperature degree Celsius")).toMatchObject({ name: "GearboxTemperature", unit: "CEL" });
  });

  it("reads a range with comma, minus sign and either mark", () => {
    expect(parse("deviation mm −5 … 5")).toMatchObject({ name: "Deviation", unit: "MMT", range: { low: -5, high: 5 } });
    expect(parse("vibration 0..20,5 mm/s")).toMatchObject({ name: "Vibration", unit: "C16", range: { low: 0, high: 20.5 } });
  });

  it("keeps a word for the name even when it is a unit", () => {
    expect(parse("V")).toMatchObject({ name: "V" });
    expect(parse("V")?.unit).toBeUndefined();
  });

  it("knows counters, states and texts by their words", () => {
    expect(parse("picks counter")).toMatchObject({ name: "PicksCounter", dataType: D.UInt32 });
    expect(parse("door open")).toMatchObject({ typeDefinition: T.TwoStateDiscreteType, dataType: D.Boolean });
    expect(parse("recipe number")).toMatchObject({ dataType: D.UInt16 });
    expect(parse("sensor tag")).toMatchObject({ dataType: D.String });
  });

  it("makes methods and groups by their marks", () => {
    expect(parse("reset picks()")).toMatchObject({ kind: "Method", name: "ResetPicks" });
    expect(parse("environment/")).toMatchObject({ kind: "Object", name: "Environment" });
  });

  it("answers nothing for an empty phrase", () => {
    expect(parse("   ")).toBeUndefined();
  });
});

describe("types in a phrase", () => {
  it("takes names of types and the word optional", () => {
    const types = { Double: { key: D.Double, kind: "DataType" }, AnalogUnitType: { key: T.AnalogUnitType, kind: "VariableType" } } as const;
    const say = (phrase: string) => parsePhrase(phrase, (text) => units[text], (name) => (types as Record<string, SpokenType>)[name]);
    expect(say("active energy Double kWh 0..1000000 optional")).toMatchObject({
      name: "ActiveEnergy",
      dataType: D.Double,
      typeDefinition: T.AnalogUnitRangeType,
      range: { low: 0, high: 1_000_000 },
      isOptional: true,
    });
    expect(say("total Double")).toMatchObject({ name: "Total", dataType: D.Double, typeDefinition: T.BaseDataVariableType });
    expect(say("pressure AnalogUnitType")).toMatchObject({ name: "Pressure", typeDefinition: T.AnalogUnitType });
    // The first word is the name, whatever it is.
    expect(say("Double")).toMatchObject({ name: "Double" });
  });
});

it("joins words to a name and keeps capitals", () => {
  expect(toMemberName(["kWh", "per", "m-2"])).toBe("KWhPerM2");
});
