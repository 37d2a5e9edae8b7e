import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r029: NodeRule = {
  id: "R029",
  title: "Target of HasComponent is an Object, a Variable or a Method",
  severity: "error",
  clause: clause(3, "§7.7, §5.3.3.3"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasComponent,
  condition: "The target of HasComponent or a subtype is an Object, a Variable or a Method.",
  why: "A type or a View as a component is refused by loaders or shown as an empty member.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasComponent)) {
      const target = ctx.node(edge.target);
      if (!target || ["Object", "Variable", "Method"].includes(target.nodeClass)) continue;
      report({
        attribute: "references",
        message: `${target.browseName.name} is a ${target.nodeClass} and cannot be a component of ${ctx.nameOf(edge.source)}.`,
        facts: [
          `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`,
          `NodeClass of the target: ${target.nodeClass}; allowed: Object, Variable, Method`,
        ],
        data: { ...edge },
      });
    }
  },
  examples: {
    good: { text: "A Variable as a component.", build: (m) => m.variable("Speed", { parent: m.object("Pump1") }) },
    bad: {
      text: "An ObjectType as a component.",
      build: (m) => {
        const type = m.objectType("PumpType");
        const line = m.object("Line1");
        m.reference(line, R.HasComponent, type);
        return line;
      },
    },
  },
};
