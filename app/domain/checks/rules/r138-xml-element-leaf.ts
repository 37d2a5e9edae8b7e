import { StandardDataType as D } from "../../address-space/standard-ids";
import { listSupertypes } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r138: NodeRule = {
  id: "R138",
  title: "XmlElement has no subtypes",
  severity: "error",
  clause: clause(6, "§5.1.2, Table 1"),
  priority: 2,
  concerns: ["DataType"],
  condition: "No DataType derives from XmlElement, which is deprecated.",
  why: "Newer stacks do not know the type any more.",
  check(node, ctx, report) {
    if (!listSupertypes(ctx, node.key).includes(D.XmlElement)) return;
    report({
      attribute: "references",
      message: `The DataType ${node.browseName.name} derives from XmlElement.`,
      facts: [
        `Supertypes: ${listSupertypes(ctx, node.key)
          .map((t) => ctx.nameOf(t))
          .join(", ")}`,
      ],
    });
  },
  examples: {
    good: { text: "XML text in a String.", build: (m) => m.dataType("RecipeXml", { supertype: D.String }) },
    bad: { text: "Below XmlElement.", build: (m) => m.dataType("RecipeXml", { supertype: D.XmlElement }) },
  },
};
