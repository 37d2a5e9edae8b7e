import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { isMethodOfType } from "../event-ends";
import { findSubject, keyOf, notPossible } from "../fixes";
import { ok } from "../../core/result";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r052: NodeRule = {
  id: "R052",
  title: "Source of GeneratesEvent",
  severity: "error",
  clause: clause(3, "§7.15, §5.7.1"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.GeneratesEvent,
  condition: "GeneratesEvent starts at an ObjectType, a VariableType or a Method of a type.",
  why: "Clients look at the type to learn which events its instances send; at an instance nobody looks.",
  check(node, ctx, report) {
    const always = ctx.closure(R.AlwaysGeneratesEvent);
    for (const edge of edgesDeclaredAt(node, ctx, R.GeneratesEvent)) {
      const source = ctx.node(edge.source);
      if (!source || always.has(edge.type)) continue;
      if (source.nodeClass === "ObjectType" || source.nodeClass === "VariableType" || isMethodOfType(ctx, source))
        continue;
      report({
        attribute: "references",
        message: `${ctx.nameOf(edge.type)} cannot start at the ${source.nodeClass} ${source.browseName.name}.`,
        facts: [
          `Source: ${ctx.describe(edge.source)}, ${source.nodeClass}`,
          `Target: ${ctx.describe(edge.target)}`,
          "Allowed: ObjectType, VariableType, Method of a type",
        ],
        data: { ...edge },
      });
    }
  },
  fix: {
    label: "Move the reference to the type of the node",
    apply(space, finding) {
      const node = findSubject(space, finding);
      const [source, type, target] = [keyOf(finding, "source"), keyOf(finding, "type"), keyOf(finding, "target")];
      if (!node || source === undefined || type === undefined || target === undefined) return notPossible(finding);
      const owner = space.edgesFrom(source).find((e) => e.type === R.HasTypeDefinition)?.target;
      const removed = { kind: "removeReference", source, type, target } as const;
      if (owner === undefined || !space.isOwn(owner)) return ok([removed]);
      const isThere = space.edgesFrom(owner).some((e) => e.type === type && e.target === target);
      return ok(
        isThere ? [removed] : [removed, { kind: "addReference", source: owner, type, target, declaredAt: "source" }],
      );
    },
  },
  examples: {
    good: {
      text: "The type generates the event.",
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
      text: "The instance generates it.",
      build: (m) => {
        const pump = m.object("Pump1");
        m.reference(pump, R.GeneratesEvent, m.objectType("DryRunEventType", { supertype: T.BaseEventType }));
        return pump;
      },
    },
  },
};
