import { isAbstract } from "../../address-space/node";
import { findModellingRule, findTypeAbove, findTypeDefinition } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardType } from "../../address-space/standard-ids";
import { StandardNode } from "../standard-nodes";

export const r066: NodeRule = {
  id: "R066",
  title: "An abstract type has no plain instance",
  severity: "error",
  clause: clause(3, "§5.5.2, Table 12, §5.6.5, Table 14, §6.2.1, §6.4.4.3"),
  priority: 1,
  concerns: ["Object", "Variable"],
  condition:
    "The type definition of a plain instance is not abstract; an instance declaration may name an abstract type.",
  why: "Servers refuse to create an instance of an abstract type: only a subtype says what the node really is.",
  check(node, ctx, report) {
    const typeKey = findTypeDefinition(ctx, node.key);
    const type = typeKey === undefined ? undefined : ctx.node(typeKey);
    // DiscreteItemType and ArrayItemType have rules of their own, R134 and R135.
    if (
      !type ||
      !isAbstract(type) ||
      type.key === StandardType.DiscreteItemType ||
      type.key === StandardNode.ArrayItemType
    )
      return;
    const hasRule = findModellingRule(ctx, node.key) !== undefined;
    if (hasRule && findTypeAbove(ctx, node.key) !== undefined) return;
    const isDetached = hasRule && ctx.parentEdges(node.key).length === 0;
    report({
      ...(isDetached ? { severity: "hint" } : {}),
      attribute: "references",
      message: `${node.browseName.name} is an instance of the abstract type ${type.browseName.name}.`,
      facts: [
        `HasTypeDefinition: ${ctx.describe(type.key)}`,
        "IsAbstract of the type: true",
        hasRule
          ? "It has a modelling rule, but no type above it."
          : "It has no modelling rule, so it is a plain instance.",
      ],
      data: { type: type.key },
    });
  },
  examples: {
    good: {
      text: "An instance of a concrete subtype.",
      build: (m) => {
        const base = m.objectType("MachineType", { isAbstract: true });
        return m.object("Pump1", { type: m.objectType("PumpType", { supertype: base }) });
      },
    },
    bad: {
      text: "An instance of the abstract type itself.",
      build: (m) => m.object("Pump1", { type: m.objectType("MachineType", { isAbstract: true }) }),
    },
  },
};
