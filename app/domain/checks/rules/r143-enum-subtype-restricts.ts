import { isAbstract } from "../../address-space/node";
import { addEnumeration, fieldText, isEnumeration, valueOf } from "../enumerations";
import { listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardReferenceType as R } from "../../address-space/standard-ids";

export const r143: NodeRule = {
  id: "R143",
  title: "A subtype of an enumeration only restricts it",
  severity: "error",
  clause: clause(3, "§8.14"),
  priority: 2,
  concerns: ["DataType"],
  condition: "A subtype of a concrete enumeration adds no values and changes no texts.",
  why: "Clients that know the supertype get values that they do not know.",
  check(node, ctx, report) {
    const [supertype] = listSupertypes(ctx, node.key);
    const base = supertype === undefined ? undefined : ctx.node(supertype);
    if (
      node.nodeClass !== "DataType" ||
      base?.nodeClass !== "DataType" ||
      isAbstract(base) ||
      !isEnumeration(ctx, base.key)
    )
      return;
    const known = new Map((base.definition?.fields ?? []).map((f) => [valueOf(f), fieldText(f)] as const));
    if (known.size === 0) return;
    for (const field of node.definition?.fields ?? []) {
      const text = known.get(valueOf(field));
      if (text === fieldText(field)) continue;
      report({
        attribute: "definition",
        message:
          text === undefined
            ? `${node.browseName.name} adds the value ${valueOf(field)} to ${base.browseName.name}.`
            : `${node.browseName.name} gives the value ${valueOf(field)} another text than ${base.browseName.name}.`,
        facts: [
          `Here: ${valueOf(field)} “${fieldText(field)}”`,
          `${ctx.describe(base.key)}: ${text === undefined ? "no such value" : `“${text}”`}`,
        ],
      });
    }
  },
  examples: {
    good: {
      text: "The subtype leaves one out.",
      build: (m) => {
        const base = addEnumeration(m, "PumpStateEnum", [
          { name: "Off", value: 0 },
          { name: "On", value: 1 },
        ]);
        const sub = addEnumeration(m, "SimplePumpStateEnum", [{ name: "Off", value: 0 }]);
        m.removeReferences(sub, R.HasSubtype);
        m.set(sub, { references: [{ type: R.HasSubtype, target: base, isForward: false }] });
        return undefined;
      },
    },
    bad: {
      text: "The subtype adds one.",
      build: (m) => {
        const base = addEnumeration(m, "PumpStateEnum", [{ name: "Off", value: 0 }]);
        const sub = addEnumeration(m, "RichPumpStateEnum", [
          { name: "Off", value: 0 },
          { name: "Fault", value: 1 },
        ]);
        m.set(sub, { references: [{ type: R.HasSubtype, target: base, isForward: false }] });
        return sub;
      },
    },
  },
};
