import { getDataType, hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { listFields } from "../data-types";
import { localizedTexts, scalar } from "../example-values";
import { isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { findValueRoot } from "../value-xml";

export const r104: NodeRule = {
  id: "R104",
  title: "Value is one of the enumeration",
  severity: "warning",
  clause: `${clause(3, "§5.8.2, §8.14, §8.52")} (inferred)`,
  priority: 2,
  concerns: ["Variable", "VariableType"],
  needs: ["value"],
  condition: "An Int32 value of an enumeration is one of the defined fields, those of the supertype included.",
  why: "Clients show the bare number, or nothing.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    const dataType = getDataType(node);
    const root = findValueRoot(node.value);
    if (!root || !isKindOf(ctx, dataType, D.Enumeration) || !isChainLoaded(ctx, dataType)) return;
    const values = listFields(ctx, dataType).map((f) => f.value ?? -1);
    const elements = root.name === "Int32" ? [root] : root.children.filter((c) => c.name === "Int32");
    const wrong = elements
      .map((e) => e.text.trim())
      .find((text) => /^-?\d+$/.test(text) && !values.includes(Number(text)));
    // 0 is what a server starts with where nothing else is known.
    if (values.length === 0 || wrong === undefined || wrong === "0") return;
    report({
      attribute: "value",
      message: `The Value ${wrong} of ${node.browseName.name} is not defined by ${ctx.nameOf(dataType)}.`,
      facts: [`DataType: ${ctx.describe(dataType)}`, `Its values: ${values.join(", ")}`],
    });
  },
  examples: {
    good: {
      text: "A defined value.",
      build: (m) =>
        m.variable("State", { parent: m.object("Pump1"), dataType: stateEnum(m), value: scalar("Int32", 1) }),
    },
    bad: {
      text: "99 of two values.",
      build: (m) =>
        m.variable("State", { parent: m.object("Pump1"), dataType: stateEnum(m), value: scalar("Int32", 99) }),
    },
  },
};

function stateEnum(m: Parameters<NodeRule["examples"]["good"]["build"]>[0]): ReturnType<typeof m.dataType> {
  const fields = [
    { name: "Off", value: 0 },
    { name: "On", value: 1 },
  ];
  const type = m.dataType("PumpStateEnum", { supertype: D.Enumeration, definition: { fields } });
  m.property("0:EnumStrings", {
    parent: type,
    dataType: D.LocalizedText,
    valueRank: 1,
    arrayDimensions: "0",
    value: localizedTexts("Off", "On"),
  });
  return type;
}
