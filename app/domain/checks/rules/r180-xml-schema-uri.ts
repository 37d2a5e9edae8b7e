import { modelsFix } from "../header-fixes";
import { clause, type ModelRule } from "../rule";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { addStructure } from "../structures";

export const r180: ModelRule = {
  id: "R180",
  title: "XmlSchemaUri where DataTypes are defined",
  severity: "warning",
  clause: clause(6, "§F.2, §F.1"),
  priority: 1,
  concerns: "model",
  condition:
    "A model that defines DataTypes names the XML namespace of their values. (§F.2 says “required”, §F.1 “may”.)",
  why: "Values of the model's structures cannot be written in XML without it.",
  check(ctx, report) {
    if (!ctx.hasOwnDataTypes()) return;
    for (const { modelUri, xmlSchemaUri } of ctx.header.models) {
      if (xmlSchemaUri !== undefined && xmlSchemaUri !== "") continue;
      report({
        attribute: "models",
        message: `The model ${modelUri} defines DataTypes and has no XmlSchemaUri.`,
        facts: ["XmlSchemaUri: none"],
        data: { modelUri },
      });
    }
  },
  fix: modelsFix("Name one after the model", (model) => ({
    ...model,
    xmlSchemaUri: `${model.modelUri.replace(/\/*$/, "/")}Types.xsd`,
  })),
  examples: {
    good: {
      text: "A URI that ends in Types.xsd.",
      build: (m) => addStructure(m, "RecipeDataType", [{ name: "Speed", dataType: D.Double }]),
    },
    bad: {
      text: "Structures without it.",
      build: (m) => {
        addStructure(m, "RecipeDataType", [{ name: "Speed", dataType: D.Double }]);
        m.setModel({ xmlSchemaUri: "" });
        return "model";
      },
    },
  },
};
