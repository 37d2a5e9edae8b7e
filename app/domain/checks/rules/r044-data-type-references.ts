import { StandardReferenceType as R } from "../../address-space/standard-ids";
import { removeReferenceFix } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

const ALLOWED = [
  R.HasSubtype,
  R.HasProperty,
  R.HasEncoding,
  N.HasDataTypeRefinement,
  N.HasDictionaryEntry,
  N.IsDeprecated,
];

export const r044: NodeRule = {
  id: "R044",
  title: "References of a DataType",
  severity: "error",
  clause: `${clause(3, "§5.8.3, §7.30, §7.21")}, ${clause(19, "§6.1")}`,
  priority: 2,
  concerns: ["DataType"],
  condition:
    "From a DataType lead HasProperty, HasSubtype, HasEncoding and HasDataTypeRefinement only; HasDictionaryEntry and IsDeprecated may start anywhere.",
  why: "A DataType has no components: what hangs there is neither part of a value nor found by clients.",
  check(node, ctx, report) {
    const allowed = ALLOWED.map((t) => ctx.closure(t));
    for (const edge of ctx.edgesFrom(node.key)) {
      if (allowed.some((types) => types.has(edge.type))) continue;
      report({
        attribute: "references",
        message: `The DataType ${node.browseName.name} cannot have a ${ctx.nameOf(edge.type)}.`,
        facts: [
          `${ctx.nameOf(edge.type)} to ${ctx.describe(edge.target)}`,
          "Allowed: HasProperty, HasSubtype, HasEncoding",
        ],
        data: { ...edge },
      });
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "A Property.",
      build: (m) =>
        m.property("Note", { parent: m.dataType("RecipeDataType", { isAbstract: true, definition: { fields: [] } }) }),
    },
    bad: {
      text: "A notifier at a DataType.",
      build: (m) => {
        const type = m.dataType("RecipeDataType", { isAbstract: true, definition: { fields: [] } });
        m.reference(type, R.HasEventSource, m.object("Pump1"));
        return type;
      },
    },
  },
};
