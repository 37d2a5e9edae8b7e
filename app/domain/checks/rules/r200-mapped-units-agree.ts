import { unitByCode } from "../../units/units";
import type { WiringRule } from "../rule";
import { findField, findTargetOf, findUnit } from "../source-facts";
import { exampleMapping, exampleRow, exampleWiring, measuredField } from "../wiring-examples";

export const r200: WiringRule = {
  id: "R200",
  title: "Unit of source and Variable agree",
  severity: "warning",
  clause: "OPC 30120 1.0 Annex C; OPC 10000-8 1.05 §5.6.3",
  priority: 2,
  concerns: "wiring",
  condition:
    "The unit that reaches a Variable is that of its EngineeringUnits; a conversion stands between where they differ.",
  why: "A value in another unit looks right and is wrong by a factor: 20 mm shown as 20 m.",
  check(wiring, _ctx, report) {
    for (const mapping of wiring.mappings) {
      for (const row of mapping.mapping.rows) {
        const target = findTargetOf(mapping, row);
        const from = findUnit(row, findField(mapping, row));
        const to = target?.unit?.code ?? "";
        if (!target || row.direction === "out" || from === undefined || to === "" || from === to) continue;
        report({
          key: target.key,
          message: `${target.path} is in ${symbolOf(to)}, its source delivers ${symbolOf(from)}.`,
          facts: [
            `EngineeringUnits: ${symbolOf(to)} (${to})`,
            `Source after its transforms: ${symbolOf(from)} (${from})`,
          ],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Millimetres into millimetres.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [exampleMapping(c, { unit: "MMT", fields: [measuredField(1013)], rows: [exampleRow()] })],
        })),
    },
    bad: {
      text: "Millimetres into metres, without a conversion.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [exampleMapping(c, { unit: "MTR", fields: [measuredField(1013)], rows: [exampleRow()] })],
          }),
          "target",
        ),
    },
  },
};

function symbolOf(code: string): string {
  return unitByCode(code)?.symbol ?? code;
}
