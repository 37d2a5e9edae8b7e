/** Sorting the register: siblings are put in order, the tree stays. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { findRangeOf } from "../model/analog-facts";
import { getCellText, type ColumnId } from "./columns";

export type SortRule = { readonly column: ColumnId; readonly isDescending: boolean };

/** Compares two siblings; nodes with an empty cell come last either way. */
export type RowOrder = (a: NodeKey, b: NodeKey) => number;

const collator = new Intl.Collator("en", { numeric: true, sensitivity: "base" });

/**
 * The order by what the cells hold when it is first asked for: a row that is edited afterwards stays where it is, as in a
 * spreadsheet, until one sorts anew. `countFindings` tells the column that no text stands for.
 */
export function makeRowOrder(getSpace: () => AddressSpace, { column, isDescending }: SortRule, countFindings: (key: NodeKey) => number): RowOrder {
  const cells = new Map<NodeKey, string | number>();
  const read = (key: NodeKey): string | number => {
    let cell = cells.get(key);
    if (cell === undefined) cells.set(key, (cell = readCell(getSpace(), key, column, countFindings)));
    return cell;
  };
  return (a, b) => {
    const [left, right] = [read(a), read(b)];
    if (left === "" || right === "") return left === right ? 0 : left === "" ? 1 : -1;
    const order = typeof left === "number" && typeof right === "number" ? left - right : collator.compare(String(left), String(right));
    return isDescending ? -order : order;
  };
}

function readCell(space: AddressSpace, key: NodeKey, column: ColumnId, countFindings: (key: NodeKey) => number): string | number {
  const node = space.getNode(key);
  if (!node) return "";
  if (column === "finding") return countFindings(key) || "";
  if (column === "range") return findRangeOf(space, key)?.high ?? "";
  const text = getCellText(space, node, column);
  const figure = Number(text.replace("−", "-"));
  return text !== "" && Number.isFinite(figure) ? figure : text;
}
