import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { findLoop, isLoopReporter } from "../loops";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

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
    const loop = findLoop(ctx, R.HasChild, node.key);
    if (!loop || !isLoopReporter(node.key, loop, ctx)) return;
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
