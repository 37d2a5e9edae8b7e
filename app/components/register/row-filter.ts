/** What the filter of the register asks: words anywhere in a row, or in one column (`unit: mm`, `description de:` for empty ones). Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findParent } from "~/domain/address-space/browse";
import type { Node } from "~/domain/address-space/node";
import { isProperty } from "../model/member-facts";
import { getCellText, getSearchText, isEditable, type Column } from "./columns";

export type RowQuestion = (space: AddressSpace, node: Node) => boolean;

/** Undefined where nothing is asked. */
export function parseFilter(text: string, columns: readonly Column[]): RowQuestion | undefined {
  const wanted = text.trim().toLowerCase();
  if (wanted === "") return undefined;
  const colon = wanted.indexOf(":");
  const named = colon < 1 ? undefined : findColumn(wanted.slice(0, colon).trim(), columns);
  if (!named) return (space, node) => getSearchText(space, node).includes(wanted);
  const words = wanted.slice(colon + 1).trim();
  // Nothing behind the colon asks for what is not filled in, where it could be; units and ranges are facts of their owners.
  if (words === "") return (space, node) => isEditable(node, named.id) && !isFact(space, node) && getCellText(space, node, named.id) === "";
  return (space, node) => getCellText(space, node, named.id).toLowerCase().includes(words);
}

/** EURange, EngineeringUnits and their like: Properties of a Variable. */
function isFact(space: AddressSpace, node: Node): boolean {
  const owner = node.nodeClass === "Variable" ? findParent(space, node.key) : undefined;
  return owner !== undefined && space.getNode(owner)?.nodeClass === "Variable" && isProperty(space, node);
}

function findColumn(name: string, columns: readonly Column[]): Column | undefined {
  return columns.find(({ title, id }) => title.toLowerCase() === name || id.toLowerCase() === name);
}
