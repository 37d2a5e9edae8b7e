import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import type { CheckContext, Lookup } from "../check-context";
import { ALL_CLASSES, clause, type NodeRule } from "../rule";

export const r027: NodeRule = {
  id: "R027",
  title: "No loops over HasChild",
  severity: "error",
  clause: clause(3, "§7.5"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition: "Following only HasChild references and their subtypes never leads back to the start.",
  why: "Programs that walk down to the leaves never end; a type that is its own supertype cannot be instantiated.",
  check(node, ctx, report) {
    const loop = ctx.lookUp(loopThrough, node.key);
    if (!loop || !isReporter(node.key, loop, ctx)) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} stands below itself.`,
      facts: [
        `The way round: ${[...loop, node.key].map((key) => ctx.nameOf(key)).join(" → ")}`,
        ...loop.map((key) => ctx.describe(key)),
      ],
    });
  },
  examples: {
    good: {
      text: "A tree.",
      build: (m) => m.object("Motor", { parent: m.object("Press1") }),
    },
    bad: {
      text: "Two components of each other.",
      build: (m) => {
        const press = m.object("Press1");
        const motor = m.object("Motor", { parent: press });
        m.reference(motor, R.HasComponent, press);
        return press;
      },
    },
  },
};

/** The nodes of a shortest loop from the node over its parents back to itself, downwards; undefined where there is none. */
const loopThrough: Lookup<readonly NodeKey[] | undefined> = {
  compute(ctx, start) {
    const types = ctx.closure(R.HasChild);
    const below = new Map<NodeKey, NodeKey>();
    const open: NodeKey[] = [start];
    for (const at of open) {
      for (const edge of [...ctx.supertypeEdges(at), ...ctx.parentEdges(at)]) {
        if (!types.has(edge.type)) continue;
        if (edge.source === start) return listLoop(start, at, below);
        if (below.has(edge.source)) continue;
        below.set(edge.source, at);
        open.push(edge.source);
      }
    }
    return undefined;
  },
};

function listLoop(start: NodeKey, first: NodeKey, below: ReadonlyMap<NodeKey, NodeKey>): NodeKey[] {
  const loop = [start];
  for (let at: NodeKey | undefined = first; at !== undefined && at !== start; at = below.get(at)) loop.push(at);
  return loop;
}

/** One finding a loop: its own node with the smallest key speaks for all. */
function isReporter(key: NodeKey, loop: readonly NodeKey[], ctx: CheckContext): boolean {
  return loop.every((other) => other >= key || !ctx.isOwn(other));
}
