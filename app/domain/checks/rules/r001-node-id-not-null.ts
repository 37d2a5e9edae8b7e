import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { formatNodeId, isNullNodeId, numericNodeId, OPC_UA_NAMESPACE } from "../../address-space/node-id";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r001: NodeRule = {
  id: "R001",
  title: "NodeId must not be null",
  severity: "error",
  clause: clause(3, "§8.2.4, Table 24"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition: "A NodeId is none of i=0, an empty string, an all-zero GUID or empty bytes in namespace 0.",
  why: "A null NodeId means “no node” in every service: clients can neither browse to the node nor read it, and servers drop it.",
  check(node, _ctx, report) {
    const { nodeId } = node;
    const isEmptyBytes = nodeId.namespaceUri === OPC_UA_NAMESPACE && nodeId.type === "b" && nodeId.identifier === "";
    if (!isNullNodeId(nodeId) && !isEmptyBytes) return;
    report({
      attribute: "nodeId",
      message: `${node.browseName.name} has the null NodeId ${formatNodeId(nodeId)}.`,
      facts: [`NodeId: ${formatNodeId(nodeId)}`, "This value stands for “no node”."],
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
    good: { text: "An identifier in the model's own namespace.", build: (m) => m.objectType("PumpType") },
    bad: {
      text: "Identifier 0 in namespace 0.",
      build: (m) => m.objectType("PumpType", { nodeId: numericNodeId(OPC_UA_NAMESPACE, 0) }),
    },
  },
};
