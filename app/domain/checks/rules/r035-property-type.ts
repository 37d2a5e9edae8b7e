import { typeDefinitionFix } from "../fixes";
import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { findTypeDefinition } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r035: NodeRule = {
  id: "R035",
  title: "A Property has the type PropertyType",
  severity: "error",
  clause: `${clause(3, "§5.6.3")}, ${clause(5, "§7.3")}`,
  priority: 1,
  concerns: ["Variable"],
  needs: ["property"],
  condition: "The type definition of a HasProperty target is exactly PropertyType (i=68), which has no subtypes.",
  why: "Servers and code generators decide by the type whether a Variable is a Property or a DataVariable; the two answers then differ.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined || type === T.PropertyType) return;
    report({
      attribute: "references",
      message: `The Property ${node.browseName.name} has the type ${ctx.nameOf(type)} instead of PropertyType.`,
      facts: [
        ...ctx
          .parentEdges(node.key)
          .filter((e) => ctx.closure(R.HasProperty).has(e.type))
          .map((e) => `HasProperty from ${ctx.describe(e.source)}`),
        `HasTypeDefinition: ${ctx.describe(type)}`,
      ],
      data: { type },
    });
  },
  fix: typeDefinitionFix("Take PropertyType", () => T.PropertyType),
  examples: {
    good: { text: "A Property typed PropertyType.", build: (m) => m.property("Label", { parent: m.object("Pump1") }) },
    bad: {
      text: "A Property typed BaseDataVariableType.",
      build: (m) => m.property("Label", { parent: m.object("Pump1"), type: T.BaseDataVariableType }),
    },
  },
};
