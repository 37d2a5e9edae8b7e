import { beforeAll, describe, expect, it } from "vitest";
import { toUnitFacts } from "~/components/model/analog-facts";
import { parseRangeIn, toOwnUnit } from "~/components/model/number-with-unit";
import { loadUnits } from "~/components/model/unit-lookup";
import { toEuInformation, unitByCode } from "~/domain/units/units";

function unit(code: string) {
  const found = unitByCode(code);
  if (!found) throw new Error(code);
  return toUnitFacts(toEuInformation(found));
}

beforeAll(() => loadUnits());

// Lengths and temperatures by definition: 1 cm = 10 mm, 0 °C = 273.15 K (SI brochure, 9th edition).
describe("figures that are written with a unit", () => {
  it.each([
    ["40 cm", "MMT", "400"],
    ["40 mm", "MMT", "40"],
    ["1,5 m", "MMT", "1500"],
    ["273.15 K", "CEL", "0"],
    ["40", "MMT", "40"],
    ["40 kW", "MMT", "40 kW"],
  ])("%s in %s is %s", (text, code, figure) => expect(toOwnUnit(unit(code), text)).toBe(figure));

  it("stay as they are where the node has no unit", () => expect(toOwnUnit(undefined, "40 cm")).toBe("40 cm"));

  it("make a range", () => {
    expect(parseRangeIn(unit("MMT"), "0 … 40 cm")).toEqual({ low: 0, high: 400 });
    expect(parseRangeIn(unit("MMT"), "0 … 40")).toEqual({ low: 0, high: 40 });
    expect(parseRangeIn(unit("MMT"), "0 … 40 kW")).toBeUndefined();
  });
});
