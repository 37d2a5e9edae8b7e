import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { findModellingRule } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r074: NodeRule = {
  id: "R074",
  title: "An instance declaration belongs to one type",
  severity: "error",
  clause: clause(3, "§6.2.1"),
  priority: 2,
  concerns: ["Object", "Variable", "Method"],
  needs: ["modelling rule"],
  condition:
    "Hierarchical references lead to a declaration from exactly one type, over other declarations or directly.",
  why: "A change made for one type silently changes the other, and the two can no longer be versioned apart.",
  check(node, ctx, report) {
    if (findModellingRule(ctx, node.key) === undefined) return;
    const types = new Set<NodeKey>();
    const seen = new Set<NodeKey>([node.key]);
    for (const at of seen) {
      for (const { source } of ctx.parentEdges(at)) {
        const parent = ctx.classOf(source);
        if (parent === "ObjectType" || parent === "VariableType") types.add(source);
        else if (parent && findModellingRule(ctx, source) !== undefined) seen.add(source);
      }
    }
    // Told where the second way begins: a node that only hangs below such a one is no finding of its own.
    if (types.size < 2 || ctx.parentEdges(node.key).length < 2) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} is a declaration of ${types.size} types.`,
      facts: [...types].map((type) => `Reached from ${ctx.describe(type)}`),
    });
  },
  examples: {
    good: {
      text: "Each type has its own declaration.",
      build: (m) => {
        m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory" });
        m.variable("Speed", { parent: m.objectType("FanType"), rule: "Mandatory" });
        return undefined;
      },
    },
    bad: {
      text: "Two types share one.",
      build: (m) => {
        const speed = m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory" });
        m.reference(m.objectType("FanType"), R.HasComponent, speed);
        return speed;
      },
    },
  },
};
