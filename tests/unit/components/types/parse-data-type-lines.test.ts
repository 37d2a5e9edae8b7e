import { describe, expect, it } from "vitest";
import { parseBitLines, parseFieldLines } from "~/components/types/parse-data-type-lines";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import type { NodeKey } from "~/domain/address-space/node-id";

const findType = (name: string): NodeKey | undefined => StandardDataType[name as keyof typeof StandardDataType];

describe("fields written one a line", () => {
  it("have a name, a DataType, dimensions and a question mark when they may be left out", () => {
    const { items, reasons } = parseFieldLines(
      "Speed Double\n\nNames: String[]\nLabel? LocalizedText\nGrid Int32[2, 3]\nJust a name",
      findType,
    );
    expect(items).toEqual([
      { name: "Speed", dataType: StandardDataType.Double },
      { name: "Names", dataType: StandardDataType.String, valueRank: 1, arrayDimensions: [0] },
      { name: "Label", dataType: StandardDataType.LocalizedText, isOptional: true },
      { name: "Grid", dataType: StandardDataType.Int32, valueRank: 2, arrayDimensions: [2, 3] },
    ]);
    expect(reasons).toEqual(["Just a: no DataType is called “name”."]);
  });

  it("are texts when they say no DataType", () => {
    expect(parseFieldLines("Comment\nNote?", findType).items).toEqual([
      { name: "Comment", dataType: StandardDataType.String },
      { name: "Note", dataType: StandardDataType.String, isOptional: true },
    ]);
  });

  it("as bits count on from the last number", () => {
    expect(parseBitLines("Warm\nWet\n4 Worn\nLoud").items).toEqual([
      { name: "Warm", bit: 0 },
      { name: "Wet", bit: 1 },
      { name: "Worn", bit: 4 },
      { name: "Loud", bit: 5 },
    ]);
  });
});
