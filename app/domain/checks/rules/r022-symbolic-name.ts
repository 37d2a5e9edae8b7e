import { attributeFix, REMOVED } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

const FORM = /^[A-Za-z]\w*$/;

export const r022: NodeRule = {
  id: "R022",
  title: "Form of SymbolicName",
  severity: "error",
  clause: `${clause(6, "§F.3, Table F.2")}, UANodeSet.xsd`,
  priority: 1,
  concerns: ALL_CLASSES,
  attributes: ["symbolicName"],
  condition:
    "A SymbolicName begins with a letter and holds letters, digits and underscores only. Where the BrowseName itself would do, it is a hint.",
  why: "Code generators use it as an identifier; the file's schema refuses anything else.",
  check({ symbolicName, browseName }, _ctx, report) {
    if (symbolicName === undefined) return;
    const facts = [`SymbolicName: “${symbolicName}”`, `BrowseName: ${browseName.name}`];
    if (!FORM.test(symbolicName)) {
      report({
        attribute: "symbolicName",
        message: `The SymbolicName “${symbolicName}” of ${browseName.name} is no identifier.`,
        facts,
      });
    } else if (symbolicName === browseName.name) {
      report({
        severity: "hint",
        attribute: "symbolicName",
        message: `The SymbolicName of ${browseName.name} only repeats the BrowseName.`,
        facts,
      });
    }
  },
  fix: attributeFix("Make an identifier of it, or drop it where the BrowseName will do", "symbolicName", (node) => {
    const name = toIdentifier(node.symbolicName ?? "");
    return name === "" || name === node.browseName.name ? REMOVED : name;
  }),
  examples: {
    good: {
      text: "An identifier for a name that is none.",
      build: (m) => m.object("Temp °C", { set: { symbolicName: "TempC" } }),
    },
    bad: { text: "Blanks and signs.", build: (m) => m.object("Temp °C", { set: { symbolicName: "Temp °C" } }) },
  },
};

function toIdentifier(text: string): string {
  return text
    .replace(/[^A-Za-z0-9_]+/g, "_")
    .replace(/^[^A-Za-z]+/, "")
    .replace(/_+$/, "");
}
