import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { typeDefinitionFix } from "../fixes";
import { getDataType } from "../../address-space/node";
import { findTypeDefinition } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r134: NodeRule = {
  id: "R134",
  title: "DiscreteItemType has no plain instance",
  severity: "error",
  clause: `${clause(8, "§5.3.3.1")}, ${clause(3, "§6.2.1")}`,
  priority: 2,
  concerns: ["Variable"],
  types: [T.DiscreteItemType],
  needs: ["no type above"],
  condition: "A plain instance has a concrete subtype of DiscreteItemType; a declaration may name the abstract type.",
  why: "Only the subtype says whether the value has two states, texts by place, or texts by value.",
  check(node, ctx, report) {
    if (findTypeDefinition(ctx, node.key) !== T.DiscreteItemType) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} is an instance of the abstract DiscreteItemType.`,
      facts: [
        `HasTypeDefinition: ${ctx.describe(T.DiscreteItemType)}`,
        "Concrete: TwoStateDiscreteType, MultiStateDiscreteType, MultiStateValueDiscreteType",
      ],
    });
  },
  fix: typeDefinitionFix("Make it a plain DataVariable", (node) =>
    node.nodeClass === "Variable" && getDataType(node) !== D.BaseDataType ? T.BaseDataVariableType : undefined,
  ),
  examples: {
    good: {
      text: "A declaration.",
      build: (m) =>
        m.variable("Mode", {
          parent: m.objectType("PumpType"),
          type: T.DiscreteItemType,
          dataType: D.Byte,
          rule: "Optional",
        }),
    },
    bad: {
      text: "An instance.",
      build: (m) => m.variable("Mode", { parent: m.object("Pump1"), type: T.DiscreteItemType, dataType: D.Byte }),
    },
  },
};
