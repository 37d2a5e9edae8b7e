import { hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { range } from "../example-values";
import { attributeFix } from "../fixes";
import { formatRange, listRanges } from "../ranges";
import { clause, type NodeRule } from "../rule";

export const r128: NodeRule = {
  id: "R128",
  title: "Low of a range not above High",
  severity: "warning",
  clause: `${clause(8, "§5.6.2, Table 17")} (inferred)`,
  priority: 2,
  concerns: ["Variable", "VariableType"],
  needs: ["value"],
  condition: "Neither limit of a Range being NaN, Low is at most High. Equal limits are legal.",
  why: "Displays divide by the span and draw upside down or not at all.",
  check(node, _ctx, report) {
    if (!hasValueAttributes(node)) return;
    for (const value of listRanges(node.value)) {
      if (!(value.low > value.high)) continue;
      report({
        attribute: "value",
        message: `The range of ${node.browseName.name} is upside down: ${formatRange(value)}.`,
        facts: [`Low: ${value.low}`, `High: ${value.high}`],
      });
    }
  },
  fix: attributeFix("Swap the limits", "value", (node) => {
    const [value, second] = hasValueAttributes(node) ? listRanges(node.value) : [];
    return value && !second && value.low > value.high ? range(value.high, value.low) : undefined;
  }),
  examples: {
    good: {
      text: "0 … 100.",
      build: (m) => m.property("Limits", { parent: m.object("Pump1"), dataType: D.Range, value: range(0, 100) }),
    },
    bad: {
      text: "100 … 0.",
      build: (m) => m.property("Limits", { parent: m.object("Pump1"), dataType: D.Range, value: range(100, 0) }),
    },
  },
};
