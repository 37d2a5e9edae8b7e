import { isSameQualifiedName } from "../../address-space/qualified-name";
import { attributeFix, REMOVED } from "../fixes";
import { findTypeAbove } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r187: NodeRule = {
  id: "R187",
  title: "MethodDeclarationId names the Method of the type",
  severity: "warning",
  clause: clause(6, "§F.9"),
  priority: 2,
  concerns: ["Method"],
  condition:
    "Where it is set, MethodDeclarationId names a Method of the same BrowseName below a type. Another place than the type of the owner is a hint.",
  why: "A server binds the call to the implementation of the Method named here, which is another one.",
  check(node, ctx, report) {
    if (node.nodeClass !== "Method" || node.methodDeclaration === undefined) return;
    const declaration = ctx.node(node.methodDeclaration);
    if (!declaration) return;
    const facts = [
      `MethodDeclarationId: ${ctx.describe(declaration.key)}, ${declaration.nodeClass}`,
      `BrowseName here: ${node.browseName.name}`,
    ];
    if (declaration.nodeClass !== "Method" || !isSameQualifiedName(declaration.browseName, node.browseName)) {
      report({
        attribute: "methodDeclaration",
        message: `MethodDeclarationId of ${node.browseName.name} names the ${declaration.nodeClass} ${declaration.browseName.name}.`,
        facts,
      });
    } else if (findTypeAbove(ctx, declaration.key) === undefined) {
      report({
        severity: "hint",
        attribute: "methodDeclaration",
        message: `MethodDeclarationId of ${node.browseName.name} names a Method that belongs to no type.`,
        facts,
      });
    }
  },
  fix: attributeFix("Remove it", "methodDeclaration", (node) =>
    node.nodeClass === "Method" && node.methodDeclaration !== undefined ? REMOVED : undefined,
  ),
  examples: {
    good: {
      text: "Start of the type.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        const start = m.method("Start", { parent: pump, rule: "Mandatory" });
        m.method("Start", { parent: m.object("Pump1", { type: pump }), set: { methodDeclaration: start } });
        return undefined;
      },
    },
    bad: {
      text: "Stop of the type.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        const stop = m.method("Stop", { parent: pump, rule: "Optional" });
        return m.method("Start", { parent: m.object("Pump1", { type: pump }), set: { methodDeclaration: stop } });
      },
    },
  },
};
