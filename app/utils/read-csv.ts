/**
 * Text tables: comma, semicolon or tab between fields, chosen by the first line; quoted fields as RFC 4180 writes them. What
 * a spreadsheet puts on the clipboard is such a table with tabs.
 */
import Papa from "papaparse";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { MAX_ROWS, type TextTable } from "../domain/editing/starters/text-table";

const MAX_CHARACTERS = 2_000_000;

/** Problems: `signal-list.empty`, `signal-list.too-long`, `signal-list.open-quote` with its line. */
export function readCsv(text: string): Result<TextTable> {
  if (text.length > MAX_CHARACTERS) return fail(problem("signal-list.too-long", { limit: MAX_ROWS }));
  const source = text.replace(/^\uFEFF/, "");
  const rows: { line: number; fields: string[] }[] = [];
  let openQuote: number | undefined;
  let line = 1;
  let read = 0;
  Papa.parse<string[]>(source, {
    delimiter: chooseDelimiter(source.slice(0, source.search(/\r|\n|$/))),
    step: ({ data, errors, meta }, parser) => {
      const fields = data.map((field) => field.trim());
      if (fields.some((field) => field !== "")) rows.push({ line, fields });
      if (errors.some((error) => error.code === "MissingQuotes")) openQuote ??= line;
      line += countBreaks(source, read, meta.cursor);
      read = meta.cursor;
      if (rows.length > MAX_ROWS) parser.abort();
    },
  });
  if (openQuote !== undefined) return fail(problem("signal-list.open-quote", {}, { line: openQuote }));
  if (rows.length > MAX_ROWS) return fail(problem("signal-list.too-long", { limit: MAX_ROWS }));
  return rows.length === 0 ? fail(problem("signal-list.empty")) : ok({ rows });
}

/** Breaks as LF, CR LF or CR alone. */
function countBreaks(text: string, from: number, to: number): number {
  return text.slice(from, to).match(/\r\n|\n|\r/g)?.length ?? 0;
}

/** The one that occurs most in the head; a tab wins, since names hold none. */
function chooseDelimiter(head: string): string {
  if (head.includes("\t")) return "\t";
  const count = (c: string) => head.split(c).length - 1;
  return count(";") > count(",") ? ";" : ",";
}
