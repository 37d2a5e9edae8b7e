/** Where the register's cursor is and how keys move it: a spreadsheet's habits on a tree. Pure. */
import type { Column, ColumnId } from "./columns";
import type { RegisterRow } from "./register-rows";

export type GridCell = { readonly rowId: string; readonly column: ColumnId };

export type Move = "up" | "down" | "left" | "right" | "first" | "last" | "top" | "bottom" | "pageUp" | "pageDown" | "next" | "previous";

const PAGE = 20;

/** The cell after a move; the same cell at an edge. `next` and `previous` run through the rows as Tab does. */
export function moveCell(rows: readonly RegisterRow[], columns: readonly Column[], cell: GridCell, move: Move): GridCell {
  const row = Math.max(0, rows.findIndex((r) => r.id === cell.rowId));
  const column = Math.max(0, columns.findIndex((c) => c.id === cell.column));
  const [nextRow, nextColumn] = getTarget(row, column, move, rows.length, columns.length);
  const target = rows[Math.max(0, Math.min(rows.length - 1, nextRow))];
  const at = columns[Math.max(0, Math.min(columns.length - 1, nextColumn))];
  return target && at ? { rowId: target.id, column: at.id } : cell;
}

function getTarget(row: number, column: number, move: Move, rows: number, columns: number): [number, number] {
  switch (move) {
    case "up":
      return [row - 1, column];
    case "down":
      return [row + 1, column];
    case "left":
      return [row, column - 1];
    case "right":
      return [row, column + 1];
    case "first":
      return [row, 0];
    case "last":
      return [row, columns - 1];
    case "top":
      return [0, column];
    case "bottom":
      return [rows - 1, column];
    case "pageUp":
      return [row - PAGE, column];
    case "pageDown":
      return [row + PAGE, column];
    case "next":
      return column + 1 < columns ? [row, column + 1] : [row + 1, row + 1 < rows ? 0 : column];
    case "previous":
      return column > 0 ? [row, column - 1] : [row - 1, row > 0 ? columns - 1 : 0];
  }
}

/** Rows between two rows, both included, in order. */
export function listRowsBetween(rows: readonly RegisterRow[], fromId: string, toId: string): RegisterRow[] {
  const from = rows.findIndex((row) => row.id === fromId);
  const to = rows.findIndex((row) => row.id === toId);
  if (from < 0 || to < 0) return rows.filter((row) => row.id === toId);
  return rows.slice(Math.min(from, to), Math.max(from, to) + 1);
}
