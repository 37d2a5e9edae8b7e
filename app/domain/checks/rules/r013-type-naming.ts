import type { Node } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r013: NodeRule = {
  id: "R013",
  title: "Names of types say what they are",
  severity: "hint",
  clause: `OPC 11030 v1.03 §2.1.3 (white paper), ${clause(3, "§4.10.2")} for Interfaces`,
  priority: 2,
  concerns: ["ObjectType", "VariableType", "DataType", "ReferenceType"],
  condition:
    "ObjectTypes and VariableTypes end in “Type”, Structures in “DataType”; ReferenceTypes have no such ending; Interfaces begin with “I”.",
  why: "In lists and generated code a type and its instance then cannot be mixed up.",
  check(node, ctx, report) {
    const expected = findConvention(node, ctx);
    if (expected === undefined) return;
    report({
      attribute: "browseName",
      message: `The ${node.nodeClass} ${node.browseName.name} does not follow the usual naming: ${expected}.`,
      facts: [`BrowseName: ${node.browseName.name}`],
    });
  },
  examples: {
    good: { text: "PumpType.", build: (m) => m.objectType("PumpType") },
    bad: { text: "An ObjectType named like an instance.", build: (m) => m.objectType("Pump") },
  },
};

function findConvention(node: Node, ctx: CheckContext): string | undefined {
  const { name } = node.browseName;
  switch (node.nodeClass) {
    case "ObjectType":
      if (isKindOf(ctx, node.key, T.BaseInterfaceType) && !/^I[A-Z]/.test(name)) return "Interfaces begin with “I”";
      return name.endsWith("Type") ? undefined : "ObjectTypes end in “Type”";
    case "VariableType":
      return name.endsWith("Type") ? undefined : "VariableTypes end in “Type”";
    case "DataType":
      return isKindOf(ctx, node.key, D.Structure) && !name.endsWith("DataType")
        ? "Structures end in “DataType”"
        : undefined;
    default:
      return name.endsWith("Type") ? "ReferenceTypes do not end in “Type”" : undefined;
  }
}
