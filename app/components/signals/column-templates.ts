/** Column choices that people keep: by the heads of the columns, so that one fits every list of the same origin. This browser remembers them. */
import { guessColumns, signalFields, type ColumnChoice, type SignalField } from "~/domain/editing/starters/read-signal-list";

const STORAGE_KEY = "signal-column-templates";
const MOST = 50;

export type ColumnTemplate = { readonly name: string; readonly heads: Readonly<Partial<Record<SignalField, string>>> };

export function readTemplates(): readonly ColumnTemplate[] {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(STORAGE_KEY) ?? "[]");
    return Array.isArray(kept) ? kept.flatMap((item: unknown) => toTemplate(item) ?? []) : [];
  } catch {
    return [];
  }
}

function toTemplate(item: unknown): ColumnTemplate | undefined {
  if (typeof item !== "object" || item === null || !("name" in item) || !("heads" in item)) return undefined;
  const { name, heads } = item;
  if (typeof name !== "string" || typeof heads !== "object" || heads === null) return undefined;
  const entries = Object.entries(heads).filter((entry): entry is [SignalField, string] => (signalFields as readonly string[]).includes(entry[0]) && typeof entry[1] === "string");
  return { name, heads: Object.fromEntries(entries) };
}

/** Keeps a choice under a name; one of the same name is replaced. */
export function keepTemplate(name: string, head: readonly string[], columns: ColumnChoice): readonly ColumnTemplate[] {
  const heads = Object.fromEntries(Object.entries(columns).map(([field, index]) => [field, head[index] ?? ""]));
  const next = [{ name, heads }, ...readTemplates().filter((other) => other.name !== name)].slice(0, MOST);
  localStorage.setItem(STORAGE_KEY, JSON.stringify(next));
  return next;
}

export function dropTemplate(name: string): readonly ColumnTemplate[] {
  const next = readTemplates().filter((other) => other.name !== name);
  localStorage.setItem(STORAGE_KEY, JSON.stringify(next));
  return next;
}

/** The columns that a template names in this list; undefined where one of them is not there. */
export function applyTemplate({ heads }: ColumnTemplate, head: readonly string[]): ColumnChoice | undefined {
  const found = Object.entries(heads).map(([field, text]) => [field, head.indexOf(text)] as const);
  return found.every(([, index]) => index >= 0) ? Object.fromEntries(found) : undefined;
}

/** What fits without asking: the template kept last whose columns are all there, else a guess by the heads. */
export function proposeColumns(templates: readonly ColumnTemplate[], head: readonly string[]): ColumnChoice {
  for (const template of templates) {
    const columns = applyTemplate(template, head);
    if (columns && columns.name !== undefined) return columns;
  }
  return guessColumns(head);
}
