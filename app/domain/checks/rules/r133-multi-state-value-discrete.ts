import { getDataType } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { checkProperties, findItemType } from "../discrete-items";
import { enumValues } from "../example-values";
import { findStandardProperty, isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { listBodies, textOf } from "../value-xml";

export const r133: NodeRule = {
  id: "R133",
  title: "MultiStateValueDiscreteType complete",
  severity: "error",
  clause: `${clause(8, "§5.3.3.4, Table 9")}, ${clause(3, "§8.39")}`,
  priority: 1,
  concerns: ["Variable"],
  types: [T.MultiStateValueDiscreteType],
  condition:
    "The DataType is an integer of at most 64 bit, or Number, Integer, UInteger on declarations; on instances EnumValues and ValueAsText exist; the values in EnumValues are unique.",
  why: "Clients look the text up by the value: without the list, or with one value twice, a fault is shown under a wrong name.",
  check(node, ctx, report) {
    const type = findItemType(node, ctx, T.MultiStateValueDiscreteType);
    if (type === undefined || node.nodeClass !== "Variable") return;
    const dataType = getDataType(node);
    const name = node.browseName.name;
    if (isChainLoaded(ctx, dataType) && !isInteger(ctx, dataType)) {
      report({
        attribute: "dataType",
        message: `${name} is of ${ctx.nameOf(type)} and has the DataType ${ctx.nameOf(dataType)}.`,
        facts: [`DataType: ${ctx.describe(dataType)}`, "Asked for: an integer"],
      });
    }
    checkProperties(
      node,
      type,
      [
        { name: "EnumValues", dataType: D.EnumValueType },
        { name: "ValueAsText", dataType: D.LocalizedText },
      ],
      ctx,
      report,
    );
    const property = findStandardProperty(ctx, node.key, "EnumValues");
    const values =
      property?.nodeClass === "Variable"
        ? listBodies(property.value, "EnumValueType").map((b) => textOf(b, "Value") || "0")
        : [];
    const twice = values.find((value, i) => values.indexOf(value) !== i);
    if (twice !== undefined)
      report({
        message: `EnumValues of ${name} has the value ${twice} twice.`,
        facts: [`Values: ${values.join(", ")}`],
      });
  },
  examples: {
    good: {
      text: "Two values with texts.",
      build: (m) =>
        void addItem(m, [
          [0, "none"],
          [11, "yarn break"],
        ]),
    },
    bad: {
      text: "One value twice.",
      build: (m) =>
        addItem(m, [
          [11, "none"],
          [11, "yarn break"],
        ]),
    },
  },
};

function isInteger(ctx: CheckContext, dataType: NodeKey): boolean {
  return dataType === D.Number || isKindOf(ctx, dataType, D.Integer) || isKindOf(ctx, dataType, D.UInteger);
}

function addItem(
  m: Parameters<NodeRule["examples"]["good"]["build"]>[0],
  pairs: readonly (readonly [number, string])[],
): NodeKey {
  const parent = m.variable("FaultNumber", {
    parent: m.object("Pump1"),
    type: T.MultiStateValueDiscreteType,
    dataType: D.UInt16,
  });
  m.property("0:EnumValues", {
    parent,
    dataType: D.EnumValueType,
    valueRank: 1,
    arrayDimensions: "0",
    value: enumValues(...pairs),
  });
  m.property("0:ValueAsText", { parent, dataType: D.LocalizedText });
  return parent;
}
