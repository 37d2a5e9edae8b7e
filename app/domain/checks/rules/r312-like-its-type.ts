import { hasValueAttributes, type Node, type XmlText } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { StandardDataType as D, StandardType as T } from "../../address-space/standard-ids";
import type { CheckContext } from "../check-context";
import type { ExampleModel } from "../example-model";
import { CELSIUS, unit } from "../example-values";
import { findStandardProperty } from "../lookups";
import { findDeclarationOf } from "../members";
import { formatRange, listRanges } from "../ranges";
import type { NodeRule } from "../rule";
import { listUnits } from "../unit-values";

export const r312: NodeRule = {
  id: "R312",
  title: "A machine is like its type",
  severity: "warning",
  clause: "common practice, no source",
  priority: 2,
  concerns: ["Variable"],
  needs: ["children", "no property", "no type above"],
  condition: "Members of an instance have the unit and the range of the type's declarations; another range is a hint.",
  why: "Who compares machines takes the type's unit for all of them: one that differs is read wrongly by a factor.",
  check(node, ctx, report) {
    const here = listUnits(findValue(node, "EngineeringUnits", ctx))[0];
    const range = listRanges(findValue(node, "EURange", ctx))[0];
    const declared = here || range ? findDeclarationOf(ctx, node.key) : undefined;
    if (!declared) return;
    const name = node.browseName.name;
    const there = listUnits(findValue(declared, "EngineeringUnits", ctx))[0];
    if (there && here && (here.unitId !== there.unitId || here.uri !== there.uri)) {
      report({
        message: `${name} is in ${here.symbol || here.unitId}, its type says ${there.symbol || there.unitId}.`,
        facts: [
          `Here: ${here.symbol} (${here.unitId})`,
          `${ctx.describe(declared.key)}: ${there.symbol} (${there.unitId})`,
        ],
      });
    }
    const wanted = listRanges(findValue(declared, "EURange", ctx))[0];
    if (wanted && range && (range.low !== wanted.low || range.high !== wanted.high)) {
      report({
        severity: "hint",
        message: `${name} has the range ${formatRange(range)}, its type ${formatRange(wanted)}.`,
        facts: [`Here: ${formatRange(range)}`, `${ctx.describe(declared.key)}: ${formatRange(wanted)}`],
      });
    }
  },
  examples: {
    good: { text: "The unit of the type.", build: (m) => void addTypeAndInstance(m, CELSIUS) },
    bad: { text: "Another unit.", build: (m) => addTypeAndInstance(m, FAHRENHEIT) },
  },
};

/** FAH of UN/CEFACT Recommendation 20. */
const FAHRENHEIT = unit({ unitId: 4604232, symbol: "°F", name: "degree Fahrenheit" });

function addTypeAndInstance(m: ExampleModel, value: XmlText): NodeKey {
  const type = m.objectType("PressType");
  const declared = m.variable("OilTemperature", { parent: type, type: T.AnalogUnitType, rule: "Mandatory" });
  m.property("0:EngineeringUnits", { parent: declared, dataType: D.EUInformation, value: CELSIUS, rule: "Mandatory" });
  const member = m.variable("OilTemperature", { parent: m.object("Press1", { type }), type: T.AnalogUnitType });
  m.property("0:EngineeringUnits", { parent: member, dataType: D.EUInformation, value });
  return member;
}

function findValue({ key }: Pick<Node, "key">, property: string, ctx: CheckContext): XmlText | undefined {
  const found = findStandardProperty(ctx, key, property);
  return found && hasValueAttributes(found) ? found.value : undefined;
}
