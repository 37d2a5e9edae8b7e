/** Blocks of cells as spreadsheets put them on the clipboard: tabs between cells, quotes around cells that hold one. Pure. */
import Papa from "papaparse";

/** The rows of a block; the line break that spreadsheets leave at its end makes no row. */
export function parseBlock(text: string): string[][] {
  if (text === "") return [];
  return Papa.parse<string[]>(text.replace(/\r?\n$/, ""), { delimiter: "\t" }).data;
}

export function formatBlock(rows: readonly (readonly string[])[]): string {
  return Papa.unparse(rows.map((row) => [...row]), { delimiter: "\t", newline: "\n" });
}
