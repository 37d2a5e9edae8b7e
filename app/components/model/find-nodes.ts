/** Searching nodes of all loaded models by name, NodeId, path, data type or unit. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDisplayName } from "~/domain/address-space/browse";
import { getDataType, hasValueAttributes, type Node } from "~/domain/address-space/node";
import { formatNodeId } from "~/domain/address-space/node-id";
import { rankText } from "../palette/rank-entries";
import { findUnitOf } from "./analog-facts";
import { formatPath, getNodeName } from "./member-facts";

export type NodeHit = { readonly node: Node; readonly score: number };

const OWN_BONUS = 25;

/** Best answers first; own nodes come before those of required models. */
export function findNodes(space: AddressSpace, query: string, limit: number, accepts: (node: Node) => boolean = () => true): NodeHit[] {
  const text = query.trim();
  if (text === "") return [];
  const hits: NodeHit[] = [];
  for (const layer of space.layers) {
    const isOwn = layer === space.own;
    for (const node of layer.nodes.values()) {
      const score = rankNode(space, node, text, isOwn);
      if (score > 0 && accepts(node)) hits.push({ node, score: score + (isOwn ? OWN_BONUS : 0) - node.browseName.name.length / 40 });
    }
  }
  hits.sort((a, b) => b.score - a.score);
  return hits.slice(0, limit);
}

/** Names and ids of all nodes; path, data type and unit of own ones only, since they cost more than they find elsewhere. */
function rankNode(space: AddressSpace, node: Node, text: string, isOwn: boolean): number {
  const byName = Math.max(rankText(node.browseName.name, text), node.displayName[0]?.text === node.browseName.name ? 0 : rankText(getDisplayName(node), text));
  if (byName > 0) return byName;
  if (text.includes("=") && formatNodeId(node.nodeId).includes(text)) return formatNodeId(node.nodeId).endsWith(text) ? 90 : 45;
  if (!isOwn) return 0;
  if (text.includes("/") && rankText(formatPath(space, node.key).replaceAll(" / ", "/"), text.replaceAll(" ", "")) > 0) return 50;
  return node.nodeClass === "Variable" && rankText(describeValue(space, node), text) >= 40 ? 15 : 0;
}

function describeValue(space: AddressSpace, node: Node): string {
  const unit = node.nodeClass === "Variable" ? findUnitOf(space, node.key) : undefined;
  const dataType = hasValueAttributes(node) ? getNodeName(space, getDataType(node)) : "";
  return `${dataType} ${unit ? `${unit.symbol} ${unit.name}` : ""}`;
}
