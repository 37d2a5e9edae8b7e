import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { findTypeDefinition, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { StandardNode } from "../standard-nodes";

export const r031: NodeRule = {
  id: "R031",
  title: "Source of HasComponent to an Object or a Method",
  severity: "error",
  clause: clause(3, "§7.7"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasComponent,
  condition: "An Object or a Method is a component of an Object or an ObjectType only.",
  why: "Variables and VariableTypes have no Object or Method components; servers refuse them and clients never show them.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasComponent)) {
      const source = ctx.node(edge.source);
      const target = ctx.node(edge.target);
      if (!source || !target || (target.nodeClass !== "Object" && target.nodeClass !== "Method")) continue;
      if (source.nodeClass === "Object" || source.nodeClass === "ObjectType") continue;
      // An alarm below a Variable is a finding of R168.
      const type = findTypeDefinition(ctx, edge.target);
      if (
        source.nodeClass.startsWith("Variable") &&
        type !== undefined &&
        isKindOf(ctx, type, StandardNode.ConditionType)
      )
        continue;
      report({
        attribute: "references",
        message: `The ${target.nodeClass} ${target.browseName.name} cannot be a component of the ${source.nodeClass} ${source.browseName.name}.`,
        facts: [
          `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`,
          `NodeClass of the source: ${source.nodeClass}; allowed: Object, ObjectType`,
        ],
        data: { ...edge },
      });
    }
  },
  examples: {
    good: {
      text: "A Method below an ObjectType.",
      build: (m) => m.method("Start", { parent: m.objectType("PumpType"), rule: "Mandatory" }),
    },
    bad: {
      text: "An Object below a VariableType.",
      build: (m) => m.object("Details", { parent: m.variableType("LevelType"), rule: "Optional" }),
    },
  },
};
