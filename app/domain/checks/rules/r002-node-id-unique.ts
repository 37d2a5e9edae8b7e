import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { formatNodeId, numericNodeId } from "../../address-space/node-id";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r002: NodeRule = {
  id: "R002",
  title: "NodeId unique in the loaded set",
  severity: "error",
  clause: clause(3, "§5.2.2, §8.2.2"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition: "No two nodes of the model and its required models share namespace URI, identifier type and identifier.",
  why: "The second node replaces the first or is refused when the file is loaded, and every reference to the identifier becomes ambiguous.",
  check(node, ctx, report) {
    const twins = ctx.listTwins(node);
    for (const twin of twins) {
      const isModelTwice = !ctx.isOwn(twin) && ctx.modelUris.includes(node.nodeId.namespaceUri);
      if (isModelTwice) continue;
      report({
        attribute: "nodeId",
        message: `The NodeId ${formatNodeId(node.nodeId)} is given twice.`,
        facts: [
          `This node: ${node.browseName.name}, ${node.nodeClass}`,
          `The other: ${ctx.nameOf(twin)}, ${ctx.classOf(twin) ?? "unknown class"}, in ${ctx.isOwn(twin) ? "this model" : "a required model"}`,
        ],
      });
    }
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
    good: {
      text: "Every node has an identifier of its own.",
      build: (m) => (m.objectType("PumpType"), m.objectType("ValveType")),
    },
    bad: {
      text: "Two types with the same identifier.",
      build: (m) => {
        m.objectType("PumpType", { nodeId: numericNodeId(m.uri, 5001) });
        return m.objectType("ValveType", { nodeId: numericNodeId(m.uri, 5001) });
      },
    },
  },
};
