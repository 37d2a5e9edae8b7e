import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { removeReferenceFix } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

export const r043: NodeRule = {
  id: "R043",
  title: "A ReferenceType has subtypes and Properties only",
  severity: "error",
  clause: `${clause(3, "§5.3.3.1, §7.21")}, ${clause(19, "§6.1")}`,
  priority: 1,
  concerns: ["ReferenceType"],
  condition:
    "From a ReferenceType lead HasSubtype and HasProperty only; HasDictionaryEntry and IsDeprecated may start anywhere.",
  why: "Other references from a ReferenceType are dropped by loaders.",
  check(node, ctx, report) {
    const allowed = [R.HasSubtype, R.HasProperty, N.HasDictionaryEntry, N.IsDeprecated].map((t) => ctx.closure(t));
    for (const edge of ctx.edgesFrom(node.key)) {
      if (allowed.some((types) => types.has(edge.type))) continue;
      report({
        attribute: "references",
        message: `The ReferenceType ${node.browseName.name} cannot have a ${ctx.nameOf(edge.type)}.`,
        facts: [`${ctx.nameOf(edge.type)} to ${ctx.describe(edge.target)}`, "Allowed: HasSubtype, HasProperty"],
        data: { ...edge },
      });
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "A Property.",
      build: (m) => m.property("Note", { parent: m.referenceType("Feeds", { inverseName: "IsFedBy" }) }),
    },
    bad: {
      text: "An Object that a ReferenceType organises.",
      build: (m) => {
        const type = m.referenceType("Feeds", { inverseName: "IsFedBy" });
        m.reference(type, R.HasEventSource, m.object("Pump1", { type: T.BaseObjectType }));
        return type;
      },
    },
  },
};
