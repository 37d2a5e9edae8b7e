import { getAccessLevel } from "../../address-space/node";
import { attributeFix } from "../fixes";
import { findTypeAbove } from "../lookups";
import { clause, type NodeRule } from "../rule";

const HISTORY_READ = 4;

export const r112: NodeRule = {
  id: "R112",
  title: "Historizing and history bits agree",
  severity: "error",
  clause: `${clause(11, "§4.7")}, ${clause(3, "§5.6.2")}`,
  priority: 1,
  concerns: ["Variable"],
  attributes: ["historizing"],
  condition:
    "A Variable that is being historized can be read in history: bit 2 of AccessLevel. On declarations a hint; the bit without Historizing is legal.",
  why: "The server records what nobody may read.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Variable" || node.historizing !== true || (getAccessLevel(node) & HISTORY_READ) !== 0)
      return;
    report({
      ...(findTypeAbove(ctx, node.key) === undefined ? {} : { severity: "hint" }),
      attribute: "accessLevel",
      message: `${node.browseName.name} is historized, but its history cannot be read.`,
      facts: ["Historizing: true", `AccessLevel: ${getAccessLevel(node)}, bit 2 is not set`],
    });
  },
  fix: attributeFix("Allow reading the history", "accessLevel", (node) =>
    node.nodeClass === "Variable" && (getAccessLevel(node) & HISTORY_READ) === 0
      ? getAccessLevel(node) | HISTORY_READ
      : undefined,
  ),
  examples: {
    good: {
      text: "Read and history read.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), set: { historizing: true, accessLevel: 5 } }),
    },
    bad: {
      text: "Read only.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), set: { historizing: true, accessLevel: 1 } }),
    },
  },
};
