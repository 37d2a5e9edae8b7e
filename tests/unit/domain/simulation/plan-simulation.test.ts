/** Expected motions follow from the winch's file as a person reads it: its ranges, states and names. */
import { describe, expect, it } from "vitest";
import { planWinch, WINCH_URI } from "../../../support/winch-server";

const plan = planWinch();
const find = (local: string) => {
  const entry = plan.find(({ nodeId }) => nodeId === `nsu=${WINCH_URI};${local}`);
  if (!entry) throw new Error(`${local} is not planned`);
  return entry;
};

describe("the plan of a simulation", () => {
  it("moves analog items inside their EURange", () => {
    const { motion, builtInType } = find("i=6100");
    expect(builtInType).toBe("Float");
    expect(["sine", "ramp"]).toContain(motion.kind);
    expect(motion).toMatchObject({ low: -13, high: 113 });
  });

  it("steps through the states of an enumeration, of a multi-state item and of a truth value", () => {
    expect(find("i=6110").motion).toMatchObject({ kind: "steps", values: [0, 1, 4] });
    expect(find("i=6120").motion).toMatchObject({ kind: "steps", values: [0, 11, 31] });
    expect(find("i=6140").motion).toMatchObject({ kind: "steps", values: [0, 1] });
  });

  it("counts what is a counter, up to the end of its data type", () => {
    expect(find("i=6130").motion).toMatchObject({ kind: "count", last: 4294967295 });
    expect(find("i=6180").motion).toMatchObject({ kind: "count" });
  });

  it("holds what nothing moves: numbers that name something, texts, structures, Properties", () => {
    for (const local of ["i=6150", "i=6170", "i=6190", "i=6101", "s=Rope;Length=1"]) expect(find(local).motion, local).toEqual({ kind: "static" });
    expect(find("i=6190")).toMatchObject({ isProperty: true, hasValue: false });
    expect(find("i=6191")).toMatchObject({ isProperty: true, hasValue: true });
  });

  it("takes the lengths of arrays from ArrayDimensions", () => {
    expect(find("i=6160").dimensions).toEqual([3]);
    expect(find("i=6100").dimensions).toEqual([]);
  });

  it("leaves instance declarations of types and their Properties alone", () => {
    expect(plan.map(({ nodeId }) => nodeId)).not.toContain(`nsu=${WINCH_URI};i=6010`);
    expect(plan.map(({ nodeId }) => nodeId)).not.toContain(`nsu=${WINCH_URI};i=6001`);
  });

  it("is the same every time", () => {
    expect(JSON.stringify(planWinch())).toBe(JSON.stringify(plan));
  });
});
