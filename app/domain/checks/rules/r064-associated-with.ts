import { edgesDeclaredAt } from "../edges";
import { removeReferenceFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r064: NodeRule = {
  id: "R064",
  title: "AssociatedWith joins Objects",
  severity: "error",
  clause: clause(3, "§7.23"),
  priority: 2,
  concerns: ALL_CLASSES,
  declares: N.AssociatedWith,
  condition: "Source and target of AssociatedWith are Objects.",
  why: "It is defined for Objects only; servers refuse it elsewhere.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, N.AssociatedWith)) {
      const wrong = [edge.source, edge.target].find(
        (key) => ctx.classOf(key) !== undefined && ctx.classOf(key) !== "Object",
      );
      if (wrong === undefined) continue;
      report({
        attribute: "references",
        message: `AssociatedWith joins Objects, but ${ctx.nameOf(wrong)} is a ${ctx.classOf(wrong) ?? "node"}.`,
        facts: [`Source: ${ctx.describe(edge.source)}`, `Target: ${ctx.describe(edge.target)}`],
        data: { ...edge },
      });
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "Two Objects.",
      build: (m) => {
        m.reference(m.object("Pump1"), N.AssociatedWith, m.object("Tank1"));
        return undefined;
      },
    },
    bad: {
      text: "An Object and a Variable.",
      build: (m) => {
        const pump = m.object("Pump1");
        m.reference(pump, N.AssociatedWith, m.variable("Level", { parent: m.object("Tank1") }));
        return pump;
      },
    },
  },
};
