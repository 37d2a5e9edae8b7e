import { getDataType, getValueRank } from "../../address-space/node";
import { StandardType as T } from "../../address-space/standard-ids";
import { findTypeDefinition, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";
import { attributeFix } from "../fixes";
import { StandardObject } from "../../address-space/standard-ids";

const ARRAYS = new Map([
  ["StaticNodeIdTypes", N.IdType],
  ["StaticNumericNodeIdRange", N.NumericRange],
]);

export const r182: NodeRule = {
  id: "R182",
  title: "StaticNodeIdTypes and StaticNumericNodeIdRange are arrays",
  severity: "error",
  clause: clause(5, "§6.3.13, Table 22"),
  priority: 2,
  concerns: ["Variable"],
  standardNames: [...ARRAYS.keys()],
  condition:
    "On a namespace metadata object StaticNodeIdTypes is an array of IdType and StaticNumericNodeIdRange an array of NumericRange.",
  why: "Clients that read a list get a single value and take the namespace for dynamic.",
  check(node, ctx, report) {
    const wanted = ARRAYS.get(node.browseName.name);
    if (node.nodeClass !== "Variable" || wanted === undefined) return;
    const isMetadata = ctx.parentEdges(node.key).some((e) => {
      const type = findTypeDefinition(ctx, e.source);
      return type !== undefined && isKindOf(ctx, type, T.NamespaceMetadataType);
    });
    if (!isMetadata || (getValueRank(node) === 1 && isKindOf(ctx, getDataType(node), wanted))) return;
    report({
      attribute: "valueRank",
      message: `${node.browseName.name} is no array of ${ctx.nameOf(wanted)}.`,
      facts: [
        `DataType: ${ctx.describe(getDataType(node))}`,
        `ValueRank: ${String(getValueRank(node)).replace("-", "−")}, asked for 1`,
      ],
    });
  },
  fix: attributeFix("Make it an array", "valueRank", (node) =>
    node.nodeClass === "Variable" && getValueRank(node) !== 1 && node.value === undefined ? 1 : undefined,
  ),
  examples: {
    good: { text: "As the builder of models makes it.", build: (m) => void m.metadata() },
    bad: {
      text: "A single range.",
      build: (m) => {
        const parent = m.object("Other", { parent: StandardObject.ServerNamespaces, type: T.NamespaceMetadataType });
        return m.property("0:StaticNumericNodeIdRange", { parent, dataType: N.NumericRange });
      },
    },
  },
};
