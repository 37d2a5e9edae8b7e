import type { NodeKey } from "../../address-space/node-id";
import { findModellingRule, findTypeDefinition, isChainLoaded, isKindOf } from "../lookups";
import { findInheritedMember, isNaming } from "../members";
import { typeDefinitionFix } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { StandardType as T } from "../../address-space/standard-ids";

export const r082: NodeRule = {
  id: "R082",
  title: "An override keeps NodeClass and type",
  severity: "error",
  clause: clause(3, "§6.3.3.3, §6.2.7"),
  priority: 1,
  concerns: ["Object", "Variable", "Method"],
  needs: ["member of type"],
  condition:
    "A child of a type with the BrowseName of an inherited declaration has its NodeClass, its type or a subtype, and a modelling rule of its own.",
  why: "Clients written for the base type find another kind of node at the path that they know.",
  check(node, ctx, report) {
    for (const { source } of ctx.parentEdges(node.key)) {
      const owner = ctx.classOf(source);
      if (owner !== "ObjectType" && owner !== "VariableType") continue;
      const base = findInheritedMember(ctx, source, node.browseName);
      if (!base || base.node.key === node.key || !isNaming(base.rule)) continue;
      const facts = [
        `Inherited: ${base.node.nodeClass} ${ctx.describe(base.node.key)} of ${ctx.describe(base.owner)}`,
        `Here: ${node.nodeClass} below ${ctx.describe(source)}`,
      ];
      const name = node.browseName.name;
      if (node.nodeClass !== base.node.nodeClass) {
        report({ message: `${name} overrides a ${base.node.nodeClass} by a ${node.nodeClass}.`, facts });
        continue;
      }
      if (findModellingRule(ctx, node.key) === undefined) {
        report({
          attribute: "references",
          message: `${name} overrides an inherited declaration and has no modelling rule.`,
          facts: [...facts, "HasModellingRule references: 0"],
        });
      }
      const [wanted, found] = [findTypeDefinition(ctx, base.node.key), findTypeDefinition(ctx, node.key)];
      if (wanted === undefined || found === undefined || isKindOf(ctx, found, wanted) || !isChainLoaded(ctx, found))
        continue;
      report({
        attribute: "references",
        message: `${name} overrides a ${ctx.nameOf(wanted)} by a ${ctx.nameOf(found)}, which does not derive from it.`,
        facts: [...facts, `Type inherited: ${ctx.describe(wanted)}`, `Type here: ${ctx.describe(found)}`],
        data: { type: wanted },
      });
    }
  },
  fix: typeDefinitionFix("Take the inherited type", (_node, finding) => finding.data?.["type"] as NodeKey | undefined),
  examples: {
    good: {
      text: "A subtype of the inherited type.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: pump, rule: "Optional" });
        m.variable("Speed", {
          parent: m.objectType("FastPumpType", { supertype: pump }),
          rule: "Mandatory",
          type: T.BaseAnalogType,
        });
        return undefined;
      },
    },
    bad: {
      text: "Another type.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: pump, rule: "Optional", type: T.BaseAnalogType });
        return m.variable("Speed", { parent: m.objectType("FastPumpType", { supertype: pump }), rule: "Mandatory" });
      },
    },
  },
};
