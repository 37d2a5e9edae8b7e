/** One line of CSV after RFC 4180, each cell quoted, with its line break. */
export function writeCsvLine(cells: readonly string[]): string {
  return `${cells.map(quoteCell).join(",")}\r\n`;
}

/** A spreadsheet would run a cell that begins like a formula; an apostrophe before it makes it text. */
function quoteCell(text: string): string {
  const safe = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return `"${safe.replaceAll('"', '""')}"`;
}
