import { attributeFix, REMOVED } from "../fixes";
import { getValueRank, hasValueAttributes } from "../../address-space/node";
import { clause, type NodeRule } from "../rule";
import { count } from "../texts";

export const r099: NodeRule = {
  id: "R099",
  title: "As many ArrayDimensions as the rank says",
  severity: "error",
  clause: `${clause(3, "§5.6.2, Table 13, §5.6.5, Table 14")}, ${clause(5, "§5.3, §5.4")}`,
  priority: 1,
  concerns: ["Variable", "VariableType"],
  attributes: ["arrayDimensions"],
  condition:
    "With ValueRank n > 0 ArrayDimensions has n entries where it is given; a scalar, and a VariableType without a fixed rank, have none. On a Variable with rank 0, −2 or −3 they are a warning.",
  why: "Servers refuse the Variable or ignore the lengths; clients size their buffers after them.",
  check(node, _ctx, report) {
    if (!hasValueAttributes(node)) return;
    const text = node.arrayDimensions?.trim() ?? "";
    if (text === "") return;
    const rank = getValueRank(node);
    const entries = text.split(",").length;
    if (rank > 0 && entries === rank) return;
    const isWarning = rank !== -1 && rank <= 0 && node.nodeClass === "Variable";
    const shown = String(rank).replace("-", "−");
    report({
      ...(isWarning ? { severity: "warning" } : {}),
      attribute: "arrayDimensions",
      message:
        rank > 0
          ? `ArrayDimensions of ${node.browseName.name} has ${count(entries, "entry", "entries")} for ${count(rank, "dimension")}.`
          : `ArrayDimensions of ${node.browseName.name} is given, but the ValueRank is ${shown}.`,
      facts: [
        `ArrayDimensions: ${text}`,
        `ValueRank: ${shown}${node.valueRank === undefined ? " (the attribute is left out)" : ""}`,
      ],
      data: { rank },
    });
  },
  fix: attributeFix("Fill it with 0 for each dimension, or leave it out", "arrayDimensions", (node) => {
    if (!hasValueAttributes(node) || !node.arrayDimensions) return undefined;
    const rank = getValueRank(node);
    return rank > 0 ? Array.from({ length: rank }, () => "0").join(",") : REMOVED;
  }),
  examples: {
    good: {
      text: "Two dimensions, two entries.",
      build: (m) => m.variable("Map", { parent: m.object("Pump1"), valueRank: 2, arrayDimensions: "0,0" }),
    },
    bad: {
      text: "A scalar with array dimensions.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), valueRank: -1, arrayDimensions: "0" }),
    },
  },
};
