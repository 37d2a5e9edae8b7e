import { edgesDeclaredAt } from "../edges";
import { removeReferenceFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r065: NodeRule = {
  id: "R065",
  title: "Target of IsDeprecated",
  severity: "error",
  clause: `${clause(3, "§7.21")}, OPC 11030 v1.03 §14.3.2 (white paper) for the place`,
  priority: 2,
  concerns: ALL_CLASSES,
  declares: N.IsDeprecated,
  condition: "IsDeprecated leads to the Object that stands for the version in which the node was first deprecated.",
  why: "Tools show the version from which on a node should not be used any more; another target has none.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, N.IsDeprecated)) {
      const target = ctx.node(edge.target);
      if (!target || target.nodeClass === "Object") continue;
      report({
        attribute: "references",
        message: `IsDeprecated of ${ctx.nameOf(edge.source)} leads to the ${target.nodeClass} ${target.browseName.name}, which stands for no version.`,
        facts: [`Target: ${ctx.describe(edge.target)}, ${target.nodeClass}; allowed: Object`],
        data: { ...edge },
      });
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "An Object for the version.",
      build: (m) => {
        m.reference(m.objectType("PumpType"), N.IsDeprecated, m.object("Version1_02"));
        return undefined;
      },
    },
    bad: {
      text: "A Variable.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.reference(pump, N.IsDeprecated, m.variable("Version", { parent: m.object("About") }));
        return pump;
      },
    },
  },
};
