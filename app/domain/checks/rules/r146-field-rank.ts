import { getValueRank } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { clause, type NodeRule } from "../rule";
import { addStructure, isStructure } from "../structures";

export const r146: NodeRule = {
  id: "R146",
  title: "ValueRank of structure fields",
  severity: "error",
  clause: `${clause(3, "§8.51")}, ${clause(6, "§F.13, Table F.14")}`,
  priority: 1,
  concerns: ["DataType"],
  condition:
    "A field has ValueRank −1 or a number of dimensions; ArrayDimensions has as many entries where it is given, none for a scalar.",
  why: "A field of open rank cannot be encoded.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType" || !isStructure(ctx, node.key)) return;
    for (const field of node.definition?.fields ?? []) {
      const rank = getValueRank(field);
      const dimensions = (field.arrayDimensions ?? "").trim();
      const entries = dimensions === "" ? 0 : dimensions.split(",").length;
      const shown = String(rank).replace("-", "−");
      const facts = [`ValueRank: ${shown}`, `ArrayDimensions: ${dimensions || "none"}`];
      if (rank !== -1 && !(rank >= 1))
        report({
          attribute: "definition",
          message: `The field ${field.name} of ${node.browseName.name} has the ValueRank ${shown}.`,
          facts,
          data: { field: field.name },
        });
      else if (entries > 0 && entries !== Math.max(rank, 0))
        report({
          attribute: "definition",
          message: `ArrayDimensions of the field ${field.name} of ${node.browseName.name} does not fit its rank.`,
          facts,
          data: { field: field.name },
        });
    }
  },
  fix: {
    label: "Make an open rank a list, and drop dimensions that do not fit",
    apply(space, finding) {
      const node = findSubject(space, finding);
      if (node?.nodeClass !== "DataType" || !node.definition) return notPossible(finding);
      const fields = node.definition.fields.map((f) => {
        if (f.name !== finding.data?.["field"]) return f;
        const { arrayDimensions: _dropped, ...rest } = f;
        const rank = getValueRank(f);
        return rank === -1 || rank >= 1 ? rest : { ...rest, valueRank: 1 };
      });
      return ok([setAttribute(node.key, "definition", { ...node.definition, fields })]);
    },
  },
  examples: {
    good: {
      text: "A list.",
      build: (m) => addStructure(m, "RecipeDataType", [{ name: "Speeds", dataType: D.Double, valueRank: 1 }]),
    },
    bad: {
      text: "Any rank.",
      build: (m) => addStructure(m, "RecipeDataType", [{ name: "Speeds", dataType: D.Double, valueRank: -2 }]),
    },
  },
};
