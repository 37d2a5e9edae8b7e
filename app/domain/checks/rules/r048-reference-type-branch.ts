import { isAbstract } from "../../address-space/node";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { isChainLoaded, listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r048: NodeRule = {
  id: "R048",
  title: "Every ReferenceType is hierarchical or not",
  severity: "error",
  clause: clause(3, "§7.4"),
  priority: 2,
  concerns: ["ReferenceType"],
  condition: "A concrete ReferenceType stands below HierarchicalReferences or NonHierarchicalReferences.",
  why: "Clients decide by this whether a target is shown in the tree.",
  check(node, ctx, report) {
    const above = listSupertypes(ctx, node.key);
    if (isAbstract(node) || above.length === 0 || !isChainLoaded(ctx, node.key)) return;
    if (above.includes(R.HierarchicalReferences) || above.includes(R.NonHierarchicalReferences)) return;
    report({
      attribute: "references",
      message: `${node.browseName.name} stands below neither HierarchicalReferences nor NonHierarchicalReferences.`,
      facts: [`Supertypes: ${above.map((t) => ctx.nameOf(t)).join(", ")}`],
    });
  },
  examples: {
    good: {
      text: "Below NonHierarchicalReferences.",
      build: (m) => m.referenceType("Feeds", { inverseName: "IsFedBy" }),
    },
    bad: {
      text: "Directly below References.",
      build: (m) => m.referenceType("Feeds", { inverseName: "IsFedBy", supertype: R.References }),
    },
  },
};
