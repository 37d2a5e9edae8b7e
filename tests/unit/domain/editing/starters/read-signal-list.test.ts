import { describe, expect, it } from "vitest";
import { StandardDataType as D } from "~/domain/address-space/standard-ids";
import { getValue } from "~/domain/core/result";
import { readCsv } from "~/utils/read-csv";
import {
  guessColumns,
  readSignalList,
  toBrowseName,
  type SignalList,
} from "~/domain/editing/starters/read-signal-list";

function read(text: string): SignalList {
  const table = getValue(readCsv(text));
  return readSignalList(table, guessColumns(table.rows[0]?.fields ?? []));
}

describe("guessColumns", () => {
  it("knows heads in English and German, and takes the exact ones first", () => {
    expect(guessColumns(["Group", "Signal", "Data type", "Unit", "Min", "Max", "Comment"])).toEqual({
      group: 0,
      name: 1,
      dataType: 2,
      unit: 3,
      low: 4,
      high: 5,
      description: 6,
    });
    expect(guessColumns(["Bezeichnung", "Datentyp", "Einheit", "von", "bis", "Baugruppe"])).toEqual({
      name: 0,
      dataType: 1,
      unit: 2,
      low: 3,
      high: 4,
      group: 5,
    });
    expect(guessColumns(["Signal number", "Name"])).toMatchObject({ name: 1 });
  });
});

describe("readSignalList", () => {
  it("reads a row with everything", () => {
    const { signals, problems } = read(
      "Group;Name;Type;Unit;Low;High;Description;Access\nProcess;creel distance;REAL;mm;0;400,5;Sensor to yarn;RW",
    );
    expect(problems).toEqual([]);
    expect(signals).toMatchObject([
      {
        line: 2,
        name: "CreelDistance",
        title: "creel distance",
        group: "Process",
        dataType: D.Float,
        range: { low: 0, high: 400.5 },
        description: "Sensor to yarn",
        isOptional: false,
        isWritable: true,
      },
    ]);
    // UN/CEFACT Rec. 20: millimetre is MMT, unit id 5066068 by OPC 10000-8 §5.6.3.4.
    expect(signals[0]?.unit).toMatchObject({ code: "MMT", unitId: 5066068 });
  });

  // Codes: UN/CEFACT Recommendation 20.
  it.each([
    ["°C", "CEL"],
    ["degree Celsius", "CEL"],
    ["[mm/s]", "C16"],
    ["rpm", "RPM"],
    ["%", "P1"],
    ["kWh", "KWH"],
    ["KWT", "KWT"],
    ["V", "VLT"],
  ])("recognises the unit %s", (text, code) => {
    expect(read(`name,unit\nX,${text}`).signals[0]?.unit?.code).toBe(code);
  });

  it("tells what it does not understand and takes the row without it", () => {
    const { signals, problems } = read("name,type,unit,low,high\nA,blob,furlongs,9,1");
    expect(signals).toMatchObject([{ name: "A", dataType: D.String, unit: undefined, range: undefined }]);
    expect(problems.map((p) => [p.code, p.at?.line])).toEqual([
      ["signal-list.unknown-unit", 2],
      ["signal-list.range", 2],
      ["signal-list.unknown-data-type", 2],
    ]);
  });

  it("leaves out rows without a name and names that stand twice in their group", () => {
    const { signals, problems } = read("group,name\nP,A\nP,\nP,A\nQ,A");
    expect(signals.map((signal) => `${signal.group}/${signal.name}`)).toEqual(["P/A", "Q/A"]);
    expect(problems.map((p) => p.code)).toEqual(["signal-list.no-name", "signal-list.name-twice"]);
  });

  it("gives a text no unit", () => {
    const { signals, problems } = read("name,type,unit\nOrder,STRING[20],mm");
    expect(signals[0]).toMatchObject({ dataType: D.String, unit: undefined });
    expect(problems.map((p) => p.code)).toEqual(["signal-list.not-numeric"]);
  });

  it("asks for the column of names", () => {
    expect(read("x,y\n1,2").problems.map((p) => p.code)).toEqual(["signal-list.no-name-column"]);
  });
});

describe("toBrowseName", () => {
  it("joins words and keeps letters of all languages", () => {
    expect(toBrowseName("Getriebe-Temperatur (öl) 2")).toBe("GetriebeTemperaturÖl2");
  });
});
