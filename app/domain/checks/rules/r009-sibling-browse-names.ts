import type { NodeKey } from "../../address-space/node-id";
import { toNameText } from "../members";
import { clause, type NodeRule } from "../rule";

export const r009: NodeRule = {
  id: "R009",
  title: "Sibling BrowseNames unique under types and instance declarations",
  severity: "error",
  clause: clause(3, "§4.6.4, §5.5.1, §5.5.2, §5.6.4, §5.6.5, §5.7.1, §6.2.6"),
  priority: 1,
  concerns: ["ObjectType", "VariableType", "Object", "Variable", "Method"],
  needs: ["children", "declares members"],
  condition: "All children of a type or an instance declaration have different BrowseNames, namespace included.",
  why: "A browse path from the type would have two targets, so instances cannot say which of the two a member comes from.",
  check(node, ctx, report) {
    const first = new Map<string, NodeKey>();
    for (const { target } of ctx.childEdges(node.key)) {
      const child = ctx.node(target);
      if (!child) continue;
      const name = toNameText(child.browseName);
      const twin = first.get(name);
      if (twin === undefined) first.set(name, target);
      if (twin === undefined || twin === target) continue;
      report({
        key: ctx.isOwn(target) ? target : node.key,
        attribute: "browseName",
        message: `${node.browseName.name} has two children named ${child.browseName.name}.`,
        facts: [`One: ${ctx.describe(twin)}`, `The other: ${ctx.describe(target)}`, `BrowseName of both: ${name}`],
      });
    }
  },
  examples: {
    good: {
      text: "Two members, two names.",
      build: (m) => {
        const parent = m.objectType("PumpType");
        m.variable("Speed", { parent, rule: "Mandatory" });
        m.variable("SpeedSetpoint", { parent, rule: "Mandatory" });
        return undefined;
      },
    },
    bad: {
      text: "Two members named Speed below one type.",
      build: (m) => {
        const parent = m.objectType("PumpType");
        m.variable("Speed", { parent, rule: "Mandatory" });
        return m.variable("Speed", { parent, rule: "Optional" });
      },
    },
  },
};
