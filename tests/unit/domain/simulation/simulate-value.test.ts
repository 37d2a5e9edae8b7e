import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { fitToType, simulateNumber } from "~/domain/simulation/simulate-value";

const seconds = fc.double({ min: 0, max: 4e9, noNaN: true });
const phase = fc.double({ min: 0, max: 1, noNaN: true });

describe("a simulated number", () => {
  it("stays between low and high for sine, ramp and rise", () => {
    fc.assert(
      fc.property(seconds, phase, fc.double({ min: -1e6, max: 1e6, noNaN: true }), fc.double({ min: 0.001, max: 1e6, noNaN: true }), (t, p, low, span) => {
        const high = low + span;
        for (const kind of ["sine", "ramp"] as const) {
          const value = simulateNumber({ kind, low, high, period: 60, phase: p }, t);
          expect(value).toBeGreaterThanOrEqual(low - span * 1e-9);
          expect(value).toBeLessThanOrEqual(high + span * 1e-9);
        }
        const risen = simulateNumber({ kind: "rise", low, high, perSecond: span / 100, phase: p }, t);
        expect(risen).toBeGreaterThanOrEqual(low);
        expect(risen).toBeLessThanOrEqual(high);
      }),
    );
  });

  it("passes the known points of a sine and of a straight line", () => {
    const sine = { kind: "sine", low: 0, high: 10, period: 40, phase: 0 } as const;
    expect([0, 10, 20, 30].map((t) => simulateNumber(sine, t)).map((v) => Math.round(v * 1e9) / 1e9)).toEqual([5, 10, 5, 0]);
    const ramp = { kind: "ramp", low: 0, high: 10, period: 40, phase: 0 } as const;
    expect([0, 10, 20, 30, 40].map((t) => simulateNumber(ramp, t))).toEqual([0, 5, 10, 5, 0]);
  });

  it("shows every state for the same time, in order", () => {
    const steps = { kind: "steps", values: [0, 11, 31], secondsEach: 5, phase: 0 } as const;
    expect([0, 4.9, 5, 10, 14.9, 15].map((t) => simulateNumber(steps, t))).toEqual([0, 0, 11, 31, 31, 0]);
  });

  it("counts up and wraps to 0 after the last value", () => {
    const count = { kind: "count", start: 253, perSecond: 1, last: 255 } as const;
    expect([0, 1, 2, 3, 4].map((t) => simulateNumber(count, t))).toEqual([253, 254, 255, 0, 1]);
  });

  it("is the same for the same time, and moves elements of an array apart", () => {
    const sine = { kind: "sine", low: 0, high: 10, period: 40, phase: 0.3 } as const;
    expect(simulateNumber(sine, 1234.5)).toBe(simulateNumber(sine, 1234.5));
    expect(simulateNumber(sine, 1234.5, 0.25)).not.toBe(simulateNumber(sine, 1234.5));
  });
});

describe("fitting to a data type (ranges of OPC 10000-6 Table 1)", () => {
  it("rounds and bounds integers, and gives Float its precision", () => {
    expect(fitToType(-3.6, "UInt16")).toBe(0);
    expect(fitToType(70000, "UInt16")).toBe(65535);
    expect(fitToType(-128.7, "SByte")).toBe(-128);
    expect(fitToType(2.5, "Int32")).toBe(3);
    expect(fitToType(0.1, "Float")).toBe(Math.fround(0.1));
    expect(fitToType(0.1, "Double")).toBe(0.1);
  });
});
