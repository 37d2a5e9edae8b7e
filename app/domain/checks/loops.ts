/** Loops over references of one kind, told once each. */
import type { NodeKey } from "../address-space/node-id";
import { makeLookup, type CheckContext, type Lookup } from "./check-context";

type LoopLookup = Lookup<readonly NodeKey[] | undefined>;

/** Finds a shortest loop from a node upwards over references of the type or below it, back to the node. */
export function makeLoopLookup(referenceType: NodeKey): LoopLookup {
  return makeLookup((ctx, start) => {
    const types = ctx.closure(referenceType);
    // Most nodes are leaves, which no loop runs through.
    const isLeaf = [ctx.childEdges(start), ctx.subtypeEdges(start)].every((edges) => !edges.some((e) => types.has(e.type)));
    if (isLeaf) return undefined;
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
  });
}

function listLoop(start: NodeKey, first: NodeKey, below: ReadonlyMap<NodeKey, NodeKey>): NodeKey[] {
  const loop = [start];
  for (let at: NodeKey | undefined = first; at !== undefined && at !== start; at = below.get(at)) loop.push(at);
  return loop;
}

/** The nodes of the loop, downwards from the node; undefined where there is none. */
export function findLoop(ctx: CheckContext, lookup: LoopLookup, key: NodeKey): readonly NodeKey[] | undefined {
  return ctx.lookUp(lookup, key);
}

/** One finding a loop: its own node with the smallest key speaks for all. */
export function isLoopReporter(key: NodeKey, loop: readonly NodeKey[], ctx: CheckContext): boolean {
  return loop.every((other) => other >= key || !ctx.isOwn(other));
}
