import { describe, expect, it } from "vitest";
import { hasByteBit, listUnnamedBits, withBit, withByteBit } from "~/components/values/option-bits";
import { fillFromTexts } from "~/components/values/paste-items";
import { listShapes, listTypesFor, withShape, withType } from "~/components/values/shapes";
import {
  finishDraft,
  listReasons,
  resizeMatrix,
  toFlat,
  toIndices,
  unfinished,
  withMoved,
  type Draft,
} from "~/components/values/value-draft";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { standardKey } from "~/domain/address-space/node-id";

describe("a draft", () => {
  it("is a value when nothing in it is unfinished, however deep", () => {
    const inner: Draft = { type: "Double", shape: "array", values: [1, unfinished("x", "no number")] };
    const draft: Draft = {
      type: "ExtensionObject",
      shape: "scalar",
      value: { kind: "structure", dataType: standardKey(884), fields: { Low: inner } },
    };
    expect(listReasons(draft)).toEqual(["no number"]);
    expect(finishDraft(draft)).toBeUndefined();
    const whole: Draft = { type: "Double", shape: "array", values: [1, 2] };
    expect(finishDraft(whole)).toBe(whole);
  });

  it("moves rows inside the list only", () => {
    expect(withMoved(["a", "b", "c"], 2, -1)).toEqual(["a", "c", "b"]);
    expect(withMoved(["a", "b", "c"], 0, -1)).toEqual(["a", "b", "c"]);
  });

  it("keeps what stays inside a matrix of another size; the last index runs fastest", () => {
    // OPC 10000-6 §5.3.1.17: [2,3] is written 1 2 3, 4 5 6.
    expect(resizeMatrix([1, 2, 3, 4, 5, 6], [2, 3], [3, 2], () => 0)).toEqual([1, 2, 4, 5, 0, 0]);
    expect(toIndices(5, [2, 3])).toEqual([1, 2]);
    expect(toFlat([1, 2], [2, 3])).toBe(5);
  });

  it("takes its shapes from the ValueRank", () => {
    // OPC 10000-3 §5.6.2.
    expect(listShapes(-1)).toEqual(["scalar"]);
    expect(listShapes(-3)).toEqual(["scalar", "array"]);
    expect(listShapes(0)).toEqual(["array", "matrix"]);
    expect(listShapes(2)).toEqual(["matrix"]);
    expect(listShapes(-1, StandardDataType.BaseDataType)).toHaveLength(3);
    expect(listTypesFor(StandardDataType.UInteger, "Variant")).toEqual(["Byte", "UInt16", "UInt32", "UInt64"]);
  });

  it("keeps its items through another shape and another type", () => {
    const list = withShape({ type: "Int32", shape: "scalar", value: 7 }, "array", () => 0);
    expect(list).toEqual({ type: "Int32", shape: "array", values: [7] });
    expect(withType(list, "String", () => "")).toEqual({ type: "String", shape: "array", values: ["7"] });
    expect(withType({ type: "Int32", shape: "scalar", value: 300 }, "Byte", () => 0)).toMatchObject({ value: 0 });
  });

  it("is filled from cells of a spreadsheet, also field by field", () => {
    expect(fillFromTexts("Double", 0, [" 2,5 "])).toBe(2.5);
    const range = {
      kind: "structure" as const,
      dataType: standardKey(884),
      fields: {
        Low: { type: "Double", shape: "scalar", value: 0 },
        High: { type: "Double", shape: "scalar", value: 1 },
      } satisfies Record<string, Draft>,
    };
    expect(fillFromTexts("ExtensionObject", range, ["-5", "400"])).toMatchObject({
      fields: { Low: { value: -5 }, High: { value: 400 } },
    });
  });
});

describe("bits of option sets", () => {
  it("are set in numbers of any size without touching others", () => {
    expect(withBit(0b101, 1, true)).toBe(0b111);
    expect(withBit(1n << 63n, 0, true)).toBe((1n << 63n) | 1n);
    expect(listUnnamedBits(0b1001, [{ bit: 0, name: "A", description: "" }])).toEqual([3]);
  });

  it("are set in bytes, the lowest first", () => {
    // OPC 10000-3 §8.40: bit 9 is bit 1 of the second byte; bytes 00 02 in base64 are AAI=.
    expect(withByteBit(null, 9, true)).toBe("AAI=");
    expect(hasByteBit("AAI=", 9)).toBe(true);
    expect(hasByteBit("AAI=", 8)).toBe(false);
  });
});
