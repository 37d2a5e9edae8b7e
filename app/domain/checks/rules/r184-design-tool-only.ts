import { attributeFix, REMOVED } from "../fixes";
import { findTypeDefinition } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardReferenceType as R } from "../../address-space/standard-ids";

export const r184: NodeRule = {
  id: "R184",
  title: "Nodes for design tools stand alone",
  severity: "error",
  clause: clause(6, "§F.7"),
  priority: 2,
  concerns: ["Object", "Variable", "Method", "View"],
  attributes: ["designToolOnly"],
  condition:
    "DesignToolOnly stands on Objects and Variables only; such a node has a type definition, no ParentNodeId, no parent and no children.",
  why: "Servers leave such nodes out, and their children and references with them.",
  check(node, ctx, report) {
    if (!("designToolOnly" in node) || node.designToolOnly !== true) return;
    const troubles = [
      ...(node.nodeClass === "Object" || node.nodeClass === "Variable" ? [] : [`it is a ${node.nodeClass}`]),
      ...(node.parent === undefined ? [] : ["it has a ParentNodeId"]),
      ...(ctx.parentEdges(node.key).length > 0 ? ["it has a parent"] : []),
      ...(ctx.childEdges(node.key).length > 0 ? ["it has children"] : []),
      ...(findTypeDefinition(ctx, node.key) === undefined ? ["it has no type definition"] : []),
    ];
    if (troubles.length === 0) return;
    report({
      attribute: "designToolOnly",
      message: `${node.browseName.name} is marked for design tools only, but ${troubles.join(" and ")}.`,
      facts: [
        "DesignToolOnly: true",
        ...ctx.parentEdges(node.key).map((e) => `${ctx.nameOf(e.type)} from ${ctx.describe(e.source)}`),
      ],
    });
  },
  fix: attributeFix("Clear the mark", "designToolOnly", (node) =>
    "designToolOnly" in node && node.designToolOnly ? REMOVED : undefined,
  ),
  examples: {
    good: {
      text: "An Object by itself.",
      build: (m) => {
        const key = m.object("Template", { set: { designToolOnly: true, parent: undefined } });
        m.removeReferences(key, R.Organizes);
        return key;
      },
    },
    bad: {
      text: "A marked member.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), set: { designToolOnly: true } }),
    },
  },
};
