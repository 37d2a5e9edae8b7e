import { getDataType } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { findTypeDefinition } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r096: NodeRule = {
  id: "R096",
  title: "DataType left at BaseDataType",
  severity: "warning",
  clause: clause(3, "§5.6.2"),
  priority: 1,
  concerns: ["Variable"],
  needs: ["no type above"],
  condition: "A plain instance states the most restrictive DataType that holds; declarations may leave it open.",
  why: "BaseDataType allows anything: clients cannot prepare a display, a history or a tag of the right type.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable" || getDataType(node) !== D.BaseDataType) return;
    if (ctx.parentEdges(node.key).length === 0) return;
    const type = findTypeDefinition(ctx, node.key);
    report({
      attribute: "dataType",
      message: `The DataType of ${node.browseName.name} is left open.`,
      facts: [
        `DataType: BaseDataType${node.dataType === undefined ? ", since the attribute is left out" : ""}`,
        ...(type === undefined ? [] : [`HasTypeDefinition: ${ctx.describe(type)}`]),
      ],
    });
  },
  examples: {
    good: { text: "Float.", build: (m) => m.variable("Speed", { parent: m.object("Pump1"), dataType: D.Float }) },
    bad: {
      text: "BaseDataType.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), dataType: D.BaseDataType }),
    },
  },
};
