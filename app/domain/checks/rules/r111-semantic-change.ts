import { getAccessLevel } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { attributeFix } from "../fixes";
import { isProperty } from "../lookups";
import { clause, type NodeRule } from "../rule";

const SEMANTIC = [
  "EURange",
  "EngineeringUnits",
  "InstrumentRange",
  "EnumStrings",
  "EnumValues",
  "TrueState",
  "FalseState",
  "Title",
  "AxisScaleType",
  "ValuePrecision",
];
const WRITE = 2;
const SEMANTIC_CHANGE = 16;

export const r111: NodeRule = {
  id: "R111",
  title: "Writable semantic Properties announce their change",
  severity: "warning",
  clause: `${clause(3, "§5.6.2, §8.57")}, ${clause(8, "§5.2")}`,
  priority: 2,
  concerns: ["Variable"],
  standardNames: SEMANTIC,
  condition:
    "A standard Property that gives a value its meaning (range, unit, texts) and can be written has bit 4, SemanticChange, in AccessLevel.",
  why: "Clients keep unit and range: without the bit they do not know that these may change, and show wrong numbers.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable") return;
    const access = getAccessLevel(node);
    if ((access & WRITE) === 0 || (access & SEMANTIC_CHANGE) !== 0 || !isProperty(ctx, node.key)) return;
    report({
      attribute: "accessLevel",
      message: `${node.browseName.name} can be written but does not announce it.`,
      facts: [`AccessLevel: ${access}`, "Bit 1 (write) is set, bit 4 (semantic change) is not."],
    });
  },
  fix: attributeFix("Set bit 4", "accessLevel", (node) =>
    node.nodeClass === "Variable" && (getAccessLevel(node) & SEMANTIC_CHANGE) === 0
      ? getAccessLevel(node) | SEMANTIC_CHANGE
      : undefined,
  ),
  examples: {
    good: {
      text: "Write and semantic change.",
      build: (m) =>
        m.property("0:ValuePrecision", {
          parent: m.variable("Speed", { parent: m.object("Pump1") }),
          dataType: D.Double,
          set: { accessLevel: 19 },
        }),
    },
    bad: {
      text: "Write only.",
      build: (m) =>
        m.property("0:ValuePrecision", {
          parent: m.variable("Speed", { parent: m.object("Pump1") }),
          dataType: D.Double,
          set: { accessLevel: 3 },
        }),
    },
  },
};
