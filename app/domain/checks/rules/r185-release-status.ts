import { attributeFix, REMOVED } from "../fixes";
import { isInstanceDeclaration } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r185: NodeRule = {
  id: "R185",
  title: "No ReleaseStatus on instance declarations",
  severity: "warning",
  clause: clause(6, "§F.3"),
  priority: 2,
  concerns: ["Object", "Variable", "Method"],
  attributes: ["releaseStatus"],
  condition: "ReleaseStatus stands on types and free instances, not on members of a type, which share its status.",
  why: "A type that is released with a draft inside is neither.",
  check(node, ctx, report) {
    if (node.releaseStatus === undefined || node.releaseStatus === "Released" || !isInstanceDeclaration(ctx, node.key))
      return;
    report({
      attribute: "releaseStatus",
      message: `The declaration ${node.browseName.name} is marked ${node.releaseStatus}.`,
      facts: [`ReleaseStatus: ${node.releaseStatus}`],
    });
  },
  fix: attributeFix("Remove the mark", "releaseStatus", (node) =>
    node.releaseStatus === undefined ? undefined : REMOVED,
  ),
  examples: {
    good: { text: "Draft on the type.", build: (m) => m.objectType("PumpType", { set: { releaseStatus: "Draft" } }) },
    bad: {
      text: "Draft on a member.",
      build: (m) =>
        m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory", set: { releaseStatus: "Draft" } }),
    },
  },
};
