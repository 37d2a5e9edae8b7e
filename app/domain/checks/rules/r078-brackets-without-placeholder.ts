import { StandardModellingRule as M } from "../../address-space/standard-ids";
import { findModellingRule } from "../lookups";
import { isNaming } from "../members";
import { modellingRuleFix } from "../fixes";
import { clause, type NodeRule } from "../rule";

export const r078: NodeRule = {
  id: "R078",
  title: "Name in angle brackets without placeholder rule",
  severity: "hint",
  clause: `common practice, no source (the reverse of ${clause(3, "§6.4.4.4.4")})`,
  priority: 2,
  concerns: ["Object", "Variable"],
  needs: ["modelling rule"],
  condition: "A declaration named in angle brackets has a placeholder rule.",
  why: "As Mandatory or Optional it asks instances for a member with the brackets in its name.",
  check(node, ctx, report) {
    const rule = findModellingRule(ctx, node.key);
    if (rule === undefined || !isNaming(rule) || !/^<.*>$/s.test(node.browseName.name)) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} is named like a placeholder but is ${ctx.nameOf(rule)}.`,
      facts: [`BrowseName: ${node.browseName.name}`, `HasModellingRule: ${ctx.nameOf(rule)}`],
      data: { rule },
    });
  },
  fix: modellingRuleFix("Make it a placeholder", (_node, finding) =>
    finding.data?.["rule"] === M.Mandatory
      ? M.MandatoryPlaceholder
      : finding.data?.["rule"] === M.Optional
        ? M.OptionalPlaceholder
        : undefined,
  ),
  examples: {
    good: {
      text: "A placeholder.",
      build: (m) => m.object("<Sensor>", { parent: m.objectType("LineType"), rule: "OptionalPlaceholder" }),
    },
    bad: {
      text: "A mandatory member named like one.",
      build: (m) => m.object("<Sensor>", { parent: m.objectType("LineType"), rule: "Mandatory" }),
    },
  },
};
