import { isTypeNode, type Node } from "../../address-space/node";
import type { CheckContext } from "../check-context";
import { findTypeDefinition, isInstanceDeclaration } from "../lookups";
import { getMembers, toNameText } from "../members";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r019: NodeRule = {
  id: "R019",
  title: "A Description explains the node",
  severity: "hint",
  clause: clause(3, "§5.2.6"),
  priority: 2,
  concerns: ALL_CLASSES,
  needs: ["declares members"],
  condition:
    "Types, and members that the model names itself, have a Description (the attribute is optional; where present it explains the meaning).",
  why: "Whoever connects to the machine in five years has nothing else to learn from what “Level2” means.",
  check(node, ctx, report) {
    if ((node.description ?? []).some((t) => t.text.trim() !== "")) return;
    const isOwnName = node.browseName.namespaceUri === node.nodeId.namespaceUri;
    if (!isOwnName || !(isTypeNode(node) || isInstanceDeclaration(ctx, node.key)) || isDescribedElsewhere(node, ctx))
      return;
    report({
      attribute: "description",
      message: `${node.browseName.name} has no Description.`,
      facts: [`NodeClass: ${node.nodeClass}`, "Description: none"],
    });
  },
  examples: {
    good: {
      text: "A type that says what it stands for.",
      build: (m) => m.objectType("TankType", { set: { description: [{ text: "A tank with one level sensor." }] } }),
    },
    bad: { text: "A type without a word.", build: (m) => m.objectType("TankType") },
  },
};

/** A copy of a member that the type of its parent declares is explained there. */
function isDescribedElsewhere(node: Node, ctx: CheckContext): boolean {
  return ctx.parentEdges(node.key).some(({ source }) => {
    const type = findTypeDefinition(ctx, source);
    return type !== undefined && getMembers(ctx, type).has(toNameText(node.browseName));
  });
}
