/**
 * Edges that a node declares. Rules about the two ends of a reference run at the node that declares it, so that each
 * reference is told once and belongs to the own model; one that both ends declare is told at its source.
 */
import type { Edge } from "../address-space/edge-index";
import type { DeclaredReference, Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { CheckContext } from "./check-context";

export function edgesDeclaredAt(node: Node, ctx: CheckContext, referenceType: NodeKey): Edge[] {
  const types = ctx.closure(referenceType);
  const edges: Edge[] = [];
  const seen = new Set<string>();
  for (const reference of node.references) {
    if (!types.has(reference.type) || reference.serverUri !== undefined) continue;
    const id = `${reference.isForward} ${reference.type} ${reference.target}`;
    if (seen.has(id) || (!reference.isForward && isDeclaredAtSource(node, reference, ctx))) continue;
    seen.add(id);
    edges.push(
      reference.isForward
        ? { source: node.key, type: reference.type, target: reference.target }
        : { source: reference.target, type: reference.type, target: node.key },
    );
  }
  return edges;
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
