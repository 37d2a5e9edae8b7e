import { StandardDataType as D } from "../../address-space/standard-ids";
import { listFields } from "../data-types";
import { clause, type NodeRule } from "../rule";
import { addStructure, isStructure } from "../structures";

export const r147: NodeRule = {
  id: "R147",
  title: "Field names unique, inherited ones included",
  severity: "error",
  clause: `${clause(3, "§8.48, §8.51")}, ${clause(6, "§F.12")}`,
  priority: 2,
  concerns: ["DataType"],
  condition: "No field name stands twice along the line of supertypes; a Definition lists its own fields only.",
  why: "In XML and JSON the second field overwrites the first.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType" || !isStructure(ctx, node.key)) return;
    const names = listFields(ctx, node.key).map((f) => f.name);
    const own = new Set((node.definition?.fields ?? []).map((f) => f.name));
    for (const name of new Set(names.filter((n, i) => names.indexOf(n) !== i))) {
      if (!own.has(name)) continue;
      report({
        attribute: "definition",
        message: `The field ${name} stands twice in ${node.browseName.name}.`,
        facts: [`Fields with inherited ones: ${names.join(", ")}`],
        data: { field: name },
      });
    }
  },
  examples: {
    good: {
      text: "The subtype adds another.",
      build: (m) =>
        addStructure(m, "FastRecipeDataType", [{ name: "Name", dataType: D.String }], {
          supertype: addStructure(m, "RecipeDataType", [{ name: "Id", dataType: D.UInt32 }]),
        }),
    },
    bad: {
      text: "The subtype repeats one.",
      build: (m) =>
        addStructure(m, "FastRecipeDataType", [{ name: "Id", dataType: D.UInt32 }], {
          supertype: addStructure(m, "RecipeDataType", [{ name: "Id", dataType: D.UInt32 }]),
        }),
    },
  },
};
