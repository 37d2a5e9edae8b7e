import { hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { listSymbols, unitById } from "../../units/units";
import { unit } from "../example-values";
import { attributeFix } from "../fixes";
import { clause, type NodeRule } from "../rule";
import { isUnece, listUnits } from "../unit-values";

export const r127: NodeRule = {
  id: "R127",
  title: "Texts of a unit are those of its code",
  severity: "warning",
  clause: clause(8, "§5.6.3.4"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["structure"],
  condition:
    "For a unitId of the published table the English or unnamed displayName is its symbol; of several in the cell any. Another description is a hint.",
  why: "One of the two is wrong, and a reader of the display cannot know which.",
  check(node, _ctx, report) {
    if (!hasValueAttributes(node)) return;
    for (const value of listUnits(node.value)) {
      const known = isUnece(value) ? unitById(Number(value.unitId)) : undefined;
      if (!known) continue;
      const symbols = listSymbols(known);
      const isSymbolRight = !isEnglish(value.symbolLocale) || value.symbol === "" || symbols.includes(value.symbol);
      const isNameRight = !isEnglish(value.nameLocale) || value.name === "" || value.name === known.name;
      if (isSymbolRight && isNameRight) continue;
      const facts = [
        `UnitId: ${value.unitId} is ${known.code}`,
        `Table: “${symbols.join("” or “")}”, ${known.name}`,
        `Here: “${value.symbol}”, ${value.name || "no description"}`,
      ];
      if (!isSymbolRight) {
        report({
          attribute: "value",
          message: `The unit of ${node.browseName.name} is written “${value.symbol}”, its code means “${known.symbol}”.`,
          facts,
        });
      } else {
        report({
          severity: "hint",
          attribute: "value",
          message: `The unit of ${node.browseName.name} is described as “${value.name}”, its code means ${known.name}.`,
          facts,
        });
      }
    }
  },
  fix: attributeFix("Take the texts of the table", "value", (node) => {
    const [value, second] = hasValueAttributes(node) ? listUnits(node.value) : [];
    const known = value && !second && isUnece(value) ? unitById(Number(value.unitId)) : undefined;
    return known && unit({ unitId: known.unitId, symbol: known.symbol, name: known.name });
  }),
  examples: {
    good: {
      text: "°C for CEL.",
      build: (m) =>
        m.property("0:EngineeringUnits", {
          parent: m.variable("T", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
          dataType: D.EUInformation,
          value: unit({ unitId: 4408652, symbol: "°C", name: "degree Celsius" }),
        }),
    },
    bad: {
      text: "degC for CEL.",
      build: (m) =>
        m.property("0:EngineeringUnits", {
          parent: m.variable("T", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
          dataType: D.EUInformation,
          value: unit({ unitId: 4408652, symbol: "degC", name: "degree Celsius" }),
        }),
    },
  },
};

function isEnglish(locale: string): boolean {
  return locale === "" || locale === "en" || locale.startsWith("en-");
}
