/**
 * Workbooks (XLSX) as tables of texts. What is too large is refused before it is unpacked, since a small file may hold a
 * thousandfold of itself. The reader comes only when somebody chooses a workbook.
 */
import { unzipSync } from "fflate";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { MAX_ROWS, type TextTable } from "../domain/editing/starters/text-table";

const MAX_BYTES = 5_000_000;
const MAX_UNPACKED = 60_000_000;
const MAX_PARTS = 2_000;
const MAX_COLUMNS = 200;

export type WorkbookSheet = { readonly name: string; readonly table: TextTable };

/**
 * The sheets that hold something, rows with their numbers in the sheet. Problems: `workbook.too-large`,
 * `workbook.unreadable`, `workbook.old-format`, `signal-list.too-long`, `signal-list.empty`.
 */
export async function readXlsx(bytes: Uint8Array): Promise<Result<WorkbookSheet[]>> {
  const refusal = checkSize(bytes);
  if (refusal) return fail(refusal);
  const read = await readSheets(bytes);
  if (!read.ok) return read;
  const sheets = read.value.map(({ sheet, data }) => ({ name: sheet, table: toTable(data) })).filter(({ table }) => table.rows.length > 0);
  if (sheets.length === 0) return fail(problem("signal-list.empty"));
  const isLong = sheets.some(({ table }) => table.rows.length > MAX_ROWS);
  return isLong ? fail(problem("signal-list.too-long", { limit: MAX_ROWS })) : ok(sheets);
}

/** The signature of a compound file, in which the old format (XLS) and files with a password are kept. */
const COMPOUND = [0xd0, 0xcf, 0x11, 0xe0];
/** That of a ZIP archive (APPNOTE §4.3.7). */
const ARCHIVE = [0x50, 0x4b, 0x03, 0x04];

/** By its first bytes, whatever the file is called. */
export function looksLikeWorkbook(bytes: Uint8Array): boolean {
  return startsWith(bytes, ARCHIVE) || startsWith(bytes, COMPOUND);
}

function startsWith(bytes: Uint8Array, signature: readonly number[]): boolean {
  return signature.every((byte, i) => bytes[i] === byte);
}

function checkSize(bytes: Uint8Array) {
  if (bytes.length > MAX_BYTES) return problem("workbook.too-large", { limit: MAX_BYTES / 1_000_000 });
  if (startsWith(bytes, COMPOUND)) return problem("workbook.old-format");
  let size = 0;
  let parts = 0;
  try {
    unzipSync(bytes, {
      filter: ({ originalSize }) => {
        size += originalSize;
        parts++;
        return false;
      },
    });
  } catch {
    return problem("workbook.unreadable");
  }
  return size > MAX_UNPACKED || parts > MAX_PARTS ? problem("workbook.too-large", { limit: MAX_UNPACKED / 1_000_000 }) : undefined;
}

type Cell = string | number | boolean | Date | DateConstructor | null;

async function readSheets(bytes: Uint8Array): Promise<Result<readonly { sheet: string; data: readonly (readonly Cell[])[] }[]>> {
  const { default: readWorkbook } = await import("read-excel-file/universal");
  try {
    return ok(await readWorkbook(new Blob([bytes.slice()])));
  } catch {
    return fail(problem("workbook.unreadable"));
  }
}

function toTable(data: readonly (readonly Cell[])[]): TextTable {
  const rows = data.map((cells, i) => ({ line: i + 1, fields: cells.slice(0, MAX_COLUMNS).map(toText) }));
  return { rows: rows.filter(({ fields }) => fields.some((field) => field !== "")) };
}

function toText(cell: Cell): string {
  if (cell === null) return "";
  return cell instanceof Date ? cell.toISOString() : String(cell).trim();
}
