import { formatNodeId } from "../../address-space/node-id";
import { StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { isTypeNode } from "../../address-space/node";
import { findTypeDefinition, isKindOf } from "../lookups";
import { ALL_CLASSES } from "../node-classes";
import { clause, type NodeRule } from "../rule";

export const r005: NodeRule = {
  id: "R005",
  title: "Numeric identifiers for types and encodings",
  severity: "warning",
  clause: `${clause(6, "§5.1.8")} for encodings; types: common practice, no source`,
  priority: 2,
  concerns: ALL_CLASSES,
  needs: ["text id"],
  condition: "Encodings of DataTypes have numeric identifiers. Types should have them too: there it is a hint.",
  why: "Every message carries the identifier of the encoding: a number takes four bytes, a text takes its length, and some stacks know numbers only.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    const isEncoding = type !== undefined && isKindOf(ctx, type, T.DataTypeEncodingType);
    if (!isEncoding && !isTypeNode(node)) return;
    report({
      ...(isEncoding ? {} : { severity: "hint" }),
      attribute: "nodeId",
      message: `The ${isEncoding ? "encoding" : node.nodeClass} ${node.browseName.name} has no numeric identifier.`,
      facts: [`NodeId: ${formatNodeId(node.nodeId)}`],
    });
  },
  examples: {
    good: {
      text: "A number.",
      build: (m) => m.dataType("RecipeDataType", { definition: { fields: [] }, isAbstract: true }),
    },
    bad: {
      text: "An encoding with a text.",
      build: (m) => {
        const type = m.dataType("RecipeDataType", { definition: { fields: [] } });
        return m.object("0:Default Binary", {
          parent: type,
          reference: R.HasEncoding,
          type: T.DataTypeEncodingType,
          nodeId: { namespaceUri: m.uri, type: "s", identifier: "RecipeDataType.Encoding" },
        });
      },
    },
  },
};
