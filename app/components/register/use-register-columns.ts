import { useCallback, useDeferredValue, useEffect, useMemo, useState } from "react";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { listColumns, listLanguages, type Column, type ColumnId } from "./columns";
import { hasMapping, useSourceWords } from "./source-field";

const STORAGE_KEY = "register-columns";
const ALWAYS: ColumnId = "name";
const NARROWEST = 40;
const WIDEST = 900;

/** What this browser remembers of the columns. */
type Kept = {
  readonly hidden: readonly string[];
  readonly widths: Readonly<Record<string, number>>;
  /** Languages that somebody asked for, before a text in them is written. */
  readonly languages: readonly string[];
};

const NOTHING: Kept = { hidden: [], widths: {}, languages: [] };

export type ColumnChoice = {
  readonly all: readonly Column[];
  readonly hidden: ReadonlySet<string>;
  readonly toggle: (id: ColumnId) => void;
  readonly setWidth: (id: ColumnId, width: number) => void;
  readonly addLanguage: (language: string) => void;
  readonly reset: () => void;
  readonly isChanged: boolean;
};

/** Which columns are shown and how wide; this browser remembers the choice. */
export function useRegisterColumns(space: AddressSpace): { columns: readonly Column[]; template: string; width: number; choice: ColumnChoice } {
  const [kept, setKept] = useState<Kept>(NOTHING);
  // Languages change rarely; looking for them must not hold up a key press.
  const settled = useDeferredValue(space);
  const found = useMemo(() => listLanguages(settled).join("\n"), [settled]);
  const isMapped = hasMapping(space);
  const hasWords = useSourceWords(isMapped);

  useEffect(() => setKept(readKept()), []);

  const change = useCallback((make: (old: Kept) => Kept) => {
    setKept((old) => {
      const next = make(old);
      localStorage.setItem(STORAGE_KEY, JSON.stringify(next));
      return next;
    });
  }, []);

  return useMemo(() => {
    const languages = [...new Set([...found.split("\n"), ...kept.languages])];
    const all = listColumns(languages, isMapped && hasWords);
    const hidden = new Set(kept.hidden);
    const columns = all
      .filter((column) => !hidden.has(column.id))
      .map((column) => (kept.widths[column.id] === undefined ? column : withWidth(column, kept.widths[column.id] ?? column.width)));
    const template = columns.map((column) => (column.grows ? `minmax(${column.width}px, ${column.grows}fr)` : `${column.width}px`)).join(" ");
    const width = columns.reduce((sum, column) => sum + column.width, 0);
    const choice: ColumnChoice = {
      all,
      hidden,
      isChanged: JSON.stringify(kept) !== JSON.stringify(NOTHING),
      toggle: (id) => {
        if (id !== ALWAYS) change((old) => ({ ...old, hidden: old.hidden.includes(id) ? old.hidden.filter((other) => other !== id) : [...old.hidden, id] }));
      },
      setWidth: (id, wanted) => change((old) => ({ ...old, widths: { ...old.widths, [id]: Math.round(Math.max(NARROWEST, Math.min(WIDEST, wanted))) } })),
      addLanguage: (language) => change((old) => ({ ...old, languages: [...new Set([...old.languages, language])] })),
      reset: () => change(() => NOTHING),
    };
    return { columns, template, width, choice };
  }, [kept, found, isMapped, hasWords, change]);
}

function withWidth({ grows: _grows, ...column }: Column, width: number): Column {
  return { ...column, width };
}

/** What somebody else may have written there is taken only where it has the form. */
function readKept(): Kept {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(STORAGE_KEY) ?? "null");
    if (typeof kept !== "object" || kept === null) return NOTHING;
    const { hidden, widths, languages } = kept as Partial<Record<keyof Kept, unknown>>;
    const texts = (list: unknown): string[] => (Array.isArray(list) ? list.filter((item): item is string => typeof item === "string" && item !== ALWAYS) : []);
    const figures = typeof widths === "object" && widths !== null ? Object.entries(widths).filter((entry): entry is [string, number] => typeof entry[1] === "number") : [];
    return { hidden: texts(hidden), widths: Object.fromEntries(figures), languages: texts(languages) };
  } catch {
    return NOTHING;
  }
}
