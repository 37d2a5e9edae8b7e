import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { removeReferenceFix } from "../fixes";
import { findTypeDefinition, isChainLoaded, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r040: NodeRule = {
  id: "R040",
  title: "Source of Organizes",
  severity: "error",
  clause: clause(3, "§7.11, §5.5.3"),
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.Organizes,
  condition:
    "The source of Organizes or a subtype is an Object, an ObjectType or a View. For Organizes itself an Object should be of FolderType or a subtype, else a warning.",
  why: "Organizes says “is filed under”: clients look for it at folders, and servers refuse it elsewhere.",
  check(node, ctx, report) {
    for (const edge of edgesDeclaredAt(node, ctx, R.Organizes)) {
      const source = ctx.node(edge.source);
      if (!source) continue;
      const facts = [`${ctx.nameOf(edge.type)} from ${ctx.describe(edge.source)} to ${ctx.describe(edge.target)}`];
      if (!["Object", "ObjectType", "View"].includes(source.nodeClass)) {
        report({
          attribute: "references",
          message: `The ${source.nodeClass} ${source.browseName.name} cannot organise ${ctx.nameOf(edge.target)}.`,
          facts: [...facts, `NodeClass of the source: ${source.nodeClass}; allowed: Object, ObjectType, View`],
          data: { ...edge },
        });
      } else if (source.nodeClass === "Object" && edge.type === R.Organizes && ctx.isOwn(source.key)) {
        const type = findTypeDefinition(ctx, source.key);
        if (type === undefined || isKindOf(ctx, type, T.FolderType) || !isChainLoaded(ctx, type)) continue;
        report({
          severity: "warning",
          attribute: "references",
          message: `${source.browseName.name} organises ${ctx.nameOf(edge.target)} but is no folder.`,
          facts: [...facts, `Type of ${source.browseName.name}: ${ctx.describe(type)}, not below FolderType`],
        });
      }
    }
  },
  fix: removeReferenceFix(),
  examples: {
    good: {
      text: "A folder that organises an Object.",
      build: (m) => m.object("Pump1", { parent: m.object("Pumps", { type: T.FolderType }), reference: R.Organizes }),
    },
    bad: {
      text: "A VariableType that organises.",
      build: (m) => {
        const type = m.variableType("LevelType");
        m.reference(type, R.Organizes, m.object("Pump1"));
        return type;
      },
    },
  },
};
