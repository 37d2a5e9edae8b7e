import { StandardDataType as D } from "../../address-space/standard-ids";
import { standardKey } from "../../address-space/node-id";
import { checkProperties, findItemType, type WantedProperty } from "../discrete-items";
import { clause, type NodeRule } from "../rule";
import { StandardNode as N } from "../standard-nodes";

const AxisScaleEnumeration = standardKey(12077);

const WANTED: readonly WantedProperty[] = [
  { name: "EURange", dataType: D.Range },
  { name: "EngineeringUnits", dataType: D.EUInformation },
  { name: "Title", dataType: D.LocalizedText },
  { name: "AxisScaleType", dataType: AxisScaleEnumeration },
];

export const r135: NodeRule = {
  id: "R135",
  title: "Array items complete",
  severity: "error",
  clause: clause(8, "§5.3.4.1, Table 10, §5.3.4.2–§5.3.4.6"),
  priority: 2,
  concerns: ["Variable"],
  types: [N.ArrayItemType],
  needs: ["no type above"],
  condition:
    "An instance of a subtype of ArrayItemType has EURange, EngineeringUnits, Title and AxisScaleType; ArrayItemType itself is abstract and has no plain instance.",
  why: "Spectra and images cannot be drawn without their title and axes.",
  check(node, ctx, report) {
    const type = findItemType(node, ctx, N.ArrayItemType);
    if (type === undefined) return;
    if (type === N.ArrayItemType) {
      report({
        attribute: "references",
        message: `${node.browseName.name} is an instance of the abstract ArrayItemType.`,
        facts: [`HasTypeDefinition: ${ctx.describe(type)}`],
      });
    }
    checkProperties(node, type, WANTED, ctx, report);
  },
  examples: {
    good: {
      text: "A declaration leaves them to its type.",
      build: (m) =>
        m.variable("Spectrum", {
          parent: m.objectType("AnalyserType"),
          type: N.YArrayItemType,
          dataType: D.Double,
          valueRank: 1,
          rule: "Optional",
        }),
    },
    bad: {
      text: "A spectrum without its axis.",
      build: (m) =>
        m.variable("Spectrum", {
          parent: m.object("Analyser"),
          type: N.YArrayItemType,
          dataType: D.Double,
          valueRank: 1,
        }),
    },
  },
};
