import { attributeFix } from "../fixes";
import { isProperty } from "../lookups";
import type { NodeRule } from "../rule";

const MEANT_TO_BE_WRITTEN = /(?:set-?point|setting|command)$/i;

export const r109: NodeRule = {
  id: "R109",
  title: "Access said for what looks like a set-point",
  severity: "hint",
  clause: "UANodeSet.xsd (AccessLevel is 1 where it is left out); names: common practice, no source",
  priority: 1,
  concerns: ["Variable"],
  condition:
    "A Variable that is named like a set-point, a setting or a command says its AccessLevel, read only or not.",
  why: "Left out it means read only, which is right for a value that the controller reports and wrong for one that clients set.",
  check(node, ctx, report) {
    if (
      node.nodeClass !== "Variable" ||
      node.accessLevel !== undefined ||
      !MEANT_TO_BE_WRITTEN.test(node.browseName.name)
    )
      return;
    if (isProperty(ctx, node.key) || node.browseName.namespaceUri !== node.nodeId.namespaceUri) return;
    report({
      attribute: "accessLevel",
      message: `${node.browseName.name} does not say whether it can be written.`,
      facts: ["AccessLevel: left out, which means 1, read only"],
    });
  },
  fix: attributeFix("Say read only", "accessLevel", (node) =>
    node.nodeClass === "Variable" && node.accessLevel === undefined ? 1 : undefined,
  ),
  examples: {
    good: {
      text: "Read and write.",
      build: (m) => m.variable("SpeedSetpoint", { parent: m.object("Pump1"), set: { accessLevel: 3 } }),
    },
    bad: { text: "Nothing said.", build: (m) => m.variable("SpeedSetpoint", { parent: m.object("Pump1") }) },
  },
};
