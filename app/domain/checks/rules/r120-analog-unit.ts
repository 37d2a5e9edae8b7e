import { addProperty } from "../add-property";
import { findSubject, notPossible } from "../fixes";
import { getDataType } from "../../address-space/node";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import { CELSIUS, unit } from "../example-values";
import { findStandardProperty, findTypeAbove, findTypeDefinition, isKindOf } from "../lookups";
import { clause, type NodeRule } from "../rule";

export const r120: NodeRule = {
  id: "R120",
  title: "AnalogUnitType has EngineeringUnits",
  severity: "error",
  clause: `${clause(8, "§5.3.2.4, Table 4, §5.3.2.5, Table 5")}, ${clause(3, "§6.4.4.4.1")}, ${clause(6, "§F.3")}`,
  priority: 1,
  concerns: ["Variable"],
  types: [T.AnalogUnitType, T.AnalogUnitRangeType],
  condition:
    "A Variable of AnalogUnitType, AnalogUnitRangeType or a subtype that is a real instance has the Property 0:EngineeringUnits of DataType EUInformation. On declarations it is a hint.",
  why: "A number without its unit is read wrongly sooner or later: bar for pascal, litres for cubic metres.",
  check(node, ctx, report) {
    const type = findTypeDefinition(ctx, node.key);
    if (type === undefined || !(isKindOf(ctx, type, T.AnalogUnitType) || isKindOf(ctx, type, T.AnalogUnitRangeType)))
      return;
    const property = findStandardProperty(ctx, node.key, "EngineeringUnits");
    const isDeclared = findTypeAbove(ctx, node.key) !== undefined;
    if (!property) {
      report({
        ...(isDeclared ? { severity: "hint" } : {}),
        message: `${node.browseName.name} is of ${ctx.nameOf(type)} and has no EngineeringUnits.`,
        facts: [`HasTypeDefinition: ${ctx.describe(type)}`, "Properties named EngineeringUnits in namespace 0: 0"],
        data: { property: "EngineeringUnits" },
      });
    } else if (property.nodeClass === "Variable" && !isKindOf(ctx, getDataType(property), D.EUInformation)) {
      report({
        key: ctx.isOwn(property.key) ? property.key : node.key,
        attribute: "dataType",
        message: `The EngineeringUnits of ${node.browseName.name} has the DataType ${ctx.nameOf(getDataType(property))} instead of EUInformation.`,
        facts: [`DataType: ${ctx.describe(getDataType(property))}`, "Asked for: EUInformation (i=887)"],
      });
    }
  },
  fix: {
    label: "Add EngineeringUnits with the unit one, to be chosen",
    apply(space, finding, ids) {
      const node = findSubject(space, finding);
      if (!node || finding.data?.["property"] !== "EngineeringUnits") return notPossible(finding);
      return addProperty(space, node.key, ids, {
        name: "EngineeringUnits",
        dataType: D.EUInformation,
        value: unit({ unitId: 4404786, symbol: "", name: "one" }),
      });
    },
  },
  examples: {
    good: {
      text: "°C by its UN/CEFACT code.",
      build: (m) => {
        const parent = m.variable("Temperature", { parent: m.object("Tank1"), type: T.AnalogUnitType });
        m.property("0:EngineeringUnits", { parent, dataType: D.EUInformation, value: CELSIUS });
        return undefined;
      },
    },
    bad: {
      text: "No unit.",
      build: (m) => m.variable("Temperature", { parent: m.object("Tank1"), type: T.AnalogUnitType }),
    },
  },
};
