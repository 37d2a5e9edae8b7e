/** Loops over references of one kind, told once each. */
import type { Edge } from "../address-space/edge-index";
import type { NodeKey } from "../address-space/node-id";
import type { CheckContext } from "./check-context";

/**
 * A shortest loop from a node upwards over references of the type or below it, back to the node: its nodes downwards from
 * the node; undefined where there is none.
 */
export function findLoop(ctx: CheckContext, referenceType: NodeKey, start: NodeKey): readonly NodeKey[] | undefined {
  const types = ctx.closure(referenceType);
  if (isPlainlyWithout(ctx, start, types)) return undefined;
  const below = new Map<NodeKey, NodeKey>();
  const open: NodeKey[] = [start];
  for (const at of open) {
    for (const edges of [ctx.supertypeEdges(at), ctx.parentEdges(at)]) {
      for (const { type, source } of edges) {
        if (!types.has(type)) continue;
        if (source === start) return listLoop(start, at, below);
        if (below.has(source)) continue;
        below.set(source, at);
        open.push(source);
      }
    }
  }
  return undefined;
}

/** Nearly all nodes are leaves, or hang on one parent that hangs on one parent, and so on to a root. */
function isPlainlyWithout(ctx: CheckContext, start: NodeKey, types: ReadonlySet<NodeKey>): boolean {
  const isKind = (e: Edge): boolean => types.has(e.type);
  if (!ctx.childEdges(start).some(isKind) && !ctx.subtypeEdges(start).some(isKind)) return true;
  let at = start;
  for (let steps = 0; steps < MAX_STEPS; steps++) {
    const [parents, supertypes] = [ctx.parentEdges(at), ctx.supertypeEdges(at)];
    const up = parents.find(isKind) ?? supertypes.find(isKind);
    if (!up) return true;
    if (parents.length + supertypes.length > 1) return false;
    at = up.source;
  }
  return false;
}

const MAX_STEPS = 100;

function listLoop(start: NodeKey, first: NodeKey, below: ReadonlyMap<NodeKey, NodeKey>): NodeKey[] {
  const loop = [start];
  for (let at: NodeKey | undefined = first; at !== undefined && at !== start; at = below.get(at)) loop.push(at);
  return loop;
}

/** One finding a loop: its own node with the smallest key speaks for all. */
export function isLoopReporter(key: NodeKey, loop: readonly NodeKey[], ctx: CheckContext): boolean {
  return loop.every((other) => other >= key || !ctx.isOwn(other));
}
