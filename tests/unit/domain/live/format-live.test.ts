import { describe, expect, it } from "vitest";
import { chooseDecimals, formatAge, formatBound, formatNumber, formatRange } from "~/domain/live/format-live";

describe("texts of live values", () => {
  it("give a figure the decimals that tell a ten-thousandth of its range apart", () => {
    expect(chooseDecimals(212.5, { low: 0, high: 320 })).toBe(2);
    expect(chooseDecimals(1, { low: -5, high: 5 })).toBe(3);
    expect(chooseDecimals(1, { low: 0, high: 1_000_000 })).toBe(0);
    expect(chooseDecimals(17, null)).toBe(0);
  });

  it("write the minus as U+2212, never before a zero, and part thousands", () => {
    expect(formatNumber(-0.04, 2)).toBe("\u22120.04");
    expect(formatNumber(-0.001, 2)).toBe("0.00");
    expect(formatNumber(48211907, 0)).toBe("48\u2009211\u2009907");
    expect(formatNumber(1100, 1)).toBe("1100.0");
  });

  it("name what is no number", () => {
    expect(formatNumber(Number.NaN, 2)).toBe("not a number");
    expect(formatNumber(Number.NEGATIVE_INFINITY, 2)).toBe("\u2212∞");
    expect(formatNumber(-1.5e-9, 2)).toBe("\u22121.5000e\u22129");
  });

  it("write ranges with their unit", () => {
    expect(formatRange({ low: -20, high: 90 }, "°C")).toBe("\u221220 … 90 °C");
    expect(formatBound(0.25)).toBe("0.25");
  });

  it("count ages from tenths of a second to hours", () => {
    expect([400, 12_300, 192_000, 7_500_000, -50].map(formatAge)).toEqual(["0.4 s", "12 s", "3 min 12 s", "2 h 05 min", "0.0 s"]);
  });
});
