import { describe, expect, it } from "vitest";
import { formatNumber, formatRange, parseRange } from "~/components/model/analog-facts";
import { parseEnumeration } from "~/components/model/parse-enumeration";
import { toWords } from "~/components/model/rename-steps";

describe("ranges as people write them", () => {
  it.each([
    ["0 … 400", { low: 0, high: 400 }],
    ["-20..120", { low: -20, high: 120 }],
    ["−5 to 5", { low: -5, high: 5 }],
    ["0,5 ; 1,5", { low: 0.5, high: 1.5 }],
    ["900 1100", { low: 900, high: 1100 }],
  ])("%s", (text, range) => expect(parseRange(text)).toEqual(range));

  it("are refused when they are none", () => {
    expect(parseRange("about ten")).toBeUndefined();
    expect(parseRange("5")).toBeUndefined();
  });

  it("are shown with the true minus and the ellipsis", () => {
    expect(formatRange({ low: -20, high: 120.5 })).toBe("−20 … 120.5");
    expect(formatNumber(0.1 + 0.2)).toBe("0.3");
  });
});

it("reads enumerations with and without numbers", () => {
  expect(parseEnumeration("Off\n2 Running\nWaiting\n\n11 = Yarn break")).toEqual([
    { value: 0, name: "Off" },
    { value: 2, name: "Running" },
    { value: 3, name: "Waiting" },
    { value: 11, name: "Yarn break" },
  ]);
});

it("says names in words and keeps abbreviations", () => {
  expect(toWords("GearboxTemperature")).toBe("Gearbox temperature");
  expect(toWords("EURange")).toBe("EU range");
  expect(toWords("PH2Level")).toBe("PH2 level");
});
