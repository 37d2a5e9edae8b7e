import { isAbstract } from "../../address-space/node";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r024: NodeRule = {
  id: "R024",
  title: "ReferenceType exists and is concrete",
  severity: "error",
  clause: clause(3, "§5.3.1, Table 9, §7.2–7.6"),
  priority: 1,
  concerns: ALL_CLASSES,
  condition:
    "The type of every reference is a ReferenceType that is not abstract. Where its namespace is not loaded: a warning.",
  why: "A reference of an unknown or abstract type is dropped by loaders, so its target is not found by browsing.",
  check(node, ctx, report) {
    for (const [i, { type }] of node.references.entries()) {
      if (node.references.findIndex((r) => r.type === type) < i) continue;
      const found = ctx.node(type);
      const name = node.browseName.name;
      if (!found) {
        const namespace = ctx.namespaceOf(type);
        const isLoaded = namespace === undefined || ctx.isNamespaceLoaded(namespace);
        report({
          severity: isLoaded ? "error" : "warning",
          attribute: "references",
          message: `A reference of ${name} has the type ${type}, which ${isLoaded ? "does not exist" : "is not loaded"}.`,
          facts: [
            `Type: ${type}`,
            namespace === undefined
              ? "The text is no NodeId."
              : `Namespace ${namespace}: ${isLoaded ? "loaded" : "not loaded"}`,
          ],
        });
      } else if (found.nodeClass !== "ReferenceType") {
        report({
          attribute: "references",
          message: `A reference of ${name} has the type ${found.browseName.name}, which is no ReferenceType.`,
          facts: [`Type: ${ctx.describe(type)}`, `Its NodeClass: ${found.nodeClass}`],
        });
      } else if (isAbstract(found)) {
        report({
          attribute: "references",
          message: `A reference of ${name} has the abstract type ${found.browseName.name}.`,
          facts: [`Type: ${ctx.describe(type)}`, "IsAbstract: true"],
        });
      }
    }
  },
  examples: {
    good: {
      text: "HasComponent is concrete.",
      build: (m) => m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory" }),
    },
    bad: {
      text: "HierarchicalReferences is abstract and stands only for its subtypes.",
      build: (m) =>
        m.variable("Speed", {
          parent: m.objectType("PumpType"),
          rule: "Mandatory",
          reference: R.HierarchicalReferences,
        }),
    },
  },
};
