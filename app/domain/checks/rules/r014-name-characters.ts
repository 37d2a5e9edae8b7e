import type { Node } from "../../address-space/node";
import { isTypeNode } from "../../address-space/node";
import type { CheckContext } from "../check-context";
import { isInstanceDeclaration } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

const WORD = /^[A-Za-z]\w*$/;
const PASCAL = /^[A-Z]\w*$/;

export const r014: NodeRule = {
  id: "R014",
  title: "Names of letters, digits and underscore",
  severity: "warning",
  clause: `${clause(3, "§5.8.2, §8.51, §8.52")}, OPC 11030 v1.03 §2.1.2 (white paper)`,
  priority: 2,
  concerns: ALL_CLASSES,
  needs: ["declares members"],
  condition:
    "Names of DataTypes and their fields begin with a letter and hold letters, digits and underscores only. Other types and declarations likewise and in PascalCase: there it is a hint.",
  why: "Code generators make identifiers of these names; other characters are replaced, differently in every tool.",
  check(node, ctx, report) {
    if (node.symbolicName !== undefined) return;
    const { name } = node.browseName;
    const isDataType = node.nodeClass === "DataType";
    if (isDataType ? !WORD.test(name) : isNamed(node, ctx) && !PASCAL.test(name.replace(/[<>]/g, ""))) {
      report({
        ...(isDataType ? {} : { severity: "hint" }),
        attribute: "browseName",
        message: `The name “${name}” is no plain identifier.`,
        facts: [
          `BrowseName: ${name}`,
          isDataType
            ? "Asked for: a letter, then letters, digits, underscores"
            : "Usual: PascalCase of letters and digits",
        ],
      });
    }
    if (!isDataType) return;
    for (const field of node.definition?.fields ?? []) {
      if (WORD.test(field.name) || field.symbolicName !== undefined) continue;
      report({
        attribute: "definition",
        message: `The field “${field.name}” of ${name} is no plain identifier.`,
        facts: [`Field: ${field.name}`, "Asked for: a letter, then letters, digits, underscores"],
      });
    }
  },
  examples: {
    good: {
      text: "A field of letters and digits.",
      build: (m) =>
        m.dataType("PortDataType", { isAbstract: true, definition: { fields: [{ name: "PortMacAddress" }] } }),
    },
    bad: {
      text: "A field with blanks and signs.",
      build: (m) =>
        m.dataType("OilDataType", { isAbstract: true, definition: { fields: [{ name: "Oil temperature (°C)" }] } }),
    },
  },
};

/** Names that the model gives itself; a name of another namespace is not ours to judge. */
function isNamed(node: Node, ctx: CheckContext): boolean {
  if (node.browseName.namespaceUri !== node.nodeId.namespaceUri) return false;
  return isTypeNode(node) || isInstanceDeclaration(ctx, node.key);
}
