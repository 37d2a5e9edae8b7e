import { attributeFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { listControlCharacters } from "../texts";

const LIMIT = 512;

export const r006: NodeRule = {
  id: "R006",
  title: "BrowseName present, at most 512 characters, no control characters",
  severity: "error",
  clause: `${clause(3, "§8.3")}, ${clause(6, "§5.1.12, Table 7")}`,
  priority: 1,
  concerns: ALL_CLASSES,
  condition: "The name part is not empty, has at most 512 characters and no control characters.",
  why: "Browse paths are built from names: an empty or broken name cannot be addressed, and clients cut or refuse longer ones.",
  check(node, _ctx, report) {
    const { name } = node.browseName;
    const controls = listControlCharacters(name);
    const attribute = "browseName";
    if (name === "") report({ attribute, message: "The BrowseName is empty.", facts: ["Name part: empty text"] });
    if (name.length > LIMIT) {
      report({
        attribute,
        message: `The BrowseName has ${name.length} characters.`,
        facts: [`Limit: ${LIMIT} characters`],
      });
    }
    if (controls.length > 0) {
      report({
        attribute,
        message: "The BrowseName holds control characters.",
        facts: [`Found: ${controls.join(", ")}`, `Name: ${JSON.stringify(name)}`],
      });
    }
  },
  fix: attributeFix("Take control characters out and cut it", "browseName", ({ browseName }) => {
    const name = browseName.name.replace(/[\p{Cc}]/gu, "").slice(0, LIMIT);
    return name === "" || name === browseName.name ? undefined : { ...browseName, name };
  }),
  examples: {
    good: { text: "A plain name.", build: (m) => m.objectType("PumpType") },
    bad: { text: "A name with a line feed.", build: (m) => m.objectType("Pump\nType") },
  },
};
