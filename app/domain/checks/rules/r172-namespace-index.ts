import { nodeId } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { walkValue } from "../value-element";
import { findValueRoot } from "../value-xml";
import { hasValueAttributes } from "../../address-space/node";
import { parseNodeId } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";

export const r172: NodeRule = {
  id: "R172",
  title: "Namespace index in range",
  severity: "error",
  clause: clause(6, "§F.2, §5.1.12"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: "value",
  condition:
    "Every index in a NodeId, a BrowseName or a Value is one of the file's namespace table. Ids and names are judged while a file is read; here what is left in values.",
  why: "The index stands for no namespace: the id or the name is lost when the file is loaded.",
  check(node, _ctx, report) {
    if (!hasValueAttributes(node) || !node.value?.xml.includes("Identifier")) return;
    const texts = walkValue(findValueRoot(node.value)).flatMap((e) => (e.name === "Identifier" ? [e.text.trim()] : []));
    const stray = texts.find((text) => !isIndexKnown(text));
    if (stray === undefined) return;
    report({
      attribute: "value",
      message: `The Value of ${node.browseName.name} names a namespace index that the file does not have.`,
      facts: [`Identifier: ${stray}`],
    });
  },
  examples: {
    good: {
      text: "A namespace by its URI.",
      build: (m) =>
        m.variable("Target", {
          parent: m.object("Pump1"),
          dataType: D.NodeId,
          value: nodeId(`nsu=${m.uri};i=1`),
        }),
    },
    bad: {
      text: "Index 7 of a table of one.",
      build: (m) =>
        m.variable("Target", {
          parent: m.object("Pump1"),
          dataType: D.NodeId,
          value: nodeId("ns=7;i=1"),
        }),
    },
  },
};

/** Indices of the file are URIs by now; what still is an index was not in its table. */
function isIndexKnown(text: string): boolean {
  const parsed = parseNodeId(text, []);
  return parsed.ok || parsed.problems.every((p) => p.code !== "node-id.namespace-index");
}
