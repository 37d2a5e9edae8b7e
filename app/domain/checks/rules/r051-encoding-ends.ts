import { StandardDataType as D, StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { edgesDeclaredAt } from "../edges";
import { findTypeDefinition, isChainLoaded, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r051: NodeRule = {
  id: "R051",
  title: "Ends of HasEncoding",
  severity: "error",
  clause: `${clause(3, "§5.8.3, §5.8.4, §7.14")}, ${clause(6, "§F.4")}`,
  priority: 1,
  concerns: ALL_CLASSES,
  declares: R.HasEncoding,
  condition:
    "HasEncoding leads from a subtype of Structure to an Object of DataTypeEncodingType, and no such Object belongs to two DataTypes.",
  why: "The encoding's NodeId stands in every message: shared between two DataTypes it no longer says which of them is meant.",
  check(node, ctx, report) {
    for (const { source, type, target } of edgesDeclaredAt(node, ctx, R.HasEncoding)) {
      const dataType = ctx.node(source);
      const encoding = ctx.node(target);
      const facts = [`${ctx.nameOf(type)} from ${ctx.describe(source)} to ${ctx.describe(target)}`];
      if (dataType && isChainLoaded(ctx, source) && !isKindOf(ctx, source, D.Structure)) {
        report({
          attribute: "references",
          message: `${dataType.browseName.name} is no Structure and cannot have an encoding.`,
          facts: [...facts, "Source: not below Structure"],
          data: { source, type, target },
        });
      }
      const encodingType = findTypeDefinition(ctx, target);
      if (
        encoding &&
        (encoding.nodeClass !== "Object" ||
          encodingType === undefined ||
          (isChainLoaded(ctx, encodingType) && !isKindOf(ctx, encodingType, T.DataTypeEncodingType)))
      ) {
        report({
          attribute: "references",
          message: `${encoding.browseName.name} is no encoding of a DataType.`,
          facts: [
            ...facts,
            `Target: ${encoding.nodeClass} of type ${encodingType === undefined ? "none" : ctx.describe(encodingType)}`,
          ],
        });
      }
      const owners = ctx
        .otherEdgesTo(target)
        .filter((e) => e.type === R.HasEncoding)
        .map((e) => e.source);
      if (owners.length > 1 && owners.find((o) => ctx.isOwn(o) || ctx.isOwn(target)) === source) {
        report({
          attribute: "references",
          message: `The encoding ${ctx.nameOf(target)} belongs to ${owners.length} DataTypes.`,
          facts: owners.map((o) => `HasEncoding from ${ctx.describe(o)}`),
        });
      }
    }
  },
  examples: {
    good: {
      text: "A Structure with its encoding.",
      build: (m) => {
        const parent = m.dataType("RecipeDataType", { definition: { fields: [] } });
        m.object("0:Default Binary", {
          parent,
          reference: R.HasEncoding,
          type: T.DataTypeEncodingType,
          set: { symbolicName: "DefaultBinary", parent: undefined },
        });
        return undefined;
      },
    },
    bad: {
      text: "An Object that is no encoding.",
      build: (m) =>
        m.object("0:Default Binary", {
          parent: m.dataType("RecipeDataType", { definition: { fields: [] } }),
          reference: R.HasEncoding,
          set: { parent: undefined },
        }),
    },
  },
};
