import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { addReference, keyOf, notPossible, retypeReferenceFix, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { findTypeDefinition, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r168: NodeRule = {
  id: "R168",
  title: "An alarm is not a component of a Variable",
  severity: "error",
  clause: `${clause(3, "§7.7")}, ${clause(9, "§5.12, §6.5")}`,
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasComponent,
  condition: "A condition of a tag hangs on it by HasCondition, not by HasComponent.",
  why: "Variables have no Object components: the alarm is refused when the file is loaded, and the tag seems to have none.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasComponent)) {
      const source = ctx.node(edge.source);
      const type = findTypeDefinition(ctx, edge.target);
      if (
        (source?.nodeClass !== "Variable" && source?.nodeClass !== "VariableType") ||
        ctx.classOf(edge.target) !== "Object"
      )
        continue;
      if (type === undefined || !isKindOf(ctx, type, N.ConditionType)) continue;
      report({
        attribute: "references",
        message: `The alarm ${ctx.nameOf(edge.target)} is a component of the ${source.nodeClass} ${source.browseName.name}.`,
        facts: [
          `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`,
          `Type of the alarm: ${ctx.describe(type)}`,
        ],
        data: { ...edge },
      });
    }
  },
  fix: {
    label: "Use HasCondition, and make the alarm a component of the owner of the Variable",
    apply(space, finding, ids) {
      const alarm = keyOf(finding, "target");
      const variable = keyOf(finding, "source");
      const retyped = retypeReferenceFix("", () => N.HasCondition).apply(space, finding, ids);
      if (!retyped.ok || alarm === undefined || variable === undefined) return notPossible(finding);
      const owner = space
        .edgesTo(variable)
        .find((e) => ["Object", "ObjectType"].includes(space.getNode(e.source)?.nodeClass ?? ""))?.source;
      if (owner === undefined) return notPossible(finding);
      return ok([
        ...retyped.value,
        addReference(space, owner, R.HasComponent, alarm),
        setAttribute(alarm, "parent", owner),
      ]);
    },
  },
  examples: {
    good: {
      text: "HasCondition from the tag.",
      build: (m) => {
        const alarm = m.objectType("OverflowAlarmType", { supertype: N.ConditionType });
        m.reference(m.variableType("LevelType"), N.HasCondition, alarm);
        return undefined;
      },
    },
    bad: {
      text: "HasComponent from the tag.",
      build: (m) => {
        const type = m.objectType("OverflowAlarmType", { supertype: N.ConditionType });
        const level = m.variable("Level", { parent: m.objectType("TankType"), rule: "Mandatory" });
        return m.object("Overflow", { parent: level, type, rule: "Optional" });
      },
    },
  },
};
