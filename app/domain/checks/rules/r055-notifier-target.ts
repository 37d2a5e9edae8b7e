import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { isEventNotifier } from "../event-ends";
import { keyOf, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { isInstanceDeclaration } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r055: NodeRule = {
  id: "R055",
  title: "Target of HasNotifier",
  severity: "error",
  clause: clause(3, "§7.18"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasNotifier,
  condition: "HasNotifier leads to an Object to which clients can subscribe for events.",
  why: "HasNotifier says that the target passes on events of its own; without the bit it does not.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasNotifier)) {
      const target = ctx.node(edge.target);
      if (
        !target ||
        (target.nodeClass === "Object" && (isEventNotifier(target) || isInstanceDeclaration(ctx, target.key)))
      )
        continue;
      const bits =
        target.nodeClass === "Object"
          ? `EventNotifier: ${target.eventNotifier ?? 0}; bit 0 must be set`
          : "Allowed: Object";
      report({
        attribute: "references",
        message: `${target.browseName.name} is the target of HasNotifier, but clients cannot subscribe to it.`,
        facts: [
          `${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)}`,
          `Target: ${ctx.describe(edge.target)}, ${target.nodeClass}`,
          bits,
        ],
        data: { ...edge },
      });
    }
  },
  fix: {
    label: "Let clients subscribe to events of the target",
    apply(space, finding) {
      const key = keyOf(finding, "target");
      const node = key === undefined ? undefined : space.own.nodes.get(key);
      if (node?.nodeClass !== "Object") return notPossible(finding);
      return ok([setAttribute(node.key, "eventNotifier", (node.eventNotifier ?? 0) | 1)]);
    },
  },
  examples: {
    good: {
      text: "Both pass events on.",
      build: (m) => {
        m.reference(
          m.object("Area", { set: { eventNotifier: 1 } }),
          R.HasNotifier,
          m.object("Tank1", { set: { eventNotifier: 1 } }),
        );
        return undefined;
      },
    },
    bad: {
      text: "The target does not.",
      build: (m) => {
        const area = m.object("Area", { set: { eventNotifier: 1 } });
        m.reference(area, R.HasNotifier, m.object("Tank1"));
        return area;
      },
    },
  },
};
