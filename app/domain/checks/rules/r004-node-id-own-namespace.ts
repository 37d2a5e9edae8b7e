import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { formatNodeId, numericNodeId, OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r004: NodeRule = {
  id: "R004",
  title: "NodeId in the model's own namespace",
  severity: "error",
  clause: `${clause(3, "§8.2.2")}, ${clause(6, "§F.2")}, ${clause(5, "§4.1")} (inferred)`,
  priority: 1,
  concerns: ALL_CLASSES,
  condition: "A node that the model defines carries the namespace URI of one of the model's own rows in Models.",
  why: "The namespace names who assigns identifiers. A node in a foreign namespace collides with the next version of that model, and other tools take it for a part of it.",
  check(node, ctx, report) {
    const { modelUris } = ctx;
    const { namespaceUri } = node.nodeId;
    if (modelUris.length === 0 || modelUris.includes(namespaceUri)) return;
    report({
      attribute: "nodeId",
      message: `${node.browseName.name} is numbered in the foreign namespace ${namespaceUri}.`,
      facts: [`NodeId: ${formatNodeId(node.nodeId)}`, `This model defines: ${modelUris.join(", ")}`],
    });
  },
  fix: {
    label: "Give it the next free NodeId of the model",
    apply(space, finding, ids) {
      const node = findSubject(space, finding);
      const allocated = node && ids.allocate(node.nodeClass);
      if (!node || !allocated) return notPossible(finding);
      return allocated.ok ? ok([setAttribute(node.key, "nodeId", allocated.value)]) : allocated;
    },
  },
  examples: {
    good: { text: "The identifier stands in the namespace of the model.", build: (m) => m.objectType("PumpType") },
    bad: {
      text: "A new type numbered in namespace 0.",
      build: (m) => m.objectType("PumpType", { nodeId: numericNodeId(OPC_UA_NAMESPACE, 90001) }),
    },
  },
};
