/** Rows of a spreadsheet as items: one text for a leaf, a text for each field of a flat structure. Pure. */
import type { BuiltInType } from "~/domain/nodeset/values/variant";
import { parseLeaf, TEXT_TYPES } from "./leaf-text";
import type { Draft, DraftItem, DraftStructure } from "./value-draft";

const isLeaf = (type: BuiltInType): boolean => TEXT_TYPES.has(type) || type === "Boolean" || type === "LocalizedText";

function parseText(type: BuiltInType, text: string): DraftItem {
  return type === "LocalizedText" ? { text } : parseLeaf(type, type === "String" ? text : text.trim());
}

function listFlatFields(item: DraftItem): [string, Draft][] {
  if (typeof item !== "object" || item === null || !("fields" in item)) return [];
  return Object.entries((item as DraftStructure).fields).filter(
    ([, field]) => field.shape === "scalar" && isLeaf(field.type),
  );
}

/** Whether items of the type can be made of texts. */
export function takesTexts(type: BuiltInType, sample: DraftItem): boolean {
  return isLeaf(type) || listFlatFields(sample).length > 0;
}

/** The item with its texts filled in, from left to right; cells that are not there leave it as it is. */
export function fillFromTexts(type: BuiltInType, item: DraftItem, cells: readonly string[]): DraftItem {
  if (isLeaf(type)) return parseText(type, cells[0] ?? "");
  const filled = listFlatFields(item).flatMap(([name, field], i) => {
    const text = cells[i];
    return text === undefined ? [] : [[name, { ...field, value: parseText(field.type, text) }] as const];
  });
  return { ...(item as DraftStructure), fields: { ...(item as DraftStructure).fields, ...Object.fromEntries(filled) } };
}
