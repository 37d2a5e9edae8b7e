import type { NodeKey } from "../../address-space/node-id";
import { StandardReferenceType as R } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import { edgesDeclaredAt } from "../edges";
import { findTypeAbove, findTypeDefinition, isChainLoaded, isKindOf, ofType } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

const SOURCES = ["Object", "Variable", "Method", "ObjectType", "VariableType"];

export const r056: NodeRule = {
  id: "R056",
  title: "Ends of HasCondition",
  severity: "error",
  clause: `${clause(9, "§5.12, §6.2, §6.3, §6.4")}, ${clause(3, "§7.17")}`,
  priority: 1,
  concerns: ALL_CLASSES,
  declares: N.HasCondition,
  condition:
    "HasCondition leads from an Object, a Variable, a Method or their types to a condition or a condition type. A source that is nobody's event source is a warning.",
  why: "Clients find the alarms of a tag along this reference; events of a source that hangs on no notifier never arrive.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, N.HasCondition)) {
      const source = ctx.node(edge.source);
      const target = ctx.node(edge.target);
      const facts = [`HasCondition from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`];
      if (source && !SOURCES.includes(source.nodeClass)) {
        report({
          attribute: "references",
          message: `The ${source.nodeClass} ${source.browseName.name} cannot have a condition.`,
          facts: [...facts, `Allowed: ${SOURCES.join(", ")}`],
        });
      }
      if (target && !isCondition(ctx, edge.target)) {
        report({
          attribute: "references",
          message: `${target.browseName.name} is no condition.`,
          facts: [...facts, `Target: ${target.nodeClass}, not of ConditionType (i=2782) or below`],
        });
      }
      const isPlain =
        source !== undefined &&
        ["Object", "Variable", "Method"].includes(source.nodeClass) &&
        findTypeAbove(ctx, edge.source) === undefined;
      if (
        isPlain &&
        ctx.isOwn(edge.source) &&
        ofType(ctx, ctx.parentEdges(edge.source), R.HasEventSource).length === 0
      ) {
        report({
          severity: "warning",
          attribute: "references",
          message: `${ctx.nameOf(edge.source)} has a condition but is nobody's event source.`,
          facts: [...facts, `HasEventSource references to ${ctx.nameOf(edge.source)}: 0`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "A type that has a condition type.",
      build: (m) => {
        m.reference(
          m.objectType("TankType"),
          N.HasCondition,
          m.objectType("OverflowAlarmType", { supertype: N.ConditionType }),
        );
        return undefined;
      },
    },
    bad: {
      text: "A target that is no condition.",
      build: (m) => {
        const tank = m.objectType("TankType");
        m.reference(tank, N.HasCondition, m.objectType("PumpType"));
        return tank;
      },
    },
  },
};

/** A condition type, or an Object of one; also true when that cannot be known. */
function isCondition(ctx: CheckContext, key: NodeKey): boolean {
  const node = ctx.node(key);
  const type = node?.nodeClass === "ObjectType" ? key : findTypeDefinition(ctx, key);
  if (!node || (node.nodeClass !== "ObjectType" && node.nodeClass !== "Object")) return false;
  return type === undefined || !isChainLoaded(ctx, type) || isKindOf(ctx, type, N.ConditionType);
}
