import { keepBits, listSurplusBits } from "../bit-rules";
import { attributeFix } from "../fixes";
import { clause, type NodeRule } from "../rule";

/** Subscribe, history read, history write. */
const ALLOWED = 0b1101;

export const r114: NodeRule = {
  id: "R114",
  title: "Bits of EventNotifier",
  severity: "error",
  clause: clause(3, "§8.59"),
  priority: 1,
  concerns: ["Object", "View"],
  condition: "Only bits 0, 2 and 3 of EventNotifier are set.",
  why: "Reserved bits mean nothing today and something else tomorrow; strict loaders refuse the file.",
  check(node, _ctx, report) {
    if (node.nodeClass !== "Object" && node.nodeClass !== "View") return;
    const surplus = listSurplusBits(node.eventNotifier ?? 0, ALLOWED);
    if (surplus === undefined) return;
    report({
      attribute: "eventNotifier",
      message: `EventNotifier ${node.eventNotifier ?? 0} of ${node.browseName.name} has reserved bits.`,
      facts: [`Reserved and set: ${surplus}`],
    });
  },
  fix: attributeFix("Clear the reserved bits", "eventNotifier", (node) =>
    (node.nodeClass === "Object" || node.nodeClass === "View") &&
    listSurplusBits(node.eventNotifier ?? 0, ALLOWED) !== undefined
      ? keepBits(node.eventNotifier ?? 0, ALLOWED)
      : undefined,
  ),
  examples: {
    good: { text: "Subscribe.", build: (m) => m.object("Area", { set: { eventNotifier: 1 } }) },
    bad: { text: "Bit 1.", build: (m) => m.object("Area", { set: { eventNotifier: 2 } }) },
  },
};
