import { describe, expect, it } from "vitest";
import { listColumns } from "~/components/register/columns";
import { formatBlock, parseBlock } from "~/components/model/cell-block";
import { listRowsBetween, moveCell } from "~/components/register/grid-state";
import type { RegisterRow } from "~/components/register/register-rows";
import type { NodeKey } from "~/domain/address-space/node-id";

const rows = ["a", "b", "c"].map((id): RegisterRow => ({ id, key: id as NodeKey, level: 1, isExpandable: false, isExpanded: false, position: 1, siblings: 3 }));

const columns = listColumns(["en", "de"]);

describe("the cursor of the register", () => {
  it("stays within the table", () => {
    expect(moveCell(rows, columns, { rowId: "a", column: "name" }, "up")).toEqual({ rowId: "a", column: "name" });
    expect(moveCell(rows, columns, { rowId: "c", column: "finding" }, "right")).toEqual({ rowId: "c", column: "finding" });
  });

  it("runs through the rows as Tab does", () => {
    expect(moveCell(rows, columns, { rowId: "a", column: "finding" }, "next")).toEqual({ rowId: "b", column: "name" });
    expect(moveCell(rows, columns, { rowId: "b", column: "name" }, "previous")).toEqual({ rowId: "a", column: "finding" });
  });

  it("selects all rows between two, in either direction", () => {
    expect(listRowsBetween(rows, "c", "a").map((row) => row.id)).toEqual(["a", "b", "c"]);
  });
});

describe("a block from a spreadsheet", () => {
  it("keeps tabs, line breaks and quotes inside quoted cells", () => {
    expect(parseBlock('mm\t"0 … 400"\r\n"a ""b""\nc"\t\r\n')).toEqual([
      ["mm", "0 … 400"],
      ['a "b"\nc', ""],
    ]);
  });

  it("comes back as it was copied", () => {
    const block = [["Speed", 'say "go"', ""], ["two\nlines", "tab\there", "x"]];
    expect(parseBlock(formatBlock(block))).toEqual(block);
  });
});
