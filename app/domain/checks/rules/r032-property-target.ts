import { retypeReferenceFix } from "../fixes";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r032: NodeRule = {
  id: "R032",
  title: "Target of HasProperty is a Variable",
  severity: "error",
  clause: clause(3, "§7.8"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasProperty,
  condition: "The target of HasProperty is a Variable.",
  why: "A Property is a value that describes its owner. Clients read it as a Variable at once, and fail.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasProperty)) {
      const target = ctx.node(edge.target);
      if (!target || target.nodeClass === "Variable") continue;
      report({
        attribute: "references",
        message: `${target.browseName.name} is a ${target.nodeClass} and cannot be a Property of ${ctx.nameOf(edge.source)}.`,
        facts: [
          `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`,
          `NodeClass of the target: ${target.nodeClass}; allowed: Variable`,
        ],
        data: { ...edge },
      });
    }
  },
  fix: retypeReferenceFix("Make it a component", () => R.HasComponent),
  examples: {
    good: { text: "A Variable as Property.", build: (m) => m.property("SerialNumber", { parent: m.object("Pump1") }) },
    bad: {
      text: "An Object as Property.",
      build: (m) => m.object("Nameplate", { parent: m.object("Pump1"), reference: R.HasProperty }),
    },
  },
};
