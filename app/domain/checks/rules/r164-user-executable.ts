import { attributeFix, REMOVED } from "../fixes";
import { clause, type NodeRule } from "../rule";

export const r164: NodeRule = {
  id: "R164",
  title: "UserExecutable implies Executable",
  severity: "hint",
  clause: `${clause(3, "§5.7.1")}, ${clause(6, "§F.9")}`,
  priority: 2,
  concerns: ["Method"],
  condition: "A file that says UserExecutable at all does not say true where Executable is false.",
  why: "A client offers the call and the server refuses it.",
  check(node, _ctx, report) {
    if (node.nodeClass !== "Method" || node.executable !== false || node.userExecutable !== true) return;
    report({
      attribute: "userExecutable",
      message: `${node.browseName.name} is not executable, but says that users may execute it.`,
      facts: ["Executable: false", "UserExecutable: true"],
    });
  },
  fix: attributeFix("Leave UserExecutable out", "userExecutable", (node) =>
    node.nodeClass === "Method" && node.userExecutable !== undefined ? REMOVED : undefined,
  ),
  examples: {
    good: { text: "Neither is said.", build: (m) => m.method("Start", { parent: m.object("Pump1") }) },
    bad: {
      text: "False and true.",
      build: (m) => m.method("Start", { parent: m.object("Pump1"), set: { executable: false, userExecutable: true } }),
    },
  },
};
