import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { retypeReferenceFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r059: NodeRule = {
  id: "R059",
  title: "Ends of HasAddIn",
  severity: "error",
  clause: clause(3, "§7.20"),
  priority: 2,
  concerns: ALL_CLASSES,
  declares: R.HasAddIn,
  condition: "HasAddIn leads from an Object or an ObjectType to an Object.",
  why: "An AddIn is an Object with a known name; clients do not look for anything else.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasAddIn)) {
      const target = ctx.node(edge.target);
      // A wrong source is a finding of R031, a wrong class below HasComponent one of R029.
      if (!target || target.nodeClass === "Object" || !["Variable", "Method"].includes(target.nodeClass)) continue;
      report({
        attribute: "references",
        message: `The ${target.nodeClass} ${target.browseName.name} cannot be an AddIn.`,
        facts: [
          `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)}`,
          `NodeClass of the target: ${target.nodeClass}; allowed: Object`,
        ],
        data: { ...edge },
      });
    }
  },
  fix: retypeReferenceFix("Use HasComponent", () => R.HasComponent),
  examples: {
    good: {
      text: "A Variable as a plain component.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1") }),
    },
    bad: {
      text: "A Variable as AddIn.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), reference: R.HasAddIn }),
    },
  },
};
