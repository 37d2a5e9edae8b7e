import { OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { attributeFix, REMOVED } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { StandardDataType as D } from "../../address-space/standard-ids";

export const r186: NodeRule = {
  id: "R186",
  title: "Purpose only in the base NodeSet",
  severity: "error",
  clause: clause(6, "§F.11"),
  priority: 2,
  concerns: ["DataType"],
  condition: "DataTypes of other models than the base model have no Purpose.",
  why: "Code generators leave such a DataType out of servers.",
  check(node, _ctx, report) {
    if (node.nodeClass !== "DataType" || node.purpose === undefined || node.nodeId.namespaceUri === OPC_UA_NAMESPACE)
      return;
    report({
      attribute: "purpose",
      message: `The DataType ${node.browseName.name} has the Purpose ${node.purpose}.`,
      facts: [`Purpose: ${node.purpose}`, "Only the base NodeSet uses it."],
    });
  },
  fix: attributeFix("Remove it", "purpose", (node) =>
    node.nodeClass === "DataType" && node.purpose !== undefined ? REMOVED : undefined,
  ),
  examples: {
    good: { text: "None.", build: (m) => m.dataType("RecipeName", { supertype: D.String }) },
    bad: {
      text: "ServicesOnly.",
      build: (m) => m.dataType("RecipeName", { supertype: D.String, set: { purpose: "ServicesOnly" } }),
    },
  },
};
