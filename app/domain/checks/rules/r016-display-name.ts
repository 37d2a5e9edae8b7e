import { attributeFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

const LIMIT = 512;

export const r016: NodeRule = {
  id: "R016",
  title: "DisplayName present and at most 512 characters",
  severity: "error",
  clause: clause(3, "§5.2.1, Table 7, §5.2.5"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition:
    "A node has at least one DisplayName of at most 512 characters. An empty text is a warning (common practice, no source).",
  why: "The DisplayName is what operators read. The file's schema allows it to be left out, but the attribute is mandatory in a server.",
  check(node, _ctx, report) {
    const attribute = "displayName";
    const { displayName, browseName } = node;
    if (displayName.length === 0) {
      report({ attribute, message: `${browseName.name} has no DisplayName.`, facts: ["DisplayName elements: 0"] });
    }
    for (const { text, locale } of displayName) {
      const where = locale ? ` (${locale})` : "";
      if (text.length > LIMIT) {
        report({
          attribute,
          message: `The DisplayName${where} has ${text.length} characters.`,
          facts: [`Limit: ${LIMIT} characters`],
        });
      }
      if (text.trim() === "") {
        report({
          attribute,
          severity: "warning",
          message: `The DisplayName${where} of ${browseName.name} is empty.`,
          facts: ["Text: empty"],
        });
      }
    }
  },
  fix: attributeFix("Take the BrowseName", "displayName", ({ browseName, displayName }) => {
    if (displayName.length === 0) return browseName.name === "" ? undefined : [{ text: browseName.name }];
    return displayName.map((t) => ({ ...t, text: t.text.trim() === "" ? browseName.name : t.text.slice(0, LIMIT) }));
  }),
  examples: {
    good: { text: "One DisplayName.", build: (m) => m.objectType("PumpType") },
    bad: { text: "No DisplayName.", build: (m) => m.objectType("PumpType", { set: { displayName: [] } }) },
  },
};
