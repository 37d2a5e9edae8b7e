/** Large tables that people upload: CSV (comma, semicolon, tab) and workbooks, within limits. */
import Papa from "papaparse";
import { readSheet } from "read-excel-file/node";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { TAG_LIMITS, type TagTable } from "../domain/mapping/read-tags";

/** Problems: `tags.too-large`, `tags.too-many`, `tags.empty`, `tags.damaged`, `tags.open-quote`. */
export async function readTable(bytes: Uint8Array, fileName: string): Promise<Result<TagTable>> {
  if (bytes.length > TAG_LIMITS.characters) return fail(problem("tags.too-large", { size: bytes.length, limit: TAG_LIMITS.characters }));
  const isWorkbook = bytes[0] === 0x50 && bytes[1] === 0x4b;
  return isWorkbook || /\.xlsx$/i.test(fileName) ? readWorkbook(bytes) : readText(new TextDecoder().decode(bytes));
}

function readText(text: string): Result<TagTable> {
  const rows: { line: number; fields: string[] }[] = [];
  let hasOpenQuote = 0;
  let line = 0;
  Papa.parse<string[]>(text.replace(/^\uFEFF/, ""), {
    skipEmptyLines: false,
    step: ({ data, errors }, parser) => {
      line++;
      if (errors.some((error) => error.code === "MissingQuotes")) hasOpenQuote ||= line;
      if (data.some((field) => field.trim() !== "")) rows.push({ line, fields: data.slice(0, TAG_LIMITS.columns) });
      if (rows.length > TAG_LIMITS.rows + 1) parser.abort();
    },
  });
  if (hasOpenQuote > 0) return fail(problem("tags.open-quote", {}, { line: hasOpenQuote }));
  return toTable(rows);
}

/** A workbook is a ZIP; the library throws on a damaged one, which becomes a value here. */
async function readWorkbook(bytes: Uint8Array): Promise<Result<TagTable>> {
  try {
    const sheet = await readSheet(Buffer.from(bytes));
    const rows = sheet.map((cells, i) => ({ line: i + 1, fields: cells.slice(0, TAG_LIMITS.columns).map((cell) => (cell === null ? "" : cell instanceof Date ? cell.toISOString() : String(cell))) }));
    return toTable(rows.filter((row) => row.fields.some((field) => field.trim() !== "")));
  } catch (error) {
    return fail(problem("tags.damaged", { message: error instanceof Error ? error.message : String(error) }));
  }
}

function toTable(rows: readonly { line: number; fields: string[] }[]): Result<TagTable> {
  const [head, ...rest] = rows;
  if (!head || rest.length === 0) return fail(problem("tags.empty"));
  if (rest.length > TAG_LIMITS.rows) return fail(problem("tags.too-many", { limit: TAG_LIMITS.rows }, { line: TAG_LIMITS.rows + 2 }));
  return ok({ head: head.fields.map((name) => name.trim()), rows: rest });
}
