/** A table as a workbook of one sheet, its head in bold and kept in sight. The writer comes only when it is wanted. */
export async function writeXlsx(
  sheet: string,
  heads: readonly string[],
  rows: readonly (readonly (string | number | null)[])[],
): Promise<Blob> {
  const { default: writeWorkbook } = await import("write-excel-file/universal");
  const head = heads.map((value) => ({ value, fontWeight: "bold" as const }));
  const columns = heads.map((text, i) => ({ width: Math.min(60, Math.max(text.length, ...rows.slice(0, 500).map((row) => String(row[i] ?? "").length)) + 2) }));
  const data = [head, ...rows.map((row) => [...row])];
  return writeWorkbook(data, { sheet: toSheetName(sheet), columns, stickyRowsCount: 1 }).toBlob();
}

/** Spreadsheets allow 31 characters in the name of a sheet, and none of `\ / ? * [ ] :` (ECMA-376 Part 1 §18.2.19, common practice). */
function toSheetName(text: string): string {
  return text.replace(/[\\/?*[\]:]/g, " ").trim().slice(0, 31) || "Signals";
}
