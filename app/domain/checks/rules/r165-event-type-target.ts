import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { isEventType } from "../event-ends";
import { removeReferenceFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r165: NodeRule = {
  id: "R165",
  title: "Generated events are event types",
  severity: "error",
  clause: `${clause(3, "§7.15, §7.16, §4.7.2, §9.2")}, ${clause(5, "§6.4.2")}`,
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.GeneratesEvent,
  condition: "GeneratesEvent and AlwaysGeneratesEvent lead to BaseEventType or a subtype.",
  why: "Clients filter events by type; what does not derive from BaseEventType has no event fields.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.GeneratesEvent)) {
      if (isEventType(ctx, edge.target)) continue;
      report({
        attribute: "references",
        message: `${ctx.nameOf(edge.target)}, which ${ctx.nameOf(edge.source)} generates, is no event type.`,
        facts: [
          `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`,
          "Asked for: BaseEventType (i=2041) or below",
        ],
        data: { ...edge },
      });
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "An event type.",
      build: (m) => {
        m.reference(
          m.objectType("PumpType"),
          R.GeneratesEvent,
          m.objectType("DryRunEventType", { supertype: T.BaseEventType }),
        );
        return undefined;
      },
    },
    bad: {
      text: "A type below BaseObjectType.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.reference(pump, R.GeneratesEvent, m.objectType("DryRunType"));
        return pump;
      },
    },
  },
};
