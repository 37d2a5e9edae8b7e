/**
 * Edges that a node declares. Rules about the two ends of a reference run at the node that declares it, so that each
 * reference is told once and belongs to the own model; one that both ends declare is told at its source.
 */
import { isSameEdge, type Edge } from "../address-space/edge-index";
import type { DeclaredReference, Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { CheckContext } from "./check-context";

const NO_EDGES: readonly Edge[] = [];

export function edgesDeclaredAt(node: Node, ctx: CheckContext, referenceType: NodeKey): readonly Edge[] {
  const types = ctx.closure(referenceType);
  let edges: Edge[] | undefined;
  for (const reference of node.references) {
    if (!types.has(reference.type) || reference.serverUri !== undefined) continue;
    const edge = toEdge(node, reference);
    if (edges?.some((e) => isSameEdge(e, edge))) continue;
    if (!reference.isForward && isDeclaredAtSource(node, reference, ctx)) continue;
    if (edges) edges.push(edge);
    else edges = [edge];
  }
  return edges ?? NO_EDGES;
}

function toEdge(node: Node, { type, target, isForward }: DeclaredReference): Edge {
  return isForward ? { source: node.key, type, target } : { source: target, type, target: node.key };
}

function isDeclaredAtSource(node: Node, { target, type }: DeclaredReference, ctx: CheckContext): boolean {
  if (!ctx.isOwn(target)) return false;
  return (
    ctx
      .node(target)
      ?.references.some((r) => r.isForward && r.target === node.key && r.type === type && r.serverUri === undefined) ??
    false
  );
}
