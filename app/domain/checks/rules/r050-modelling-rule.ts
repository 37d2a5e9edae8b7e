import { modellingRuleFix, REMOVED } from "../fixes";
import { StandardModellingRule, StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { findTypeDefinition, isChainLoaded, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r050: NodeRule = {
  id: "R050",
  title: "At most one modelling rule",
  severity: "error",
  clause: clause(3, "§7.12, §6.4.4.1"),
  priority: 1,
  concerns: ALL_CLASSES,
  needs: ["modelling rule"],
  condition:
    "Only Objects, Variables and Methods have a modelling rule, at most one, and it is an Object of ModellingRuleType or a subtype; rules of one's own are legal.",
  why: "With two rules nobody knows whether the member must exist on instances; a rule that is none is ignored.",
  check(node, ctx, report) {
    const rules = ctx
      .otherEdges(node.key)
      .filter((e) => e.type === R.HasModellingRule)
      .map((e) => e.target);
    const attribute = "references";
    const facts = rules.map((key) => `HasModellingRule: ${ctx.describe(key)}`);
    const name = node.browseName.name;
    if (rules.length > 0 && !["Object", "Variable", "Method"].includes(node.nodeClass)) {
      report({
        attribute,
        message: `The ${node.nodeClass} ${name} has a modelling rule.`,
        facts: [...facts, "Only Objects, Variables and Methods have one."],
      });
    }
    if (rules.length > 1) report({ attribute, message: `${name} has ${rules.length} modelling rules.`, facts });
    for (const key of rules) {
      const rule = ctx.node(key);
      if (!rule) continue;
      const type = findTypeDefinition(ctx, key);
      const isRule =
        rule.nodeClass === "Object" &&
        type !== undefined &&
        (isKindOf(ctx, type, T.ModellingRuleType) || !isChainLoaded(ctx, type));
      if (isRule) continue;
      report({
        attribute,
        message: `The modelling rule of ${name} is ${rule.browseName.name}, which is no modelling rule.`,
        facts: [...facts, `It is a ${rule.nodeClass} of type ${type === undefined ? "none" : ctx.describe(type)}`],
      });
    }
  },
  fix: modellingRuleFix("Keep the strictest rule", (node) => {
    if (!["Object", "Variable", "Method"].includes(node.nodeClass)) return REMOVED;
    const rules = node.references.filter((r) => r.type === R.HasModellingRule).map((r) => r.target);
    return rules.length > 1
      ? [StandardModellingRule.Mandatory, StandardModellingRule.Optional].find((r) => rules.includes(r))
      : undefined;
  }),
  examples: {
    good: {
      text: "One rule.",
      build: (m) => m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory" }),
    },
    bad: {
      text: "Mandatory and Optional at once.",
      build: (m) => {
        const speed = m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory" });
        m.reference(speed, R.HasModellingRule, StandardModellingRule.Optional);
        return speed;
      },
    },
  },
};
