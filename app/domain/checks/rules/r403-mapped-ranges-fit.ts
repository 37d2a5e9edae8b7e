import type { WiringRule } from "../rule";
import { findField, findInterval, findTargetOf } from "../source-facts";
import { exampleMapping, exampleRow, exampleWiring, rangedField } from "../wiring-examples";

export const r403: WiringRule = {
  id: "R403",
  title: "The range of the source fits the Variable's",
  severity: "warning",
  clause: "OPC 10000-8 1.05 §5.3.2; OPC 30120 1.0 §12.2.2",
  priority: 2,
  concerns: "wiring",
  condition:
    "What the source can deliver, after its transforms, meets the EURange of the Variable and does not go beyond its InstrumentRange.",
  why: "Ranges that do not meet mostly mean a wrong scale or unit; a value beyond InstrumentRange is marked uncertain on every machine.",
  check(wiring, _ctx, report) {
    for (const mapping of wiring.mappings) {
      for (const row of mapping.mapping.rows) {
        const target = findTargetOf(mapping, row);
        const found = findInterval(row, findField(mapping, row));
        if (!target || !found || row.direction === "out") continue;
        const { range, instrumentRange } = target;
        const facts = [`Source after its transforms: ${found.low} … ${found.high}`];
        if (range && (found.high < range.low || found.low > range.high)) {
          report({
            key: target.key,
            message: `${target.path} has the range ${range.low} … ${range.high}, its source delivers ${found.low} … ${found.high}.`,
            facts,
          });
        } else if (range && found.high - found.low < (range.high - range.low) / 20) {
          report({
            key: target.key,
            severity: "hint",
            message: `${target.path} has the range ${range.low} … ${range.high}, of which its source delivers a small part only.`,
            facts,
          });
        }
        if (instrumentRange && (found.low < instrumentRange.low || found.high > instrumentRange.high)) {
          report({
            key: target.key,
            severity: "hint",
            message: `${target.path} has the InstrumentRange ${instrumentRange.low} … ${instrumentRange.high}, its source goes beyond it.`,
            facts,
          });
        }
      }
    }
  },
  examples: {
    good: {
      text: "0 … 400 from a sensor of 20 … 500.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [
            exampleMapping(c, { range: { low: 0, high: 400 }, fields: [rangedField(20, 500)], rows: [exampleRow()] }),
          ],
        })),
    },
    bad: {
      text: "0 … 1 from a sensor of 20 … 500.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [
              exampleMapping(c, { range: { low: 0, high: 1 }, fields: [rangedField(20, 500)], rows: [exampleRow()] }),
            ],
          }),
          "target",
        ),
    },
  },
};
