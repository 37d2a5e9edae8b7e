import { getDataType, hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { isNumeric } from "../data-types";
import { attributeFix } from "../fixes";
import { findTypeDefinition, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r121: NodeRule = {
  id: "R121",
  title: "Analog items are numbers",
  severity: "error",
  clause: `${clause(8, "§5.3.2.2, Table 2")}, ${clause(3, "§6.2.8")}`,
  priority: 1,
  concerns: ["Variable"],
  types: [T.BaseAnalogType],
  condition: "The DataType of a Variable of BaseAnalogType or a subtype is Number or below.",
  why: "Range, unit and deadband have no meaning for anything else, and clients that plot the item fail.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined || !isKindOf(ctx, type, T.BaseAnalogType) || isNumeric(ctx, getDataType(node)) !== false)
      return;
    report({
      attribute: "dataType",
      message: `${node.browseName.name} is an analog item of the DataType ${ctx.nameOf(getDataType(node))}, which is no number.`,
      facts: [
        `HasTypeDefinition: ${ctx.describe(type)}`,
        `DataType: ${ctx.describe(getDataType(node))}${node.dataType === undefined ? " (left out)" : ""}`,
      ],
    });
  },
  fix: attributeFix("Make it Double", "dataType", (node) =>
    hasValueAttributes(node) && node.value === undefined ? D.Double : undefined,
  ),
  examples: {
    good: {
      text: "Float.",
      build: (m) => m.variable("Level", { parent: m.object("Tank1"), type: T.BaseAnalogType, dataType: D.Float }),
    },
    bad: {
      text: "String.",
      build: (m) => m.variable("Level", { parent: m.object("Tank1"), type: T.BaseAnalogType, dataType: D.String }),
    },
  },
};
