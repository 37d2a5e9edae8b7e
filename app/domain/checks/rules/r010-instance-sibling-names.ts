import { findTypeDefinition } from "../lookups";
import { getChildren, getMembers, isNaming } from "../members";
import { clause, type NodeRule } from "../rule";

export const r010: NodeRule = {
  id: "R010",
  title: "No second child with the name of a declared member",
  severity: "warning",
  clause: clause(3, "§6.4.2, §6.4.1, §4.6.4"),
  priority: 2,
  concerns: ["Object", "Variable"],
  needs: ["children", "no type above"],
  condition:
    "A plain instance has one child of the name of a Mandatory or Optional declaration of its type. Other names may repeat.",
  why: "A browse path from the type answers two nodes: a client that takes the first may read the wrong one.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined) return;
    const members = getMembers(ctx, type);
    for (const [name, same] of getChildren(ctx, node.key)) {
      const member = members.get(name);
      const second = same[1];
      if (!member || !second || !isNaming(member.rule)) continue;
      report({
        message: `${node.browseName.name} has ${same.length} children named ${second.browseName.name}, a member that ${ctx.nameOf(type)} declares.`,
        facts: [
          ...same.map((child) => `Child: ${ctx.describe(child.key)}`),
          `Declared: ${ctx.describe(member.node.key)}`,
        ],
      });
    }
  },
  examples: {
    good: {
      text: "One child of the declared name.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: pump, rule: "Mandatory" });
        m.variable("Speed", { parent: m.object("Pump1", { type: pump }) });
        return undefined;
      },
    },
    bad: {
      text: "Two children of the declared name.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.variable("Speed", { parent: pump, rule: "Mandatory" });
        const parent = m.object("Pump1", { type: pump });
        m.variable("Speed", { parent });
        m.variable("Speed", { parent });
        return parent;
      },
    },
  },
};
