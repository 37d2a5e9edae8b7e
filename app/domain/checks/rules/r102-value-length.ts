import { hasValueAttributes } from "../../address-space/node";
import { list } from "../example-values";
import { attributeFix } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { findChild, type ValueElement } from "../value-element";
import { findValueRoot, listItemType } from "../value-xml";

export const r102: NodeRule = {
  id: "R102",
  title: "Value no longer than ArrayDimensions",
  severity: "error",
  clause: clause(3, "§5.6.2, Table 13"),
  priority: 2,
  concerns: ["Variable", "VariableType"],
  attributes: ["arrayDimensions"],
  needs: ["value"],
  condition:
    "No dimension of the Value is longer than its entry in ArrayDimensions; the entry is the greatest length, 0 sets none.",
  why: "Clients reserve the length that is promised and cut the rest.",
  check(node, _ctx, report) {
    if (!hasValueAttributes(node) || !node.arrayDimensions) return;
    const root = findValueRoot(node.value);
    if (!root) return;
    const limits = node.arrayDimensions.split(",").map(Number);
    const lengths = listLengths(root);
    if (!lengths.some((length, i) => (limits[i] ?? 0) > 0 && length > (limits[i] ?? 0))) return;
    report({
      attribute: "arrayDimensions",
      message: `The Value of ${node.browseName.name} has ${lengths.join(" × ")} entries, but ArrayDimensions is ${node.arrayDimensions}.`,
      facts: [`ArrayDimensions: ${node.arrayDimensions}`, `Lengths in the Value: ${lengths.join(", ")}`],
      data: {
        dimensions: lengths
          .map((length, i) => ((limits[i] ?? 0) === 0 ? 0 : Math.max(length, limits[i] ?? 0)))
          .join(","),
      },
    });
  },
  fix: attributeFix(
    "Raise the limit to the length of the Value",
    "arrayDimensions",
    (_node, finding) => finding.data?.["dimensions"],
  ),
  examples: {
    good: {
      text: "Two of three.",
      build: (m) =>
        m.variable("Levels", {
          parent: m.object("Pump1"),
          valueRank: 1,
          arrayDimensions: "3",
          value: list("Double", 1, 2),
        }),
    },
    bad: {
      text: "Three of two.",
      build: (m) =>
        m.variable("Levels", {
          parent: m.object("Pump1"),
          valueRank: 1,
          arrayDimensions: "2",
          value: list("Double", 1, 2, 3),
        }),
    },
  },
};

function listLengths(root: ValueElement): number[] {
  if (root.name === "Matrix") return (findChild(root, "Dimensions")?.children ?? []).map((d) => Number(d.text.trim()));
  return listItemType(root) === undefined ? [] : [root.children.length];
}
