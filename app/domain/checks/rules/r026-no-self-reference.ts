import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { removeReferenceFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r026: NodeRule = {
  id: "R026",
  title: "No hierarchical reference to itself",
  severity: "error",
  clause: clause(3, "§7.3"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HierarchicalReferences,
  condition: "A hierarchical reference leads to another node.",
  why: "A client that walks the tree comes back to the same node for ever.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HierarchicalReferences)) {
      if (edge.source !== edge.target) continue;
      report({
        attribute: "references",
        message: `${node.browseName.name} has a ${ctx.nameOf(edge.type)} to itself.`,
        facts: [`Source and target: ${ctx.describe(node.key)}`],
        data: { ...edge },
      });
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: { text: "A reference to another node.", build: (m) => m.object("Drive", { parent: m.object("Pump1") }) },
    bad: {
      text: "Organizes to itself.",
      build: (m) => {
        const pump = m.object("Pump1");
        m.reference(pump, R.Organizes, pump);
        return pump;
      },
    },
  },
};
