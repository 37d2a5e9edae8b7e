import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { countRegisters, decodeRegisters, encodeRegisters } from "~/domain/mapping/decode-registers";
import { octetOrders, registerTypes } from "~/domain/mapping/mapping";

describe("decodeRegisters", () => {
  /** 123.456 as IEEE 754 single is 42 F6 E9 79 (computed independently with Python's struct.pack(">f", 123.456)). */
  test.each([
    [[0x42f6, 0xe979], "ABCD"],
    [[0xe979, 0x42f6], "CDAB"],
    [[0xf642, 0x79e9], "BADC"],
    [[0x79e9, 0xf642], "DCBA"],
  ] as const)("123.456 in %j is %s", (words, order) => {
    expect(decodeRegisters(words, "Float32", order)).toBe(Math.fround(123.456));
  });

  test("Int32 FF FE 12 34 is −126412", () => {
    expect(decodeRegisters([0xfffe, 0x1234], "Int32")).toBe(-126412);
    expect(decodeRegisters([0xffff], "Int16")).toBe(-1);
    expect(decodeRegisters([0xffff, 0xffff, 0xffff, 0xffff], "UInt64")).toBe(18446744073709551615n);
  });

  test("gives back what was encoded, for every type and order", () => {
    const valueOf = (type: (typeof registerTypes)[number]) =>
      type.endsWith("64") && type !== "Float64"
        ? fc.bigInt({ min: 0n, max: 2n ** 63n - 1n })
        : type.startsWith("Float")
          ? fc.float({ noNaN: true })
          : fc.integer({ min: 0, max: 0x7fff });
    fc.assert(
      fc.property(
        fc.constantFrom(...registerTypes).chain((type) => fc.tuple(fc.constant(type), valueOf(type), fc.constantFrom(...octetOrders))),
        ([type, value, order]) => {
          const words = encodeRegisters(value, type, order);
          expect(words).toHaveLength(countRegisters(type));
          expect(decodeRegisters(words, type, order)).toBe(value);
        },
      ),
    );
  });

  test("refuses another number of registers", () => {
    expect(() => decodeRegisters([1], "Int32")).toThrow(RangeError);
  });
});
