import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { findLoop, isLoopReporter } from "../loops";

export const r028: NodeRule = {
  id: "R028",
  title: "No loops over HasEventSource and HasNotifier",
  severity: "error",
  clause: clause(3, "§7.17"),
  priority: 2,
  concerns: ALL_CLASSES,
  condition: "Following only HasEventSource references and their subtypes never leads back to the start.",
  why: "Events are passed up along these references: in a loop they never arrive, or arrive for ever.",
  check(node, ctx, report) {
    const loop = findLoop(ctx, R.HasEventSource, node.key);
    if (!loop || !isLoopReporter(node.key, loop, ctx)) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} is an event source of itself.`,
      facts: [
        `The way round: ${[...loop, node.key].map((key) => ctx.nameOf(key)).join(" → ")}`,
        ...loop.map((key) => ctx.describe(key)),
      ],
    });
  },
  examples: {
    good: {
      text: "An area that notifies of a tank.",
      build: (m) => {
        const area = m.object("Area", { set: { eventNotifier: 1 } });
        m.reference(area, R.HasNotifier, m.object("Tank1", { set: { eventNotifier: 1 } }));
        return undefined;
      },
    },
    bad: {
      text: "Two that notify of each other.",
      build: (m) => {
        const area = m.object("Area", { set: { eventNotifier: 1 } });
        const tank = m.object("Tank1", { set: { eventNotifier: 1 } });
        m.reference(area, R.HasNotifier, tank);
        m.reference(tank, R.HasNotifier, area);
        return area;
      },
    },
  },
};
