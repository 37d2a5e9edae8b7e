import { describe, expect, it } from "vitest";
import { readCsv } from "~/utils/read-csv";

function rowsOf(text: string): (readonly string[])[] {
  const table = readCsv(text);
  return table.ok ? table.value.rows.map((row) => row.fields) : [];
}

describe("readCsv", () => {
  it.each([
    ["comma", "a,b\n1,2"],
    ["semicolon", "a;b\r\n1;2\r\n"],
    ["tab, as spreadsheets copy", "\uFEFFa\tb\n1\t2"],
  ])("reads fields parted by %s", (_name, text) => {
    expect(rowsOf(text)).toEqual([
      ["a", "b"],
      ["1", "2"],
    ]);
  });

  it("keeps delimiters, doubled quotes and line breaks inside quotes (RFC 4180 §2)", () => {
    expect(rowsOf('a,b\n"x, ""y""\nz",2')).toEqual([
      ["a", "b"],
      ['x, "y"\nz', "2"],
    ]);
  });

  it("leaves out empty rows and tells the line on which a row starts", () => {
    const table = readCsv("a,b\n\n\n1,2\n");
    expect(table.ok && table.value.rows.map((row) => row.line)).toEqual([1, 4]);
  });

  it("names the line of a quotation mark that is never closed", () => {
    const table = readCsv('a,b\n1,"2');
    expect(!table.ok && table.problems[0]).toMatchObject({ code: "signal-list.open-quote", at: { line: 2 } });
  });

  it("refuses an empty and an endless list", () => {
    expect(readCsv(" \n ").ok).toBe(false);
    expect(readCsv("a\n".repeat(6000)).ok).toBe(false);
  });
});
