/** The model as a signal list: one row a Variable, in the columns that a signal list is read from (read-signal-list.ts). */
import type { AddressSpace } from "../../address-space/address-space";
import { findModellingRule, findParent, findProperty } from "../../address-space/browse";
import { getAccessLevel, getDataType, isTypeNode, type Node, type VariableNode } from "../../address-space/node";
import { formatNodeId, type NodeKey } from "../../address-space/node-id";
import { findText } from "../../address-space/qualified-name";
import { StandardReferenceType } from "../../address-space/standard-ids";
import { SpaceDataTypes } from "../../nodeset/values/data-type-shapes";
import { readValue } from "../../nodeset/values/read-value";
import { findEuInformation, findRange } from "../../nodeset/values/standard-values";

export type SignalCell = string | number | null;

export const signalHeads = ["Owner", "Group", "Name", "Data type", "Unit", "Low", "High", "Rule", "Access", "Description", "NodeId"] as const;

/** Rows below the heads; Properties and Variables inside of Variables are facts of their owners and no signals. */
export function listSignals(space: AddressSpace): SignalCell[][] {
  const types = new SpaceDataTypes(space);
  return space.listOwnNodes().flatMap((node) => (node.nodeClass === "Variable" && isSignal(space, node) ? [toRow(space, types, node)] : []));
}

function isSignal(space: AddressSpace, node: VariableNode): boolean {
  if (space.edgesTo(node.key).some((edge) => edge.type === StandardReferenceType.HasProperty)) return false;
  const parent = findParent(space, node.key);
  return parent !== undefined && space.isOwn(parent) && space.getNode(parent)?.nodeClass !== "Variable";
}

function toRow(space: AddressSpace, types: SpaceDataTypes, node: VariableNode): SignalCell[] {
  const { owner, groups } = findPlace(space, node.key);
  const read = (name: string) => {
    const property = findProperty(space, node.key, name);
    const value = property?.nodeClass === "Variable" && property.value ? readValue(property.value, types) : undefined;
    return value?.ok ? value.value : undefined;
  };
  const range = findRange(read("EURange"));
  const rule = findModellingRule(space, node.key);
  const level = getAccessLevel(node);
  return [
    owner,
    groups.join("/"),
    node.browseName.name,
    space.getNode(getDataType(node))?.browseName.name ?? "",
    findEuInformation(read("EngineeringUnits"))?.displayName.text ?? "",
    range?.low ?? null,
    range?.high ?? null,
    (rule !== undefined && space.getNode(rule)?.browseName.name) || "",
    `${level & 1 ? "R" : ""}${level & 2 ? "W" : ""}`,
    findText(node.description ?? []) ?? "",
    formatNodeId(node.nodeId),
  ];
}

/** The type or machine at the top, and the groups between it and the signal. */
function findPlace(space: AddressSpace, key: NodeKey): { owner: string; groups: string[] } {
  const above: Node[] = [];
  const seen = new Set<NodeKey>([key]);
  for (let at = findParent(space, key); at !== undefined && space.isOwn(at) && !seen.has(at); at = findParent(space, at)) {
    const node = space.getNode(at);
    if (!node) break;
    seen.add(at);
    above.unshift(node);
    if (isTypeNode(node)) break;
  }
  return { owner: above[0]?.browseName.name ?? "", groups: above.slice(1).map((node) => node.browseName.name) };
}
