import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { clause, type NodeRule } from "../rule";

export const r137: NodeRule = {
  id: "R137",
  title: "No own DataType directly below BaseDataType",
  severity: "error",
  clause: clause(3, "§8.7"),
  priority: 1,
  concerns: ["DataType"],
  condition: "Direct subtypes of BaseDataType exist in namespace 0 only.",
  why: "Nothing says how its values are encoded, so that no stack can send or read them.",
  check(node, ctx, report) {
    if (
      node.nodeId.namespaceUri === OPC_UA_NAMESPACE ||
      !ctx.supertypeEdges(node.key).some((e) => e.source === D.BaseDataType)
    )
      return;
    report({
      attribute: "references",
      message: `The DataType ${node.browseName.name} stands directly below BaseDataType.`,
      facts: [
        `Supertype: ${ctx.describe(D.BaseDataType)}`,
        "Derive it from a built-in type, Enumeration or Structure.",
      ],
    });
  },
  examples: {
    good: { text: "Below String.", build: (m) => m.dataType("RecipeName", { supertype: D.String }) },
    bad: { text: "Below BaseDataType.", build: (m) => m.dataType("RecipeName", { supertype: D.BaseDataType }) },
  },
};
