import { attributeFix } from "../fixes";
import { findTypeAbove, findTypeDefinition } from "../lookups";
import { getMembers, isNaming, toNameText } from "../members";
import { clause, type NodeRule } from "../rule";

export const r092: NodeRule = {
  id: "R092",
  title: "A copied Method names the Method of its type",
  severity: "hint",
  clause: `${clause(3, "§6.4.2")}, ${clause(6, "§F.9")}`,
  priority: 2,
  concerns: ["Method"],
  condition:
    "An instance refers to its type's Method or to a copy; a copy should name the original as its MethodDeclarationId.",
  why: "A server then knows which implementation belongs to the copy.",
  check(node, ctx, report) {
    if (
      node.nodeClass !== "Method" ||
      node.methodDeclaration !== undefined ||
      findTypeAbove(ctx, node.key) !== undefined
    )
      return;
    for (const { source } of ctx.parentEdges(node.key)) {
      const type = findTypeDefinition(ctx, source);
      const member = type === undefined ? undefined : getMembers(ctx, type).get(toNameText(node.browseName));
      if (!member || !isNaming(member.rule) || member.node.nodeClass !== "Method" || member.node.key === node.key)
        continue;
      report({
        attribute: "methodDeclaration",
        message: `The Method ${node.browseName.name} does not name the Method of its type.`,
        facts: [
          `The type's: ${ctx.describe(member.node.key)} of ${ctx.describe(member.owner)}`,
          "MethodDeclarationId: none",
        ],
        data: { declaration: member.node.key },
      });
      return;
    }
  },
  fix: attributeFix("Set MethodDeclarationId", "methodDeclaration", (_node, finding) => finding.data?.["declaration"]),
  examples: {
    good: {
      text: "The copy names its original.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        const start = m.method("Start", { parent: pump, rule: "Mandatory" });
        m.method("Start", { parent: m.object("Pump1", { type: pump }), set: { methodDeclaration: start } });
        return undefined;
      },
    },
    bad: {
      text: "The copy names nothing.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.method("Start", { parent: pump, rule: "Mandatory" });
        return m.method("Start", { parent: m.object("Pump1", { type: pump }) });
      },
    },
  },
};
