import { StandardDataType as D } from "../../address-space/standard-ids";
import { scalar } from "../example-values";
import { findStandardProperty } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { findValueRoot } from "../value-xml";

export const r117: NodeRule = {
  id: "R117",
  title: "FixedSizeArray has dimensions",
  severity: "error",
  clause: clause(3, "§5.6.2, Table 13"),
  priority: 2,
  concerns: ["Variable"],
  needs: ["children"],
  condition: "Where FixedSizeArray is true, ArrayDimensions is given and every entry is above 0.",
  why: "A fixed size that is not said helps nobody.",
  check(node, ctx, report) {
    const property = findStandardProperty(ctx, node.key, "FixedSizeArray");
    if (node.nodeClass !== "Variable" || property?.nodeClass !== "Variable") return;
    const text = findValueRoot(property.value)?.text.trim();
    if (text !== "true" && text !== "1") return;
    const entries = (node.arrayDimensions ?? "").split(",").filter((entry) => entry.trim() !== "");
    if (entries.length > 0 && entries.every((entry) => Number(entry) > 0)) return;
    report({
      attribute: "arrayDimensions",
      message: `${node.browseName.name} is an array of fixed size that does not say which.`,
      facts: ["FixedSizeArray: true", `ArrayDimensions: ${node.arrayDimensions ?? "none"}`],
    });
  },
  examples: {
    good: {
      text: "Three entries.",
      build: (m) =>
        m.property("0:FixedSizeArray", {
          parent: m.variable("Levels", { parent: m.object("Pump1"), valueRank: 1, arrayDimensions: "3" }),
          dataType: D.Boolean,
          value: scalar("Boolean", true),
        }),
    },
    bad: {
      text: "Any number of entries.",
      build: (m) => {
        const levels = m.variable("Levels", { parent: m.object("Pump1"), valueRank: 1, arrayDimensions: "0" });
        m.property("0:FixedSizeArray", { parent: levels, dataType: D.Boolean, value: scalar("Boolean", true) });
        return levels;
      },
    },
  },
};
