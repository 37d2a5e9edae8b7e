import { typeDefinitionFix } from "../fixes";
import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { findTypeDefinition, ofType } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r036: NodeRule = {
  id: "R036",
  title: "A DataVariable is not of PropertyType",
  severity: "error",
  clause: `${clause(5, "§7.3, §7.4")}, ${clause(3, "§5.6.3, §5.6.4")}`,
  priority: 1,
  concerns: ["Variable"],
  types: [T.PropertyType],
  condition: "The target of HasComponent or a subtype is not of PropertyType.",
  why: "PropertyType says “Property”, HasComponent says “DataVariable”: clients filter by either and see the node in one list only.",
  check(node, ctx, report) {
    if (findTypeDefinition(ctx, node.key) !== T.PropertyType) return;
    for (const edge of ofType(ctx, ctx.parentEdges(node.key), R.HasComponent)) {
      report({
        attribute: "references",
        message: `${node.browseName.name} is a component of ${ctx.nameOf(edge.source)} but has the type PropertyType.`,
        facts: [`${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)}`, "HasTypeDefinition: PropertyType (i=68)"],
        data: { ...edge },
      });
    }
  },
  fix: typeDefinitionFix("Take BaseDataVariableType", () => T.BaseDataVariableType),
  examples: {
    good: {
      text: "A component typed BaseDataVariableType.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1") }),
    },
    bad: {
      text: "A component typed PropertyType.",
      build: (m) => m.variable("Speed", { parent: m.object("Pump1"), type: T.PropertyType }),
    },
  },
};
