import { getValueRank } from "../../address-space/node";
import { StandardModellingRule as M } from "../../address-space/standard-ids";
import { findModellingRule } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r081: NodeRule = {
  id: "R081",
  title: "ExposesItsArray below VariableTypes of arrays only",
  severity: "error",
  clause: clause(3, "§6.4.4.4.3"),
  priority: 2,
  concerns: ["Object", "Variable", "Method"],
  needs: ["modelling rule"],
  condition: "A declaration with the rule ExposesItsArray is a Variable below a VariableType with ValueRank 0 or more.",
  why: "The rule stands for one Variable per array entry; where there is no array, nothing is made.",
  check(node, ctx, report) {
    if (findModellingRule(ctx, node.key) !== M.ExposesItsArray) return;
    const parents = ctx.parentEdges(node.key).map((e) => ctx.node(e.source));
    const isRight =
      node.nodeClass === "Variable" &&
      parents.every((p) => p === undefined || (p.nodeClass === "VariableType" && getValueRank(p) >= 0));
    if (isRight) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} has the rule ExposesItsArray but exposes no array.`,
      facts: [
        `NodeClass: ${node.nodeClass}`,
        ...parents.flatMap((p) => (p ? [`Below ${ctx.describe(p.key)}, ${p.nodeClass}`] : [])),
      ],
    });
  },
  examples: {
    good: {
      text: "Below a VariableType of an array.",
      build: (m) =>
        m.variable("<Entry>", { parent: m.variableType("LevelsType", { valueRank: 1 }), rule: "ExposesItsArray" }),
    },
    bad: {
      text: "Below an ObjectType.",
      build: (m) => m.variable("<Entry>", { parent: m.objectType("PumpType"), rule: "ExposesItsArray" }),
    },
  },
};
