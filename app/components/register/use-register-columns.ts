import { useCallback, useEffect, useMemo, useState } from "react";
import { COLUMNS, type Column, type ColumnId } from "./columns";

const STORAGE_KEY = "register-columns-hidden";
const ALWAYS: ColumnId = "name";

export type ColumnChoice = { readonly hidden: ReadonlySet<ColumnId>; readonly toggle: (id: ColumnId) => void };

/** Which columns are shown; this browser remembers the choice. */
export function useRegisterColumns(): { columns: readonly Column[]; template: string; width: number; choice: ColumnChoice } {
  const [hidden, setHidden] = useState<ReadonlySet<ColumnId>>(new Set());

  useEffect(() => {
    const kept = (localStorage.getItem(STORAGE_KEY) ?? "").split(" ");
    setHidden(new Set(COLUMNS.flatMap((column) => (kept.includes(column.id) && column.id !== ALWAYS ? [column.id] : []))));
  }, []);

  const toggle = useCallback((id: ColumnId) => {
    if (id === ALWAYS) return;
    setHidden((old) => {
      const next = new Set(old);
      if (!next.delete(id)) next.add(id);
      localStorage.setItem(STORAGE_KEY, [...next].join(" "));
      return next;
    });
  }, []);

  return useMemo(() => {
    const columns = COLUMNS.filter((column) => !hidden.has(column.id));
    const template = columns.map((column) => (column.grows ? `minmax(${column.width}px, ${column.grows}fr)` : `${column.width}px`)).join(" ");
    const width = columns.reduce((sum, column) => sum + column.width, 0);
    return { columns, template, width, choice: { hidden, toggle } };
  }, [hidden, toggle]);
}
