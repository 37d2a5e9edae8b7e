import type { NodeKey } from "~/domain/address-space/node-id";

/** The description in one language; without one, the text that names no language. */
export type DescriptionColumn = `description:${string}`;

/** A column of the register. */
export type CellColumn =
  | "name"
  | "type"
  | "dataType"
  | "rank"
  | "unit"
  | "range"
  | "rule"
  | "access"
  | "source"
  | "value"
  | DescriptionColumn
  | "nodeId"
  | "finding";

/** A cell, and the text that it shall show. An empty text takes the thing away. */
export type CellChange = { readonly key: NodeKey; readonly column: CellColumn; readonly text: string };

export function isDescription(column: CellColumn): column is DescriptionColumn {
  return column.startsWith("description:");
}

export function getLanguage(column: DescriptionColumn): string {
  return column.slice("description:".length);
}
