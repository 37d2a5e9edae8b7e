import { getDataType } from "../../address-space/node";
import { StandardDataType as D } from "../../address-space/standard-ids";
import { findSubject, notPossible, setAttribute } from "../fixes";
import { ok } from "../../core/result";
import { isChainLoaded, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";
import { addStructure } from "../structures";

const TEXTS = [D.String, D.LocalizedText, D.ByteString];

export const r149: NodeRule = {
  id: "R149",
  title: "MaxStringLength on texts only",
  severity: "error",
  clause: `${clause(3, "§8.51")}, ${clause(6, "§F.13, Table F.14")}`,
  priority: 2,
  concerns: ["DataType"],
  condition: "MaxStringLength above 0 stands on fields of String, LocalizedText, ByteString and subtypes only.",
  why: "It means nothing elsewhere; strict loaders refuse the type.",
  check(node, ctx, report) {
    if (node.nodeClass !== "DataType") return;
    for (const field of node.definition?.fields ?? []) {
      const type = getDataType(field);
      if (!field.maxStringLength || !isChainLoaded(ctx, type) || TEXTS.some((t) => isKindOf(ctx, type, t))) continue;
      report({
        attribute: "definition",
        message: `The field ${field.name} of ${node.browseName.name} is no text and has MaxStringLength ${field.maxStringLength}.`,
        facts: [`DataType: ${ctx.describe(type)}`],
        data: { field: field.name },
      });
    }
  },
  fix: {
    label: "Drop MaxStringLength",
    apply(space, finding) {
      const node = findSubject(space, finding);
      if (node?.nodeClass !== "DataType" || !node.definition) return notPossible(finding);
      const fields = node.definition.fields.map((f) => {
        if (f.name !== finding.data?.["field"]) return f;
        const { maxStringLength: _dropped, ...rest } = f;
        return rest;
      });
      return ok([setAttribute(node.key, "definition", { ...node.definition, fields })]);
    },
  },
  examples: {
    good: {
      text: "On a String.",
      build: (m) => addStructure(m, "RecipeDataType", [{ name: "Name", dataType: D.String, maxStringLength: 50 }]),
    },
    bad: {
      text: "On an Int32.",
      build: (m) => addStructure(m, "RecipeDataType", [{ name: "Count", dataType: D.Int32, maxStringLength: 50 }]),
    },
  },
};
