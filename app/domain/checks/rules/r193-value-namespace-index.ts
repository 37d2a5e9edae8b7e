import { nodeId } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { walkValue } from "../value-element";
import { makeTreeQuestion } from "../value-xml";
import { hasValueAttributes } from "../../address-space/node";
import { parseNodeId } from "../../address-space/node-id";
import { StandardDataType as D } from "../../address-space/standard-ids";

export const r193: NodeRule = {
  id: "R193",
  title: "Namespace indices inside values are those of the file",
  severity: "error",
  clause: clause(6, "§F.14"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["value"],
  condition: "NodeIds inside a Value name namespaces of the file's own table.",
  why: "An index of a running server, or of another file, stands for another namespace here, or for none: the id is lost.",
  check(node, _ctx, report) {
    const stray = hasValueAttributes(node) ? findStray(node.value) : undefined;
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

const findStray = makeTreeQuestion<string | undefined>(undefined, (root) =>
  walkValue(root)
    .flatMap((e) => (e.name === "Identifier" ? [e.text.trim()] : []))
    .find((text) => !isIndexKnown(text)),
);

/** Indices of the file are URIs by now; what still is an index was not in its table. */
function isIndexKnown(text: string): boolean {
  const parsed = parseNodeId(text, []);
  return parsed.ok || parsed.problems.every((p) => p.code !== "node-id.namespace-index");
}
