import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { isMethodOfType } from "../event-ends";
import { retypeReferenceFix } from "../fixes";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r053: NodeRule = {
  id: "R053",
  title: "Source of AlwaysGeneratesEvent",
  severity: "error",
  clause: clause(3, "§7.16"),
  priority: 2,
  concerns: ALL_CLASSES,
  declares: R.AlwaysGeneratesEvent,
  condition: "AlwaysGeneratesEvent starts at a Method of a type.",
  why: "It promises an event for every call; what is not called cannot keep the promise.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.AlwaysGeneratesEvent)) {
      const source = ctx.node(edge.source);
      if (!source || isMethodOfType(ctx, source)) continue;
      report({
        attribute: "references",
        message: `${ctx.nameOf(edge.type)} cannot start at the ${source.nodeClass} ${source.browseName.name}.`,
        facts: [`Source: ${ctx.describe(edge.source)}, ${source.nodeClass}`, "Allowed: a Method of a type"],
        data: { ...edge },
      });
    }
  },
  fix: retypeReferenceFix("Use GeneratesEvent", () => R.GeneratesEvent),
  examples: {
    good: {
      text: "A Method of a type.",
      build: (m) => {
        const start = m.method("Start", { parent: m.objectType("PumpType"), rule: "Mandatory" });
        m.reference(start, R.AlwaysGeneratesEvent, m.objectType("StartedEventType", { supertype: T.BaseEventType }));
        return undefined;
      },
    },
    bad: {
      text: "An ObjectType.",
      build: (m) => {
        const pump = m.objectType("PumpType");
        m.reference(pump, R.AlwaysGeneratesEvent, m.objectType("StartedEventType", { supertype: T.BaseEventType }));
        return pump;
      },
    },
  },
};
