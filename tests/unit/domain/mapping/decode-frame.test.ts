import { readFileSync } from "node:fs";
import fc from "fast-check";
import { describe, expect, test } from "vitest";
import type { ProcessDataImage, RecordItem } from "../../../../app/domain/iodd/device-description";
import { readIodd } from "../../../../app/domain/iodd/read-iodd";
import {
  formatHex,
  parseHex,
  readBigSigned,
  readBigUnsigned,
  writeBits,
  makeSignedReader,
  makeUnsignedReader,
} from "../../../../app/domain/mapping/bits";
import { chooseLayout } from "../../../../app/domain/mapping/choose-layout";
import { decodeFrame, planFrame, type FramePlan } from "../../../../app/domain/mapping/decode-frame";
import { encodeFrame } from "../../../../app/domain/mapping/encode-frame";
import { reportFrame, type FieldReport } from "../../../../app/domain/mapping/report-frame";
import { makeScaler } from "../../../../app/domain/mapping/scale";

type Items = readonly (readonly [offset: number, type: RecordItem["type"]["kind"], bits: number])[];

function imageOf(bitLength: number, items: Items, info: ProcessDataImage["info"] = {}): ProcessDataImage {
  const typeOf = (kind: RecordItem["type"]["kind"], bits: number): RecordItem["type"] =>
    kind === "UIntegerT" || kind === "IntegerT"
      ? { kind, bitLength: bits, singleValues: [], ranges: [] }
      : kind === "Float32T" || kind === "BooleanT"
        ? { kind, singleValues: [], ranges: [] }
        : { kind: "OctetStringT", fixedLength: bits / 8 };
  return {
    id: "PI",
    bitLength,
    type: {
      kind: "RecordT",
      bitLength,
      items: items.map(([bitOffset, kind, bits], i) => ({ subindex: i + 1, bitOffset, type: typeOf(kind, bits) })),
    },
    info,
  };
}

function decode(plan: FramePlan, hex: string): FieldReport[] {
  const result = decodeFrame(plan, parseHex(hex) ?? new Uint8Array());
  if (!result.ok) throw new Error(JSON.stringify(result.problems));
  return reportFrame(plan, result.value);
}

function planOf(product: string, direction: "in" | "out"): FramePlan {
  const text = readFileSync(`nodesets/demo/iodd/Quillon-${product}-20261102-IODD1.1.xml`, "utf8");
  const device = readIodd(text);
  if (!device.ok) throw new Error("unreadable");
  const image = chooseLayout(device.value, direction);
  if (!image.ok) throw new Error("no layout");
  return planFrame(image.value, { profileCharacteristic: device.value.profileCharacteristic });
}

/**
 * Layout of the Community's example device 17 (32 bit: Int16@16 gradient 0.01 m, Int8@8 °C, Bool@0, Bool@1) and the
 * rule "bit offset 0 is the lowest bit of the last octet"; expected values worked out by hand from that rule.
 */
describe("decodeFrame on layouts worked out by hand", () => {
  const example17 = planFrame(
    imageOf(
      32,
      [
        [16, "IntegerT", 16],
        [8, "IntegerT", 8],
        [0, "BooleanT", 1],
        [1, "BooleanT", 1],
      ],
      { 1: { gradient: 0.01, unitCode: 1010 }, 2: { unitCode: 1001 } },
    ),
  );

  test.each([
    ["04 D2 17 01", [12.34, 23, true, false]],
    ["FF 38 E7 02", [-2, -25, false, true]],
  ])("%s of the published example 17", (hex, values) => {
    expect(decode(example17, hex).map((f) => f.value)).toEqual(values);
  });

  test.each([
    [
      "0A 5B",
      16,
      [
        [2, "IntegerT", 14],
        [1, "BooleanT", 1],
        [0, "BooleanT", 1],
      ],
      [662, true, true],
    ],
    [
      "F6",
      8,
      [
        [4, "IntegerT", 4],
        [0, "UIntegerT", 4],
      ],
      [-1, 6],
    ],
    [
      "41 BC 00 00 05",
      40,
      [
        [8, "Float32T", 32],
        [0, "UIntegerT", 8],
      ],
      [23.5, 5],
    ],
    ["FF FE 12 34", 32, [[0, "IntegerT", 32]], [-126412]],
    ["42 F6 E9 79", 32, [[0, "Float32T", 32]], [123.45600128173828]],
  ] satisfies [string, number, Items, (number | boolean)[]][])("%s", (hex, bits, items, values) => {
    expect(decode(planFrame(imageOf(bits, items)), hex).map((f) => f.value)).toEqual(values);
  });

  test("keeps integers above 53 bits as text", () => {
    const [field] = decode(planFrame(imageOf(64, [[0, "UIntegerT", 64]])), "FF FF FF FF FF FF FF FF");
    expect(field?.value).toBe("18446744073709551615");
  });

  test("refuses a frame that is shorter or longer than described", () => {
    expect(decodeFrame(example17, Uint8Array.of(1, 2, 3))).toMatchObject({
      ok: false,
      problems: [{ code: "decode.length" }],
    });
    expect(decodeFrame(example17, new Uint8Array(5)).ok).toBe(false);
  });
});

/** Layouts of scenario.md; status codes of OPC 10000-4 §7.38.2, numbers worked out by hand. */
describe("the demo's sensors", () => {
  test("distance: 2345 × 0.1 mm", () => {
    const fields = decode(planOf("QS-U30", "in"), "09 29 FC 01");
    expect(fields.map((f) => [f.id, f.value, f.status])).toEqual([
      ["Distance", 234.5, "Good"],
      ["Scale", -4, "Good"],
      ["SSC1", true, "Good"],
      ["SSC2", false, "Good"],
    ]);
    expect(fields[0]?.unit).toEqual({ code: "MMT", unitId: 5066068, symbol: "mm" });
  });

  test.each([
    ["7F FC FC 03", "0x808C0000", "No measurement data"],
    ["7F F8 FC 00", "0x808C0600", "Out of range (+)"],
    ["80 08 FC 00", "0x808C0500", "Out of range (-)"],
  ])("%s is no measurement", (hex, quality, text) => {
    expect(decode(planOf("QS-U30", "in"), hex)[0]).toMatchObject({ value: null, quality, text });
  });

  test("a value beyond the described range is uncertain and says on which side", () => {
    expect(decode(planOf("QS-U30", "in"), "0F A1 FC 00")[0]).toMatchObject({ value: 400.1, quality: "0x40940600" });
    expect(decode(planOf("QS-U30", "in"), "FF FF FC 00")[0]).toMatchObject({ value: -0.1, quality: "0x40940500" });
  });

  test("condition monitor: twelve octets", () => {
    // vibration 231 = 0x00E7, temperature 642 = 0x0282, humidity 97 = 0x61, pressure 10132 = 0x2794, alarms 0b0101
    const fields = decode(planOf("QS-C04", "in"), "00 E7 02 82 61 27 94 00 00 00 00 05");
    expect(fields.slice(0, 4).map((f) => [f.value, f.unit?.code])).toEqual([
      [2.31, "C16"],
      [64.2, "CEL"],
      [48.5, "P1"],
      [1013.2, "A97"],
    ]);
    expect(fields.slice(5).map((f) => f.value)).toEqual([true, false, true, false]);
    expect(decode(planOf("QS-C04", "in"), "FF FC 02 82 61 27 94 00 00 00 00 05")[0]).toMatchObject({
      value: null,
      quality: "0x808C0000",
    });
  });

  test("stack light: the set data read back as names, and encoded again", () => {
    const plan = planOf("QS-L5", "out");
    const fields = decode(plan, "2F 40 00 00 60");
    expect(fields[0]).toMatchObject({ id: "Segment_1_colour", value: 1, text: "green" });
    expect(fields[1]).toMatchObject({ value: 3, text: "blink fast" });
    expect(fields[12]).toMatchObject({ id: "Segment_5_colour", text: "red" });
    const inputs = Object.fromEntries(fields.map((f) => [f.id, f.value as number]));
    const encoded = encodeFrame(plan, inputs);
    expect(encoded.ok ? formatHex(encoded.value) : encoded.problems).toBe("2F 40 00 00 60");
    expect(encodeFrame(plan, { Segment_1_colour: 9 })).toMatchObject({
      ok: false,
      problems: [{ code: "encode.out-of-range" }],
    });
    expect(encodeFrame(plan, { Nothing: 1 })).toMatchObject({
      ok: false,
      problems: [{ code: "encode.unknown-field" }],
    });
  });
});

describe("bits", () => {
  test("reading gives back what was written, for every width, place and sign", () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 64 }),
        fc.integer({ min: 0, max: 192 }),
        fc.bigInt({ min: 0n, max: 2n ** 64n - 1n }),
        (width, offset, value) => {
          const octets = new Uint8Array(32).fill(0xa5);
          const wanted = BigInt.asUintN(width, value);
          writeBits(octets, offset, width, wanted);
          expect(readBigUnsigned(octets, offset, width)).toBe(wanted);
          expect(readBigSigned(octets, offset, width)).toBe(BigInt.asIntN(width, value));
          if (width > 46) return;
          expect(makeUnsignedReader(32, offset, width)(octets)).toBe(Number(wanted));
          if (width > 1) expect(makeSignedReader(32, offset, width)(octets)).toBe(Number(BigInt.asIntN(width, value)));
        },
      ),
      { numRuns: 3_000 },
    );
  });

  test("agrees with DataView on whole octets (an independent reader)", () => {
    fc.assert(
      fc.property(fc.uint8Array({ minLength: 8, maxLength: 8 }), (octets) => {
        const view = new DataView(octets.buffer, octets.byteOffset, 8);
        expect(makeSignedReader(8, 48, 16)(octets)).toBe(view.getInt16(0));
        expect(makeUnsignedReader(8, 16, 32)(octets)).toBe(view.getUint32(2));
        expect(readBigSigned(octets, 0, 64)).toBe(view.getBigInt64(0));
      }),
    );
  });

  test("hexadecimal pairs", () => {
    expect(parseHex("04d2 17 01")).toEqual(Uint8Array.of(4, 210, 23, 1));
    expect(parseHex("04D")).toBeUndefined();
    expect(parseHex("zz")).toBeUndefined();
    expect(parseHex("")).toBeUndefined();
  });
});

describe("scaling", () => {
  test("is exact on decimal fractions", () => {
    expect(makeScaler({ gradient: 0.1, offset: 0 })(3)).toBe(0.3);
    expect(makeScaler({ gradient: 0.01, offset: 0 })(1234)).toBe(12.34);
    expect(makeScaler({ gradient: 0.5, offset: -40 })(97)).toBe(8.5);
    // The standard example's uptime: 90 s × 0.016666667 is 1.50000003 min.
    expect(makeScaler({ gradient: 0.016666667, offset: 0 })(90)).toBeCloseTo(1.5, 6);
  });
});
