import { keepBits, listSurplusBits } from "../bit-rules";
import { attributeFix } from "../fixes";
import { clause, type NodeRule } from "../rule";

/** Bits 0–6 of AccessLevel and 8–13 of AccessLevelEx. */
const ALLOWED = 0x3f7f;

export const r107: NodeRule = {
  id: "R107",
  title: "Bits of AccessLevel",
  severity: "error",
  clause: `${clause(3, "§8.57, §8.58")}, ${clause(6, "§F.8")}`,
  priority: 1,
  concerns: ["Variable"],
  attributes: ["accessLevel"],
  condition: "Only bits 0 to 6 and 8 to 13 of AccessLevel are set.",
  why: "Reserved bits mean nothing today and something else tomorrow; strict loaders refuse the file.",
  check(node, _ctx, report) {
    if (node.nodeClass !== "Variable" || node.accessLevel === undefined) return;
    const surplus = listSurplusBits(node.accessLevel, ALLOWED);
    if (surplus === undefined) return;
    report({
      attribute: "accessLevel",
      message: `AccessLevel ${node.accessLevel} of ${node.browseName.name} has reserved bits.`,
      facts: [`Reserved and set: ${surplus}`],
    });
  },
  fix: attributeFix("Clear the reserved bits", "accessLevel", (node) =>
    node.nodeClass === "Variable" && listSurplusBits(node.accessLevel ?? 1, ALLOWED) !== undefined
      ? keepBits(node.accessLevel ?? 1, ALLOWED)
      : undefined,
  ),
  examples: {
    good: {
      text: "Read and write.",
      build: (m) => m.variable("Setpoint", { parent: m.object("Pump1"), set: { accessLevel: 3 } }),
    },
    bad: {
      text: "Bit 7.",
      build: (m) => m.variable("Setpoint", { parent: m.object("Pump1"), set: { accessLevel: 129 } }),
    },
  },
};
