import { keyOf, modellingRuleFix } from "../fixes";
import type { Severity } from "../../core/result";
import type { NodeKey } from "../../address-space/node-id";
import { StandardModellingRule as M } from "../../address-space/standard-ids";
import { findModellingRule, isInstanceDeclaration } from "../lookups";
import { findMemberAbove, isPlaceholder } from "../members";
import { addOverride } from "../example-overrides";
import { clause, type NodeRule } from "../rule";

export const r080: NodeRule = {
  id: "R080",
  title: "A modelling rule may only be tightened",
  severity: "error",
  clause: clause(3, "§6.4.4.2, Table 21, §6.4.4.3, §6.4.4.4.4, §6.4.4.4.5"),
  priority: 1,
  concerns: ["Object", "Variable", "Method"],
  needs: ["modelling rule", "declares members"],
  condition:
    "Where a declaration overrides an inherited one, or repeats one of its parent's type, Mandatory stays, Optional stays or becomes Mandatory, placeholders stay.",
  why: "Clients written for the base type rely on its Mandatory members; a subtype that makes one Optional breaks them.",
  check(node, ctx, report) {
    const rule = findModellingRule(ctx, node.key);
    if (rule === undefined || !isInstanceDeclaration(ctx, node.key)) return;
    for (const { source } of ctx.parentEdges(node.key)) {
      const base = findMemberAbove(ctx, source, node.browseName);
      if (!base || base.node.key === node.key) continue;
      if (node.nodeClass === "Method" && isPlaceholder(base.rule)) continue;
      const severity = judge(base.rule, rule);
      if (!severity) continue;
      report({
        severity,
        attribute: "references",
        message: `${node.browseName.name} is ${ctx.nameOf(rule)}, but ${ctx.nameOf(base.rule)} where it is inherited from.`,
        facts: [
          `Here: ${ctx.nameOf(rule)}, below ${ctx.describe(source)}`,
          `Inherited: ${ctx.nameOf(base.rule)}, ${ctx.describe(base.node.key)} of ${ctx.describe(base.owner)}`,
        ],
        data: { rule: base.rule, found: rule },
      });
    }
  },
  fix: modellingRuleFix("Take the inherited rule", (_node, finding) => keyOf(finding, "rule")),
  examples: {
    good: {
      text: "Optional becomes Mandatory in the subtype.",
      build: (m) => addOverride(m, "Optional", "Mandatory"),
    },
    bad: {
      text: "Mandatory becomes Optional in the subtype.",
      build: (m) => addOverride(m, "Mandatory", "Optional"),
    },
  },
};

/** Rules outside the standard's table are expected to stay; undefined means that the change is allowed. */
function judge(before: NodeKey, after: NodeKey): Severity | undefined {
  if (before === after) return undefined;
  if (before === M.Optional && after === M.Mandatory) return undefined;
  if (before === M.OptionalPlaceholder && after === M.MandatoryPlaceholder) return "warning";
  const isInTable = before === M.Mandatory || before === M.Optional || isPlaceholder(before);
  return isInTable ? "error" : "warning";
}
