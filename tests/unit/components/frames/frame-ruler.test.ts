import { describe, expect, it } from "vitest";
import { viewFrame } from "~/components/frames/frame-fields";
import { chooseOctetsPerRow, layOutFrame, listBits, placeTags } from "~/components/frames/lay-out-frame";
import { readFields } from "~/components/frames/read-fields";
import type { ProcessDataImage } from "~/domain/iodd/device-description";

const plain = { singleValues: [], ranges: [] };

/** Layout of the process data of the IO-Link Community's example device 17 (release 2021-12-15). */
const example17: ProcessDataImage = {
  id: "PI",
  bitLength: 32,
  type: {
    kind: "RecordT",
    bitLength: 32,
    items: [
      {
        subindex: 1,
        bitOffset: 16,
        type: { kind: "IntegerT", bitLength: 16, ...plain, ranges: [{ lower: -1000, upper: 4000 }] },
        name: { en: "Distance" },
      },
      { subindex: 2, bitOffset: 8, type: { kind: "IntegerT", bitLength: 8, ...plain }, name: { en: "Temperature" } },
      { subindex: 3, bitOffset: 0, type: { kind: "BooleanT", ...plain }, name: { en: "Sig1" } },
      { subindex: 4, bitOffset: 1, type: { kind: "BooleanT", ...plain }, name: { en: "Sig2" } },
    ],
  },
  info: { 1: { gradient: 0.01, unitCode: 1010 }, 2: { unitCode: 1001 } },
};

describe("the fields of a frame", () => {
  const view = viewFrame(example17);

  it("stand in the order of transmission with places in words", () => {
    expect(view.fields.map((f) => [f.name, f.typeText, f.bitText, f.octetText, f.scaleText, f.rangeText])).toEqual([
      ["Distance", "Int16", "31 … 16", "octets 0 … 1", "× 0.01", "−10 … 40"],
      ["Temperature", "Int8", "15 … 8", "octet 2", "", ""],
      ["Sig2", "Boolean", "1", "octet 3", "", ""],
      ["Sig1", "Boolean", "0", "octet 3", "", ""],
    ]);
  });

  it("show what pasted octets say", () => {
    // 04 D2 = 1234 × 0.01 m; 0x17 = 23 °C; octet 3 = 01: Sig1 high, Sig2 low. FF 38 = −200, E7 = −25 (two's complement).
    const read = (octets: number[]) => {
      const result = readFields(view, Uint8Array.from(octets));
      return result.ok
        ? [1, 2, 3, 4].map((subindex) => result.readings.get(subindex)?.value)
        : result.problems.map((p) => p.code);
    };
    expect(read([0x04, 0xd2, 0x17, 0x01])).toEqual(["12.34", "23", "true", "false"]);
    expect(read([0xff, 0x38, 0xe7, 0x02])).toEqual(["−2.00", "−25", "false", "true"]);
    expect(read([0x04, 0xd2])).toEqual(["decode.length"]);
  });
});

describe("the ruler", () => {
  it("draws each bit at its place as transmitted, and says what nothing describes", () => {
    const { rows, spans } = layOutFrame(4, viewFrame(example17).fields, 4);
    expect(rows).toEqual([{ octets: [0, 1, 2, 3], bits: 32, lanes: 1 }]);
    expect(spans.map(({ field, from, to }) => [field, from, to])).toEqual([
      [0, 0, 16],
      [1, 16, 24],
      [2, 30, 31],
      [3, 31, 32],
      [undefined, 24, 30],
    ]);
  });

  it("goes on in the next row where a field crosses its end", () => {
    const { rows, spans } = layOutFrame(4, [{ bitOffset: 4, bitLength: 24 }], 2);
    expect(rows.map((row) => row.octets)).toEqual([
      [0, 1],
      [2, 3],
    ]);
    expect(spans.filter((span) => span.field === 0)).toMatchObject([
      { row: 0, from: 4, to: 16, begins: true, ends: false },
      { row: 1, from: 0, to: 12, begins: false, ends: true },
    ]);
  });

  it("lays overlapping fields below each other, the longer above", () => {
    const { rows, spans } = layOutFrame(
      1,
      [
        { bitOffset: 3, bitLength: 1 },
        { bitOffset: 0, bitLength: 8 },
      ],
      1,
    );
    expect(rows[0]?.lanes).toBe(2);
    expect(spans.map((span) => [span.field, span.lane])).toEqual([
      [0, 1],
      [1, 0],
    ]);
  });

  it("fills its rows evenly", () => {
    expect(chooseOctetsPerRow(12, 1_100, 11)).toBe(12);
    expect(chooseOctetsPerRow(12, 900, 11)).toBe(6);
    expect(chooseOctetsPerRow(32, 1_100, 11)).toBe(11);
    expect(chooseOctetsPerRow(0, 1_100, 11)).toBe(1);
  });

  it("hangs names beside narrow spans so that no line runs through one", () => {
    const { placed, lanes } = placeTags(
      [
        { id: 0, anchor: 280, width: 80 },
        { id: 1, anchor: 290, width: 60 },
        { id: 2, anchor: 20, width: 40 },
      ],
      300,
    );
    expect(lanes).toBe(2);
    // Left of its line, the leftmost highest; at the left edge right of its line.
    expect(placed.map(({ id, left, lane }) => [id, left, lane])).toEqual([
      [0, 196, 0],
      [1, 226, 1],
      [2, 24, 0],
    ]);
    const meets = placed.some((tag) =>
      placed.some(
        (other) =>
          other.id !== tag.id &&
          other.lane < tag.lane &&
          tag.anchor > other.left &&
          tag.anchor < other.left + other.width,
      ),
    );
    expect(meets).toBe(false);
  });

  it("writes the highest bit of an octet first", () => {
    expect(listBits(Uint8Array.of(0x0a, 0x5b)).join("")).toBe("0000101001011011");
  });
});
