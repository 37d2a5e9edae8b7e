import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { removeReferenceFix } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r045: NodeRule = {
  id: "R045",
  title: "A View has hierarchical references only",
  severity: "error",
  clause: `${clause(3, "§5.4, §7.21")}, ${clause(19, "§6.1")}`,
  priority: 2,
  concerns: ["View"],
  condition:
    "From a View lead hierarchical references only; HasDictionaryEntry and IsDeprecated may start anywhere. The Server object stands in no View.",
  why: "A View is a way through the address space and nothing else; servers refuse other references from it.",
  check(node, ctx, report) {
    for (const edge of ctx.otherEdges(node.key)) {
      if (ctx.closure(N.HasDictionaryEntry).has(edge.type) || ctx.closure(N.IsDeprecated).has(edge.type)) continue;
      if (edge.type === R.HasTypeDefinition || edge.type === R.HasModellingRule) continue;
      report({
        attribute: "references",
        message: `The View ${node.browseName.name} cannot have a ${ctx.nameOf(edge.type)}.`,
        facts: [`${ctx.nameOf(edge.type)} to ${ctx.describe(edge.target)}, which is not hierarchical`],
        data: { ...edge },
      });
    }
    for (const edge of ctx.childEdges(node.key)) {
      if (edge.target !== N.Server) continue;
      report({
        attribute: "references",
        message: `The View ${node.browseName.name} holds the Server object.`,
        facts: [`${ctx.nameOf(edge.type)} to ${ctx.describe(N.Server)}`],
        data: { ...edge },
      });
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "A View that organises.",
      build: (m) => {
        m.reference(m.view("Operation"), R.Organizes, m.object("Pump1"));
        return undefined;
      },
    },
    bad: {
      text: "A View that generates events.",
      build: (m) => {
        const view = m.view("Operation");
        m.reference(view, R.GeneratesEvent, m.objectType("DoorOpenEventType", { supertype: T.BaseEventType }));
        return view;
      },
    },
  },
};
