import { StandardDataType as D } from "../../address-space/standard-ids";
import { listFields } from "../data-types";
import { clause, type NodeRule } from "../rule";
import { addStructure, isStructure } from "../structures";

export const r148: NodeRule = {
  id: "R148",
  title: "Flags of structure fields go together",
  severity: "error",
  clause: `${clause(6, "§F.12, Table F.13, §F.13")}, ${clause(3, "§8.49")}`,
  priority: 1,
  concerns: ["DataType"],
  condition:
    "No optional fields in a Union, and no optional fields beside fields that allow subtypes, inherited ones counted.",
  why: "There is no kind of structure for the combination, so that no stack can encode it.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType" || !isStructure(ctx, node.key) || !node.definition) return;
    const fields = listFields(ctx, node.key);
    const optional = fields.find((f) => f.isOptional);
    const open = fields.find((f) => f.allowSubTypes);
    if (!optional) return;
    const name = node.browseName.name;
    if (node.definition.isUnion)
      report({
        attribute: "definition",
        message: `The Union ${name} has the optional field ${optional.name}.`,
        facts: ["IsUnion: true", `IsOptional: ${optional.name}`],
      });
    else if (open)
      report({
        attribute: "definition",
        message: `${name} has the optional field ${optional.name} and the field ${open.name}, which allows subtypes.`,
        facts: [`IsOptional: ${optional.name}`, `AllowSubTypes: ${open.name}`],
      });
  },
  examples: {
    good: {
      text: "Optional fields only.",
      build: (m) => addStructure(m, "RecipeDataType", [{ name: "Speed", dataType: D.Double, isOptional: true }]),
    },
    bad: {
      text: "One optional, one that allows subtypes.",
      build: (m) => {
        const step = m.dataType("StepDataType", { isAbstract: true, definition: { fields: [] } });
        return addStructure(m, "RecipeDataType", [
          { name: "Speed", dataType: D.Double, isOptional: true },
          { name: "First", dataType: step, allowSubTypes: true },
        ]);
      },
    },
  },
};
