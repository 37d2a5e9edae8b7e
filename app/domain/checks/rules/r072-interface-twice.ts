import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { removeReferenceFix } from "../fixes";
import { findTypeDefinition, listSupertypes, ofType } from "../lookups";
import { listInterfaces } from "../members";
import { clause, type NodeRule } from "../rule";

export const r072: NodeRule = {
  id: "R072",
  title: "An Interface applied once in a line of types",
  severity: "warning",
  clause: clause(3, "§4.10.2"),
  priority: 2,
  concerns: ["Object", "ObjectType"],
  condition: "HasInterface is not repeated where a supertype, or the type definition, has it already.",
  why: "The repetition says nothing new, and a later change must be made in two places.",
  check(node, ctx, report) {
    const base = node.nodeClass === "ObjectType" ? listSupertypes(ctx, node.key)[0] : findTypeDefinition(ctx, node.key);
    if (base === undefined) return;
    const inherited = listInterfaces(ctx, base);
    for (const edge of ofType(ctx, ctx.otherEdges(node.key), R.HasInterface)) {
      if (!inherited.includes(edge.target)) continue;
      report({
        attribute: "references",
        message: `${node.browseName.name} applies ${ctx.nameOf(edge.target)}, which ${ctx.nameOf(base)} applies already.`,
        facts: [`HasInterface here: ${ctx.describe(edge.target)}`, `Inherited by way of ${ctx.describe(base)}`],
        data: { ...edge },
      });
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "Applied by the supertype only.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.reference(
          pump,
          R.HasInterface,
          m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true }),
        );
        return m.objectType("FastPumpType", { supertype: pump });
      },
    },
    bad: {
      text: "Applied again by the subtype.",
      build: (m) => {
        const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
        const pump = m.objectType("PumpType");
        const fast = m.objectType("FastPumpType", { supertype: pump });
        m.reference(pump, R.HasInterface, face);
        m.reference(fast, R.HasInterface, face);
        return fast;
      },
    },
  },
};
