/** A table of texts, however it came: from a text file, the clipboard or a workbook. */
export type TextTable = {
  /** Rows with the line on which each starts (1-based); empty rows are left out. The first holds the heads. */
  readonly rows: readonly { readonly line: number; readonly fields: readonly string[] }[];
};

export const MAX_ROWS = 5_000;
