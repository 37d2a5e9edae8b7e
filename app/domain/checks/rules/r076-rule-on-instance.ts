import { modellingRuleFix, REMOVED } from "../fixes";
import { findModellingRule } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r076: NodeRule = {
  id: "R076",
  title: "Modelling rule on a plain instance",
  severity: "hint",
  clause: clause(3, "§6.4.4.3"),
  priority: 2,
  concerns: ["Object", "Variable", "Method"],
  needs: ["modelling rule", "no type above"],
  condition: "A node that belongs to no type has no modelling rule; one is allowed but means nothing.",
  why: "It is mostly left over from a copied declaration and lets readers look for a type that is not there.",
  check(node, ctx, report) {
    const rule = findModellingRule(ctx, node.key);
    if (rule === undefined || ctx.parentEdges(node.key).length === 0) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} is a plain instance and has the modelling rule ${ctx.nameOf(rule)}.`,
      facts: [`HasModellingRule: ${ctx.describe(rule)}`, "No type stands above it."],
    });
  },
  fix: modellingRuleFix("Remove the modelling rule", () => REMOVED),
  examples: {
    good: { text: "No rule.", build: (m) => m.variable("Speed", { parent: m.object("Pump1") }) },
    bad: {
      text: "Mandatory on a machine's tag.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), rule: "Mandatory" }),
    },
  },
};
