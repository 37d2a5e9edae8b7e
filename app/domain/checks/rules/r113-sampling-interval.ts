import { attributeFix, REMOVED } from "../fixes";
import { clause, type NodeRule } from "../rule";

export const r113: NodeRule = {
  id: "R113",
  title: "MinimumSamplingInterval plausible",
  severity: "warning",
  clause: clause(3, "§5.6.2"),
  priority: 2,
  concerns: ["Variable"],
  attributes: ["minimumSamplingInterval"],
  condition: "MinimumSamplingInterval is 0 (continuous), a number of milliseconds above, or −1 (not known).",
  why: "Servers refuse other numbers or sample as fast as they can.",
  check(node, _ctx, report) {
    if (node.nodeClass !== "Variable" || node.minimumSamplingInterval === undefined) return;
    const interval = node.minimumSamplingInterval;
    if (interval >= 0 || interval === -1) return;
    const shown = String(interval).replace("-", "−");
    report({
      attribute: "minimumSamplingInterval",
      message: `MinimumSamplingInterval ${shown} of ${node.browseName.name} means nothing.`,
      facts: [`MinimumSamplingInterval: ${shown}`, "Allowed: −1, 0 and above"],
    });
  },
  fix: attributeFix("Leave it out", "minimumSamplingInterval", (node) =>
    node.nodeClass === "Variable" && node.minimumSamplingInterval !== undefined ? REMOVED : undefined,
  ),
  examples: {
    good: {
      text: "100 ms.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), set: { minimumSamplingInterval: 100 } }),
    },
    bad: {
      text: "−5.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), set: { minimumSamplingInterval: -5 } }),
    },
  },
};
