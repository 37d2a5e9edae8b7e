import { getAccessLevel } from "../../address-space/node";
import { attributeFix, REMOVED } from "../fixes";
import { clause, type NodeRule } from "../rule";

export const r108: NodeRule = {
  id: "R108",
  title: "UserAccessLevel within AccessLevel",
  severity: "hint",
  clause: `${clause(3, "§5.6.2")}, ${clause(6, "§F.8")}`,
  priority: 2,
  concerns: ["Variable"],
  attributes: ["userAccessLevel"],
  condition: "UserAccessLevel, which files need not have, allows nothing that AccessLevel does not.",
  why: "Loaders that do use it show an access that the server then refuses.",
  check(node, _ctx, report) {
    if (node.nodeClass !== "Variable" || node.userAccessLevel === undefined) return;
    if ((node.userAccessLevel & ~getAccessLevel(node)) === 0) return;
    report({
      attribute: "userAccessLevel",
      message: `UserAccessLevel ${node.userAccessLevel} of ${node.browseName.name} exceeds AccessLevel ${getAccessLevel(node)}.`,
      facts: [
        `AccessLevel: ${getAccessLevel(node)}${node.accessLevel === undefined ? " (left out)" : ""}`,
        `UserAccessLevel: ${node.userAccessLevel}`,
      ],
    });
  },
  fix: attributeFix("Leave UserAccessLevel out", "userAccessLevel", (node) =>
    node.nodeClass === "Variable" && node.userAccessLevel !== undefined ? REMOVED : undefined,
  ),
  examples: {
    good: {
      text: "1 within 3.",
      build: (m) => m.variable("Setpoint", { parent: m.object("Pump1"), set: { accessLevel: 3, userAccessLevel: 1 } }),
    },
    bad: {
      text: "3 beside 1.",
      build: (m) => m.variable("Setpoint", { parent: m.object("Pump1"), set: { accessLevel: 1, userAccessLevel: 3 } }),
    },
  },
};
