import { attributeFix } from "../fixes";
import { hasValueAttributes } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { unitById, findUnits, listSymbols } from "../../units/units";
import { CELSIUS, unit } from "../example-values";
import { clause, type NodeRule } from "../rule";
import { decodeUnitId, IEC_URI, isUnece, listUnits } from "../unit-values";

export const r126: NodeRule = {
  id: "R126",
  title: "unitId is a UN/CEFACT code",
  severity: "error",
  clause: clause(8, "§5.6.3.3, Table 19, §5.6.3.4, §5.6.3.5"),
  priority: 1,
  concerns: ["Variable", "VariableType"],
  needs: ["structure"],
  condition:
    "Beside the UN/CEFACT namespace the unitId is a common code: two or three characters 0–9, A–Z as bytes, high byte first. −1, “not available”, and a code that the published table does not have are warnings. Beside the IEC 62720 namespace it holds six characters of five bits.",
  why: "Clients find symbol and conversion by the code; a number of another system names another unit or none.",
  check(node, _ctx, report) {
    if (!hasValueAttributes(node)) return;
    for (const value of listUnits(node.value)) {
      const unitId = Number(value.unitId);
      if (isUnece(value) && unitById(unitId) !== undefined) continue;
      const facts = [
        `UnitId: ${value.unitId || "left out"}`,
        `DisplayName: ${value.symbol || "none"}`,
        `NamespaceUri: ${value.uri}`,
      ];
      const name = node.browseName.name;
      if (value.uri === IEC_URI && !(Number.isInteger(unitId) && unitId > 0 && unitId < 2 ** 30)) {
        report({
          attribute: "value",
          message: `The unitId ${value.unitId || "0"} of ${name} is no IEC 62720 code.`,
          facts,
        });
      }
      if (!isUnece(value)) continue;
      if (unitId === -1) {
        report({
          severity: "warning",
          attribute: "value",
          message: `The unit of ${name} has the unitId −1, “not available”.`,
          facts,
        });
      } else if (value.unitId === "" || decodeUnitId(unitId) === undefined) {
        report({
          attribute: "value",
          message: `The unitId ${value.unitId || "0"} of ${name} is no UN/CEFACT code.`,
          facts: [...facts, "A code is two or three characters as bytes: °C is CEL, 0x43454C, 4408652."],
          data: { symbol: value.symbol },
        });
      } else if (unitById(unitId) === undefined) {
        report({
          severity: "warning",
          attribute: "value",
          message: `The unit code ${decodeUnitId(unitId) ?? ""} of ${name} is not in the published table.`,
          facts: [...facts, "The table leaves out doubled and deleted codes of Recommendation 20, and it grows."],
        });
      }
    }
  },
  fix: attributeFix("Take the code of the symbol", "value", (node, { data }) => {
    const symbol = data?.["symbol"];
    const [found] = typeof symbol === "string" && symbol !== "" ? findUnits(symbol, 1) : [];
    return hasValueAttributes(node) &&
      listUnits(node.value).length === 1 &&
      found &&
      listSymbols(found).includes(String(symbol))
      ? unit({ unitId: found.unitId, symbol: found.symbol, name: found.name })
      : undefined;
  }),
  examples: {
    good: {
      text: "4408652 is CEL.",
      build: (m) =>
        m.property("0:EngineeringUnits", {
          parent: m.variable("T", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
          dataType: D.EUInformation,
          value: CELSIUS,
        }),
    },
    bad: {
      text: "A number of another system.",
      build: (m) =>
        m.property("0:EngineeringUnits", {
          parent: m.variable("T", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
          dataType: D.EUInformation,
          value: unit({ unitId: 1001, symbol: "°C", name: "degree Celsius" }),
        }),
    },
  },
};
