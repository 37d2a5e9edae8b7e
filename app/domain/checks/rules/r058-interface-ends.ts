import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { removeReferenceFix } from "../fixes";
import { isChainLoaded, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r058: NodeRule = {
  id: "R058",
  title: "Ends of HasInterface",
  severity: "error",
  clause: clause(3, "§4.10.2, §7.19"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasInterface,
  condition:
    "HasInterface leads from an Object, or an ObjectType that is no Interface, to a subtype of BaseInterfaceType.",
  why: "Clients take the target's members as given; a target that is no Interface promises nothing.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasInterface)) {
      const source = ctx.node(edge.source);
      const target = ctx.node(edge.target);
      const facts = [`${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`];
      const isSourceInterface = source?.nodeClass === "ObjectType" && isKindOf(ctx, edge.source, T.BaseInterfaceType);
      if (source && (isSourceInterface || (source.nodeClass !== "Object" && source.nodeClass !== "ObjectType"))) {
        report({
          attribute: "references",
          message: `${isSourceInterface ? "The Interface" : `The ${source.nodeClass}`} ${source.browseName.name} cannot apply an Interface.`,
          facts: [...facts, "Allowed: Object, ObjectType that is no Interface"],
          data: { ...edge },
        });
      } else if (
        target &&
        isChainLoaded(ctx, edge.target) &&
        (edge.target === T.BaseInterfaceType || !isKindOf(ctx, edge.target, T.BaseInterfaceType))
      ) {
        report({
          attribute: "references",
          message: `${target.browseName.name} is no Interface.`,
          facts: [...facts, "The target must be a subtype of BaseInterfaceType (i=17602)."],
          data: { ...edge },
        });
      }
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "A type that applies an Interface.",
      build: (m) => {
        m.reference(
          m.objectType("PumpType"),
          R.HasInterface,
          m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true }),
        );
        return undefined;
      },
    },
    bad: {
      text: "A target that is no Interface.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.reference(pump, R.HasInterface, m.objectType("RatedType"));
        return pump;
      },
    },
  },
};
