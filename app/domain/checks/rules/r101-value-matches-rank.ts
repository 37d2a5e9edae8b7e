import { unwrapList, wrapInList } from "../list-values";
import { attributeFix } from "../fixes";
import { getDataType, getValueRank, hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { findChild, type ValueElement } from "../value-element";
import { list, scalar } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { findValueRoot, isNil, listItemType } from "../value-xml";

export const r101: NodeRule = {
  id: "R101",
  title: "Value has the shape of its rank",
  severity: "error",
  clause: `${clause(3, "§5.6.2, Table 13, §5.6.5, Table 14, §8.7")}, ${clause(6, "§5.3.1.17, §5.1.11")}`,
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["value"],
  condition:
    "Rank −1 holds one element, 1 a list, above 1 a Matrix with as many dimensions, −3 one element or a list, 0 a list or a Matrix. No value, an empty one and an empty list of an array are never wrong.",
  why: "Loaders take the value as it stands: the server then serves an array where its own attributes promise a single value.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    const root = findValueRoot(node.value);
    if (!root || isNil(root)) return;
    const rank = getValueRank(node);
    if (rank === -1 && getDataType(node) === D.BaseDataType) return;
    const shape = findShape(root);
    const isFitting = isAllowed(shape, rank, root);
    const sizes = shape === "matrix" ? listSizes(root) : [];
    const isOddMatrix =
      shape === "matrix" && ((rank > 1 && sizes.length !== rank) || sizes.some((size) => !(size > 0)));
    if (isFitting && !isOddMatrix) return;
    const shown = String(rank).replace("-", "−");
    const name = node.browseName.name;
    report({
      attribute: "value",
      message: isFitting
        ? `The Matrix of ${name} has the dimensions ${sizes.join(", ") || "none"}, but the ValueRank is ${shown}.`
        : `The Value of ${name} is ${describeShape(root, shape)}, but the ValueRank is ${shown}.`,
      facts: [
        `ValueRank: ${shown}${node.valueRank === undefined ? " (the attribute is left out)" : ""}`,
        `Value: ${describeShape(root, shape)}`,
      ],
      ...(isFitting ? {} : { data: { shape } }),
    });
  },
  fix: attributeFix("Make a list of the single value, or a single value of a list of one", "value", (node) => {
    const root = hasValueAttributes(node) ? findValueRoot(node.value) : undefined;
    if (!root || !hasValueAttributes(node) || !node.value) return undefined;
    return getValueRank(node) === 1
      ? wrapInList(node.value, root.name)
      : getValueRank(node) === -1
        ? unwrapList(node.value, root)
        : undefined;
  }),
  examples: {
    good: {
      text: "A list for one dimension.",
      build: (m) =>
        m.variable("Names", {
          parent: m.object("Pump1"),
          dataType: D.String,
          valueRank: 1,
          value: list("String", "a", "b"),
        }),
    },
    bad: {
      text: "A single text for one dimension.",
      build: (m) =>
        m.variable("Names", {
          parent: m.object("Pump1"),
          dataType: D.String,
          valueRank: 1,
          value: scalar("String", "a"),
        }),
    },
  },
};

type Shape = "scalar" | "list" | "matrix";

function findShape(root: ValueElement): Shape {
  if (root.name === "Matrix") return "matrix";
  return listItemType(root) === undefined ? "scalar" : "list";
}

function isAllowed(shape: Shape, rank: number, root: ValueElement): boolean {
  const isEmptyList = shape === "list" && root.children.length === 0;
  if (rank === -2) return true;
  if (rank === -1) return shape === "scalar";
  if (rank === -3) return shape !== "matrix";
  if (isEmptyList) return true;
  if (rank === 0) return shape !== "scalar";
  return rank === 1 ? shape === "list" : shape === "matrix";
}

function listSizes(root: ValueElement): number[] {
  return (findChild(root, "Dimensions")?.children ?? []).map((d) => Number(d.text.trim()));
}

function describeShape(root: ValueElement, shape: Shape): string {
  if (shape === "matrix") return "a Matrix";
  return shape === "list" ? `a list (${root.name}, ${root.children.length} entries)` : `a single ${root.name}`;
}
