import { StandardModellingRule as M } from "../../address-space/standard-ids";
import { findModellingRule } from "../lookups";
import { findInheritedMember, isPlaceholder } from "../members";
import { modellingRuleFix } from "../fixes";
import { clause, type NodeRule } from "../rule";

export const r079: NodeRule = {
  id: "R079",
  title: "Placeholder Methods become concrete in subtypes",
  severity: "error",
  clause: clause(3, "§6.4.4.4.4, §6.4.4.4.5"),
  priority: 2,
  concerns: ["Method"],
  condition:
    "A Method that overrides a placeholder Method is Optional or Mandatory where that was optional, Mandatory where it was mandatory.",
  why: "The placeholder only reserves the name; a subtype that repeats it as a placeholder still says nothing about the arguments.",
  check(node, ctx, report) {
    const rule = findModellingRule(ctx, node.key);
    for (const { source } of ctx.parentEdges(node.key)) {
      if (ctx.classOf(source) !== "ObjectType") continue;
      const base = findInheritedMember(ctx, source, node.browseName);
      if (!base || !isPlaceholder(base.rule) || base.node.key === node.key || rule === undefined) continue;
      const allowed = base.rule === M.MandatoryPlaceholder ? [M.Mandatory] : [M.Optional, M.Mandatory];
      if (allowed.some((r) => r === rule)) continue;
      report({
        attribute: "references",
        message: `The Method ${node.browseName.name} overrides a placeholder and is ${ctx.nameOf(rule)}.`,
        facts: [
          `Overridden: ${ctx.describe(base.node.key)}, ${ctx.nameOf(base.rule)}`,
          `Allowed here: ${allowed.map((r) => ctx.nameOf(r)).join(" or ")}`,
        ],
        data: { rule: allowed[0] ?? M.Mandatory },
      });
    }
  },
  fix: modellingRuleFix("Make it Optional, or Mandatory where it must be", (_node, finding) =>
    finding.data?.["rule"] === M.Optional
      ? M.Optional
      : finding.data?.["rule"] === M.Mandatory
        ? M.Mandatory
        : undefined,
  ),
  examples: {
    good: {
      text: "The subtype fills the placeholder.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.method("Calibrate", { parent: pump, rule: "OptionalPlaceholder" });
        m.method("Calibrate", { parent: m.objectType("FastPumpType", { supertype: pump }), rule: "Optional" });
        return undefined;
      },
    },
    bad: {
      text: "The subtype repeats it.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.method("Calibrate", { parent: pump, rule: "OptionalPlaceholder" });
        return m.method("Calibrate", {
          parent: m.objectType("FastPumpType", { supertype: pump }),
          rule: "OptionalPlaceholder",
        });
      },
    },
  },
};
