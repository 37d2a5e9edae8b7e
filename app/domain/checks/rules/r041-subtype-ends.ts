import { isTypeNode } from "../../address-space/node";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r041: NodeRule = {
  id: "R041",
  title: "Ends of HasSubtype",
  severity: "error",
  clause: `${clause(3, "§7.10, §6.3.1, §5.3.3.3, §5.5.2, §5.6.5, §5.8.3")}, ${clause(6, "§F.4")}`,
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasSubtype,
  condition:
    "HasSubtype joins two types of the same NodeClass, from the supertype to the subtype. The subtype should declare it; one that only an own supertype declares is a hint.",
  why: "Most loaders look for the supertype at the subtype. Between unlike classes there is nothing to inherit, and loaders refuse the file.",
  check(node, ctx, report) {
    for (const { source, target } of edgesDeclaredAt(node, ctx, R.HasSubtype)) {
      const supertype = ctx.node(source);
      const subtype = ctx.node(target);
      if (!supertype || !subtype) continue;
      const facts = [
        `Supertype: ${ctx.describe(source)}, ${supertype.nodeClass}`,
        `Subtype: ${ctx.describe(target)}, ${subtype.nodeClass}`,
      ];
      if (!isTypeNode(supertype) || !isTypeNode(subtype) || supertype.nodeClass !== subtype.nodeClass) {
        const message = `HasSubtype joins the ${supertype.nodeClass} ${supertype.browseName.name} with the ${subtype.nodeClass} ${subtype.browseName.name}.`;
        report({ attribute: "references", message, facts, data: { source, target } });
        continue;
      }
      const isAtSubtype = subtype.references.some(
        (r) => !r.isForward && r.type === R.HasSubtype && r.target === source,
      );
      if (!isAtSubtype && ctx.isOwn(target)) {
        const message = `${subtype.browseName.name} does not declare its supertype ${supertype.browseName.name} itself.`;
        report({
          severity: "hint",
          key: target,
          attribute: "references",
          message,
          facts: [...facts, "Declared at the supertype only"],
          data: { source, target },
        });
      }
    }
  },
  examples: {
    good: {
      text: "An ObjectType below an ObjectType.",
      build: (m) => m.objectType("CentrifugalPumpType", { supertype: m.objectType("PumpType") }),
    },
    bad: {
      text: "A VariableType below an ObjectType.",
      build: (m) => m.variableType("LevelType", { supertype: m.objectType("PumpType") }),
    },
  },
};
