/**
 * Text tables: comma, semicolon or tab between fields, chosen by the first line; quoted fields as RFC 4180 writes them. What
 * a spreadsheet puts on the clipboard is such a table with tabs.
 */
import { fail, ok, problem, type Result } from "../../core/result";

export const MAX_ROWS = 5_000;
const MAX_CHARACTERS = 2_000_000;

export type TextTable = {
  readonly delimiter: string;
  /** Rows with the line on which each starts (1-based); empty rows are left out. */
  readonly rows: readonly { readonly line: number; readonly fields: readonly string[] }[];
};

/** Problems: `signal-list.empty`, `signal-list.too-long`, `signal-list.open-quote` with its line. */
export function readDelimited(text: string): Result<TextTable> {
  if (text.length > MAX_CHARACTERS) return fail(problem("signal-list.too-long", { limit: MAX_ROWS }));
  const source = text.replace(/^\uFEFF/, "");
  const delimiter = chooseDelimiter(source.slice(0, source.search(/\r|\n|$/)));
  const rows: { line: number; fields: string[] }[] = [];
  let fields: string[] = [];
  let field = "";
  let line = 1;
  let startLine = 1;
  let quoteLine = 0;
  const endRow = (): void => {
    fields.push(field.trim());
    if (fields.some((f) => f !== "")) rows.push({ line: startLine, fields });
    fields = [];
    field = "";
    startLine = line;
  };
  for (let i = 0; i < source.length; i++) {
    const c = source[i] as string;
    if (c === "\n") line++;
    if (quoteLine > 0) {
      if (c !== '"') field += c;
      else if (source[i + 1] === '"') field += source[++i];
      else quoteLine = 0;
    } else if (c === '"' && field.trim() === "") {
      quoteLine = line;
      field = "";
    } else if (c === delimiter) {
      fields.push(field.trim());
      field = "";
    } else if (c === "\n") endRow();
    else if (c !== "\r") field += c;
    if (rows.length > MAX_ROWS) return fail(problem("signal-list.too-long", { limit: MAX_ROWS }));
  }
  if (quoteLine > 0) return fail(problem("signal-list.open-quote", {}, { line: quoteLine }));
  endRow();
  return rows.length === 0 ? fail(problem("signal-list.empty")) : ok({ delimiter, rows });
}

/** The one that occurs most in the head; a tab wins, since names hold none. */
function chooseDelimiter(head: string): string {
  if (head.includes("\t")) return "\t";
  const count = (c: string) => head.split(c).length - 1;
  return count(";") > count(",") ? ";" : ",";
}
