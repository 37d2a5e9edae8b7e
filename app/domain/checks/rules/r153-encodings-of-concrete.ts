import { isAbstract } from "../../address-space/node";
import { StandardDataType as D, StandardReferenceType as R, StandardType as T } from "../../address-space/standard-ids";
import { isChainLoaded } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { isStructure } from "../structures";

export const r153: NodeRule = {
  id: "R153",
  title: "Encodings on concrete Structures only",
  severity: "warning",
  clause: clause(3, "§5.8.2, §5.8.3, Table 16"),
  priority: 1,
  concerns: ["DataType"],
  condition:
    "An abstract Structure has no encoding (the standard's own NodeSet has some: a warning). That simple types have none is asked by R051.",
  why: "There are no values of an abstract type; the encoding is never used.",
  check(node, ctx, report) {
    if (!isAbstract(node) || !isChainLoaded(ctx, node.key) || !isStructure(ctx, node.key)) return;
    const encodings = ctx.otherEdges(node.key).filter((e) => e.type === R.HasEncoding);
    if (encodings.length === 0) return;
    report({
      attribute: "references",
      message: `The abstract DataType ${node.browseName.name} has ${encodings.length} encodings.`,
      facts: encodings.map((e) => `HasEncoding to ${ctx.describe(e.target)}`),
    });
  },
  examples: {
    good: {
      text: "An abstract Structure without.",
      build: (m) => m.dataType("StepDataType", { isAbstract: true, definition: { fields: [] } }),
    },
    bad: {
      text: "One with.",
      build: (m) => {
        const type = m.dataType("StepDataType", {
          isAbstract: true,
          supertype: D.Structure,
          definition: { fields: [] },
        });
        m.object("0:Default Binary", {
          parent: type,
          reference: R.HasEncoding,
          type: T.DataTypeEncodingType,
          set: { symbolicName: "DefaultBinary", parent: undefined },
        });
        return type;
      },
    },
  },
};
