/** What a change of one node can do to the lists of edges at both ends. */
import { isSameEdge, listDeclaredEdges, type Edge } from "../address-space/edge-index";
import type { Node } from "../address-space/node";

/** The edges that a node's change can have moved: gained, lost, or all where their order may differ. */
export function listMovedEdges(old: Node | undefined, node: Node | undefined): Edge[] {
  if (old && node && old.references === node.references && old.order === node.order) return [];
  const before = old ? listDeclaredEdges(old) : [];
  const after = node ? listDeclaredEdges(node) : [];
  const isReordered =
    old !== undefined && node !== undefined && (old.order !== node.order || !keepsOrder(before, after));
  if (isReordered) return [...before, ...after];
  return [
    ...before.filter((e) => !after.some((o) => isSameEdge(o, e))),
    ...after.filter((e) => !before.some((o) => isSameEdge(o, e))),
  ];
}

/** Whether the edges that both lists hold stand in one order. */
function keepsOrder(before: readonly Edge[], after: readonly Edge[]): boolean {
  const kept = before.filter((e) => after.some((o) => isSameEdge(o, e)));
  const keptAfter = after.filter((e) => before.some((o) => isSameEdge(o, e)));
  return (
    kept.length === keptAfter.length &&
    kept.every((e, i) => isSameEdge(e, keptAfter[i] ?? e) && keptAfter[i] !== undefined)
  );
}
