/** The columns of the register: what each shows and which editor its cells open. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findTypeDefinition, getDisplayName } from "~/domain/address-space/browse";
import { getAccessLevel, getDataType, getValueRank, hasValueAttributes, isTypeNode, type Node } from "~/domain/address-space/node";
import { formatNodeId } from "~/domain/address-space/node-id";
import { findSupertype } from "~/domain/address-space/type-hierarchy";
import { findRangeOf, findUnitOf, formatRange } from "../model/analog-facts";
import { getLanguage, isDescription, type CellColumn, type DescriptionColumn } from "../model/cell-change";
import { findRuleName, formatValueRank, getNodeName } from "../model/member-facts";
import { formatLocalNodeId } from "../model/namespace-label";
import { formatValueText } from "../model/value-text";
import { formatSourceField } from "./source-field";

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

const BEFORE_TEXTS: readonly Column[] = [
  { id: "name", title: "Member", width: 216, grows: 1 },
  { id: "type", title: "Type", width: 154, grows: 0.3 },
  { id: "dataType", title: "DataType", width: 108, isMono: true },
  { id: "rank", title: "Rank", width: 62 },
  { id: "unit", title: "Unit", width: 64 },
  { id: "range", title: "EURange", width: 100, isRight: true, isMono: true },
  { id: "rule", title: "Rule", width: 90 },
  { id: "access", title: "Access", width: 56, isMono: true },
  { id: "source", title: "Source field", width: 190, isMono: true },
  { id: "value", title: "Value", width: 84, isMono: true },
];

const BEHIND_TEXTS: readonly Column[] = [
  { id: "nodeId", title: "NodeId", width: 70, isMono: true },
  { id: "finding", title: "Finding", width: 62 },
];

/** Every column there is, with one for each language of the descriptions; what feeds a member is shown where there is a mapping. */
export function listColumns(languages: readonly string[], isMapped = false): Column[] {
  const facts = BEFORE_TEXTS.filter((column) => isMapped || column.id !== "source");
  return [...facts, ...languages.map(toTextColumn), ...BEHIND_TEXTS];
}

function toTextColumn(language: string): Column {
  const id: DescriptionColumn = `description:${language}`;
  return { id, title: language === "" ? "Description" : `Description ${language}`, width: 160, grows: 1.2 };
}

/** The languages in which own nodes are described, the most usual first; "" is a text that names none. */
export function listLanguages(space: AddressSpace): string[] {
  const counts = new Map<string, number>();
  for (const { description } of space.own.nodes.values()) {
    for (const { locale = "" } of description ?? []) counts.set(locale, (counts.get(locale) ?? 0) + 1);
  }
  return counts.size === 0 ? [""] : [...counts].sort((a, b) => b[1] - a[1]).map(([locale]) => locale);
}

/** The text of a cell; names of types come from their nodes. */
export function getCellText(space: AddressSpace, node: Node, column: ColumnId): string {
  if (isDescription(column)) return findLanguage(node, getLanguage(column));
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
    case "nodeId":
      return formatLocalNodeId(node.nodeId);
    case "source":
      return formatSourceField(space, node);
    case "finding":
      return "";
  }
}

function findLanguage(node: Node, language: string): string {
  return node.description?.find(({ locale = "" }) => locale === language)?.text ?? "";
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
  if (isDescription(column)) return true;
  switch (column) {
    case "name":
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
    case "source":
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
  for (const { text } of node.description ?? []) parts.push(text);
  for (const column of ["type", "dataType", "unit"] as const) parts.push(getCellText(space, node, column));
  return parts.join("\n").toLowerCase();
}
