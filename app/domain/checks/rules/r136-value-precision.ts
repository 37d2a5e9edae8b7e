import { StandardDataType as D } from "../../address-space/standard-ids";
import { scalar } from "../example-values";
import { attributeFix } from "../fixes";
import { isProperty } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { findValueRoot } from "../value-xml";

export const r136: NodeRule = {
  id: "R136",
  title: "ValuePrecision is a whole number",
  severity: "warning",
  clause: clause(8, "§5.3.1"),
  priority: 2,
  concerns: ["Variable"],
  standardNames: ["ValuePrecision"],
  needs: ["value"],
  condition: "The value of ValuePrecision is a whole number, although its DataType is Double.",
  why: "It counts digits; half a digit is shown as any.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable") return;
    const text = findValueRoot(node.value)?.text.trim() ?? "";
    if (text === "" || Number.isInteger(Number(text)) || Number.isNaN(Number(text)) || !isProperty(ctx, node.key))
      return;
    report({
      attribute: "value",
      message: `ValuePrecision is ${text}, which is no whole number.`,
      facts: [`Value: ${text}`],
    });
  },
  fix: attributeFix("Round it", "value", (node) => {
    const text = node.nodeClass === "Variable" ? (findValueRoot(node.value)?.text.trim() ?? "") : "";
    return text === "" || Number.isNaN(Number(text)) ? undefined : scalar("Double", Math.round(Number(text)));
  }),
  examples: {
    good: {
      text: "2.",
      build: (m) =>
        m.property("0:ValuePrecision", {
          parent: m.variable("Speed", { parent: m.object("Pump1") }),
          dataType: D.Double,
          value: scalar("Double", 2),
        }),
    },
    bad: {
      text: "1.5.",
      build: (m) =>
        m.property("0:ValuePrecision", {
          parent: m.variable("Speed", { parent: m.object("Pump1") }),
          dataType: D.Double,
          value: scalar("Double", 1.5),
        }),
    },
  },
};
