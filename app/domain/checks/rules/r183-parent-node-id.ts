import type { InstanceNode } from "../../address-space/node";
import { attributeFix } from "../fixes";
import { isInstanceDeclaration } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { getReferenceTypes } from "../../address-space/type-hierarchy";

export const r183: NodeRule = {
  id: "R183",
  title: "ParentNodeId of instance declarations",
  severity: "error",
  clause: `${clause(6, "§F.7, Table F.7")}, ${clause(3, "§6.2.1")}`,
  priority: 1,
  concerns: ["Object", "Variable", "Method", "View"],
  condition:
    "A declaration has a ParentNodeId, and it is the source of a hierarchical reference to the node. On other nodes a wrong one is a warning, a missing one legal.",
  why: "Code generators and editors build the tree of a type by it: the member is not shown, or below a stranger.",
  check(node, ctx, report) {
    const { parent } = node as InstanceNode;
    const isDeclaration = isInstanceDeclaration(ctx, node.key);
    const parents = ctx.parentEdges(node.key);
    if (parent === undefined ? !isDeclaration : parents.some((e) => e.source === parent)) return;
    const name = node.browseName.name;
    report({
      ...(isDeclaration ? {} : { severity: "warning" }),
      attribute: "parent",
      message:
        parent === undefined
          ? `The declaration ${name} has no ParentNodeId.`
          : `The ParentNodeId of ${name} is no parent of it.`,
      facts: [
        `ParentNodeId: ${parent === undefined ? "none" : ctx.describe(parent)}`,
        ...parents.map((e) => `Hierarchical reference from ${ctx.describe(e.source)}`),
      ],
    });
  },
  fix: attributeFix("Name the parent", "parent", (node, _finding, space) => {
    const types = getReferenceTypes(space, R.HierarchicalReferences);
    const edges = space.edgesTo(node.key).filter((e) => types.has(e.type) && e.type !== R.HasSubtype);
    const aggregates = getReferenceTypes(space, R.Aggregates);
    return (edges.find((e) => aggregates.has(e.type)) ?? edges[0])?.source;
  }),
  examples: {
    good: {
      text: "The type as parent.",
      build: (m) => m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory" }),
    },
    bad: {
      text: "No parent named.",
      build: (m) =>
        m.variable("Speed", { parent: m.objectType("PumpType"), rule: "Mandatory", set: { parent: undefined } }),
    },
  },
};
