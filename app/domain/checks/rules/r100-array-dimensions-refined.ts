import { hasValueAttributes } from "../../address-space/node";
import { attributeFix } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { listValueBases } from "../value-bases";

export const r100: NodeRule = {
  id: "R100",
  title: "ArrayDimensions only refined",
  severity: "error",
  clause: clause(3, "§6.2.8"),
  priority: 2,
  concerns: ["Variable", "VariableType"],
  attributes: ["arrayDimensions"],
  condition:
    "Where both sides give ArrayDimensions, an entry 0 may become a number; other entries and their count stay.",
  why: "Clients of the base type reserve the length that it promises.",
  check(node, ctx, report) {
    if (!hasValueAttributes(node)) return;
    const here = listEntries(node.arrayDimensions);
    if (here.length === 0) return;
    for (const { base, role } of listValueBases(node, ctx)) {
      const wider = listEntries(base.arrayDimensions);
      if (wider.length === 0 || (wider.length === here.length && wider.every((w, i) => w === "0" || w === here[i])))
        continue;
      report({
        attribute: "arrayDimensions",
        message: `ArrayDimensions ${here.join(",")} of ${node.browseName.name} do not fit ${wider.join(",")} of ${role} ${base.browseName.name}.`,
        facts: [`Here: ${here.join(",")}`, `${ctx.describe(base.key)}: ${wider.join(",")}`],
        data: { dimensions: wider.join(",") },
      });
    }
  },
  fix: attributeFix(
    "Take the dimensions of the base",
    "arrayDimensions",
    (_node, finding) => finding.data?.["dimensions"],
  ),
  examples: {
    good: {
      text: "0 becomes 3.",
      build: (m) =>
        m.variable("Map", {
          parent: m.object("Pump1"),
          type: m.variableType("MapType", { valueRank: 1, arrayDimensions: "0" }),
          valueRank: 1,
          arrayDimensions: "3",
        }),
    },
    bad: {
      text: "3 becomes 4.",
      build: (m) =>
        m.variable("Map", {
          parent: m.object("Pump1"),
          type: m.variableType("MapType", { valueRank: 1, arrayDimensions: "3" }),
          valueRank: 1,
          arrayDimensions: "4",
        }),
    },
  },
};

function listEntries(text: string | undefined): string[] {
  return text === undefined || text.trim() === "" ? [] : text.split(",").map((entry) => entry.trim());
}
