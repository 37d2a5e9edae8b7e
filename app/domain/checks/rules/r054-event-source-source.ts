import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { isEventNotifier } from "../event-ends";
import { keyOf, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { isInstanceDeclaration } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r054: NodeRule = {
  id: "R054",
  title: "Source of HasEventSource",
  severity: "error",
  clause: clause(3, "§7.17, §5.5.1, Table 11"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasEventSource,
  condition:
    "HasEventSource starts at an Object or a View to which clients can subscribe for events, or at an ObjectType and leads to one of its declarations.",
  why: "Nobody can subscribe at the source, so the events of the target never arrive anywhere.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.HasEventSource)) {
      const source = ctx.node(edge.source);
      if (!source || isEventNotifier(source) || isInstanceDeclaration(ctx, source.key)) continue;
      if (
        source.nodeClass === "ObjectType" &&
        (ctx.classOf(edge.target) === undefined || isInstanceDeclaration(ctx, edge.target))
      )
        continue;
      const bits =
        source.nodeClass === "Object" || source.nodeClass === "View"
          ? `EventNotifier: ${source.eventNotifier ?? 0}; bit 0 must be set`
          : "Allowed: Object, View, ObjectType";
      report({
        attribute: "references",
        message: `${source.browseName.name} has event sources, but clients cannot subscribe to it.`,
        facts: [
          `${ctx.nameOf(edge.type)} to ${ctx.describe(edge.target)}`,
          `Source: ${ctx.describe(edge.source)}, ${source.nodeClass}`,
          bits,
        ],
        data: { ...edge },
      });
    }
  },
  fix: {
    label: "Let clients subscribe to events of the source",
    apply(space, finding) {
      const key = keyOf(finding, "source");
      const node = key === undefined ? undefined : space.own.nodes.get(key);
      if (!node || (node.nodeClass !== "Object" && node.nodeClass !== "View")) return notPossible(finding);
      return ok([setAttribute(node.key, "eventNotifier", (node.eventNotifier ?? 0) | 1)]);
    },
  },
  examples: {
    good: {
      text: "The bit is set.",
      build: (m) => {
        m.reference(m.object("Area", { set: { eventNotifier: 1 } }), R.HasEventSource, m.object("Tank1"));
        return undefined;
      },
    },
    bad: {
      text: "The bit is not set.",
      build: (m) => {
        const area = m.object("Area");
        m.reference(area, R.HasEventSource, m.object("Tank1"));
        return area;
      },
    },
  },
};
