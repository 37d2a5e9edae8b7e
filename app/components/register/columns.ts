/** The columns of the register: what each shows and which editor its cells open. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findTypeDefinition, getDisplayName } from "~/domain/address-space/browse";
import { getAccessLevel, getDataType, getValueRank, hasValueAttributes, isTypeNode, type Node } from "~/domain/address-space/node";
import { formatNodeId } from "~/domain/address-space/node-id";
import { findText } from "~/domain/address-space/qualified-name";
import { findSupertype } from "~/domain/address-space/type-hierarchy";
import { findRangeOf, findUnitOf, formatRange } from "../model/analog-facts";
import type { CellColumn } from "../model/cell-change";
import { findRuleName, formatValueRank, getNodeName } from "../model/member-facts";
import { formatLocalNodeId } from "../model/namespace-label";
import { formatValueText } from "../model/value-text";

export type ColumnId = CellColumn;

export type Column = {
  readonly id: ColumnId;
  readonly title: string;
  readonly width: number;
  /** Takes a share of the room that is left. */
  readonly grows?: number;
  readonly isRight?: boolean;
  readonly isMono?: boolean;
};

export const COLUMNS: readonly Column[] = [
  { id: "name", title: "Member", width: 216, grows: 1 },
  { id: "type", title: "Type", width: 154, grows: 0.3 },
  { id: "dataType", title: "DataType", width: 108, isMono: true },
  { id: "rank", title: "Rank", width: 62 },
  { id: "unit", title: "Unit", width: 64 },
  { id: "range", title: "EURange", width: 100, isRight: true, isMono: true },
  { id: "rule", title: "Rule", width: 90 },
  { id: "access", title: "Access", width: 56, isMono: true },
  { id: "value", title: "Value", width: 84, isMono: true },
  { id: "description", title: "Description", width: 160, grows: 1.2 },
  { id: "nodeId", title: "NodeId", width: 70, isMono: true },
  { id: "finding", title: "Finding", width: 62 },
];

/** The text of a cell; names of types come from their nodes. */
export function getCellText(space: AddressSpace, node: Node, column: ColumnId): string {
  switch (column) {
    case "name":
      return getDisplayName(node);
    case "type":
      return isTypeNode(node) ? describeSupertype(space, node) : node.nodeClass === "Method" ? "Method" : getNodeName(space, findTypeDefinition(space, node.key));
    case "dataType":
      return hasValueAttributes(node) ? getNodeName(space, getDataType(node)) : "";
    case "rank":
      return hasValueAttributes(node) ? formatValueRank(getValueRank(node)) : "";
    case "unit":
      return node.nodeClass === "Variable" ? (findUnitOf(space, node.key)?.symbol ?? "") : "";
    case "range":
      return node.nodeClass === "Variable" ? formatRange(findRangeOf(space, node.key)) : "";
    case "rule":
      return findRuleName(space, node.key) ?? "";
    case "access":
      return formatAccess(node);
    case "value":
      return formatValueText(space, node);
    case "description":
      return findText(node.description ?? []) ?? "";
    case "nodeId":
      return formatLocalNodeId(node.nodeId);
    case "finding":
      return "";
  }
}

function describeSupertype(space: AddressSpace, node: Node): string {
  const supertype = findSupertype(space, node.key);
  return supertype === undefined ? "" : `subtype of ${getNodeName(space, supertype)}`;
}

/** `R`, `RW`, `H` for history; `X` for a Method that may be called (OPC 10000-3 §8.57). */
export function formatAccess(node: Node): string {
  if (node.nodeClass === "Method") return node.executable === false ? "" : "X";
  if (node.nodeClass !== "Variable") return "";
  const level = getAccessLevel(node);
  return `${level & 1 ? "R" : ""}${level & 2 ? "W" : ""}${level & 4 ? "H" : ""}`;
}

/** Which cells can be edited for a node of this class. */
export function isEditable(node: Node, column: ColumnId): boolean {
  const isVariable = node.nodeClass === "Variable";
  switch (column) {
    case "name":
    case "description":
      return true;
    case "type":
      return isVariable || node.nodeClass === "Object";
    case "dataType":
    case "rank":
      return hasValueAttributes(node);
    case "unit":
    case "range":
    case "access":
    case "value":
      return isVariable;
    case "rule":
      return !isTypeNode(node);
    case "nodeId":
    case "finding":
      return false;
  }
}

/** What an editor starts with: the BrowseName where the cell shows the DisplayName, else what the cell shows. */
export function getEditText(space: AddressSpace, node: Node, column: ColumnId): string {
  return column === "name" ? node.browseName.name : getCellText(space, node, column);
}

/** Everything a filter looks into. */
export function getSearchText(space: AddressSpace, node: Node): string {
  const parts = [node.browseName.name, getDisplayName(node), formatNodeId(node.nodeId)];
  for (const column of ["type", "dataType", "unit", "description"] as const) parts.push(getCellText(space, node, column));
  return parts.join("\n").toLowerCase();
}
