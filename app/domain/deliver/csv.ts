/**
 * CSV for people and spreadsheets (RFC 4180). Cells that a spreadsheet would take for a formula get an apostrophe before
 * them, since names and comments may come from foreign files; numbers, also negative ones, stay as they are.
 */
export function formatCsv(rows: readonly (readonly string[])[]): string {
  return rows.map((row) => `${row.map(formatCell).join(",")}\r\n`).join("");
}

function formatCell(cell: string): string {
  const isNumber = /^[-+]?\d+(?:[.,]\d+)?(?:[eE][-+]?\d+)?$/.test(cell);
  const safe = /^[=+\-@\t\r]/.test(cell) && !isNumber ? `'${cell}` : cell;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}
