import { hasValueAttributes, isAbstract } from "../../address-space/node";
import { findDataTypeOf } from "../data-types";
import { extensionObject } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { findTypeId, findValueRoot, listExtensionObjects } from "../value-xml";

export const r106: NodeRule = {
  id: "R106",
  title: "A value has a concrete DataType",
  severity: "error",
  clause: clause(3, "§5.8.3"),
  priority: 2,
  concerns: ["Variable", "VariableType"],
  needs: ["structure"],
  condition:
    "The TypeId of a structure in a value stands for a concrete DataType; the DataType attribute may be abstract.",
  why: "There is no encoding of an abstract type, so that nobody can read the value.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    for (const element of listExtensionObjects(findValueRoot(node.value))) {
      const typeId = findTypeId(element);
      const key = typeId === undefined ? undefined : findDataTypeOf(ctx, typeId);
      const dataType = key === undefined ? undefined : ctx.node(key);
      if (!dataType || !isAbstract(dataType)) continue;
      report({
        attribute: "value",
        message: `The Value of ${node.browseName.name} is of the abstract DataType ${dataType.browseName.name}.`,
        facts: [`TypeId: ${typeId ?? ""}`, `It stands for ${ctx.describe(dataType.key)}, IsAbstract: true`],
      });
      return;
    }
  },
  examples: {
    good: {
      text: "A concrete structure.",
      build: (m) =>
        m.variable("Limits", {
          parent: m.object("Pump1"),
          dataType: m.dataType("BaseRecipeDataType", { isAbstract: true, definition: { fields: [] } }),
        }),
    },
    bad: {
      text: "A value of the abstract structure.",
      build: (m) => {
        const dataType = m.dataType("BaseRecipeDataType", { isAbstract: true, definition: { fields: [] } });
        return m.variable("Recipe", {
          parent: m.object("Pump1"),
          dataType,
          value: extensionObject(dataType, "<BaseRecipeDataType/>"),
        });
      },
    },
  },
};
