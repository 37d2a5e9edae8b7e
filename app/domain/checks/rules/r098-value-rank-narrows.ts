import { attributeFix } from "../fixes";
import { getValueRank, hasValueAttributes } from "../../address-space/node";
import { clause, type NodeRule } from "../rule";
import { listValueBases } from "../value-bases";

export const r098: NodeRule = {
  id: "R098",
  title: "ValueRank only restricted",
  severity: "error",
  clause: `${clause(3, "§6.2.8, §5.6.2, Table 13")}, UANodeSet.xsd`,
  priority: 1,
  concerns: ["Variable", "VariableType"],
  condition:
    "The ValueRank equals that of VariableType, supertype and declarations, or narrows it: −2 to anything, −3 to −1 or 1, 0 to a number of dimensions. Left out it is −1. Values below −3 do not exist.",
  why: "A client that expects a single value gets an array, or the other way round.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    const rank = getValueRank(node);
    const attribute = "valueRank";
    const written = node.valueRank === undefined ? " (the attribute is left out)" : "";
    if (rank < -3 || !Number.isInteger(rank)) {
      report({
        attribute,
        message: `The ValueRank ${formatRank(rank)} of ${node.browseName.name} does not exist.`,
        facts: [`ValueRank: ${formatRank(rank)}`, "Allowed: −3 and above"],
      });
      return;
    }
    for (const { base, role } of listValueBases(node, ctx)) {
      const wider = getValueRank(base);
      if (isRestriction(wider, rank)) continue;
      report({
        attribute,
        message: `The ValueRank ${formatRank(rank)} of ${node.browseName.name} does not fit ${formatRank(wider)} of ${role} ${base.browseName.name}.`,
        facts: [`Here: ${formatRank(rank)}${written}`, `${ctx.describe(base.key)}: ${formatRank(wider)}`],
        data: { valueRank: wider },
      });
    }
  },
  fix: attributeFix("Take the rank of the base", "valueRank", (node, { data }) =>
    hasValueAttributes(node) && node.value === undefined && node.arrayDimensions === undefined
      ? data?.["valueRank"]
      : undefined,
  ),
  examples: {
    good: {
      text: "A scalar of a VariableType that allows anything.",
      build: (m) =>
        m.variable("Speed", {
          parent: m.object("Pump1"),
          type: m.variableType("LevelType", { valueRank: -2 }),
          valueRank: -1,
        }),
    },
    bad: {
      text: "A scalar of a VariableType for arrays.",
      build: (m) =>
        m.variable("Levels", {
          parent: m.object("Pump1"),
          type: m.variableType("LevelsType", { valueRank: 1 }),
          valueRank: -1,
        }),
    },
  },
};

function isRestriction(wider: number, rank: number): boolean {
  if (wider === rank || wider === -2) return true;
  if (wider === -3) return rank === -1 || rank === 1;
  return wider === 0 && rank > 0;
}

function formatRank(rank: number): string {
  return String(rank).replace("-", "−");
}
