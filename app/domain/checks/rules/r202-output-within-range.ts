import type { WiringRule } from "../rule";
import { findTargetOf } from "../source-facts";
import { exampleMapping, exampleRow, exampleWiring, integerField } from "../wiring-examples";

export const r202: WiringRule = {
  id: "R202",
  title: "Outputs are written within limits",
  severity: "warning",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition:
    "A Variable that feeds an output may be written, its row has limits, and these lie within its EURange or InstrumentRange.",
  why: "Writes to outputs can move machinery. Process data of IO-Link is no safety-related communication; a limit that is too wide is none.",
  check(wiring, _ctx, report) {
    for (const mapping of wiring.mappings) {
      for (const row of mapping.mapping.rows) {
        const target = findTargetOf(mapping, row);
        if (!target || row.direction !== "out") continue;
        const range = target.range ?? target.instrumentRange;
        const faults: string[] = [];
        if (!target.isWritable) faults.push("it has no access level CurrentWrite");
        if (!row.limits) faults.push("its row has no limits");
        else if (row.limits.low > row.limits.high) faults.push("its limits are upside down");
        else if (range && (row.limits.low < range.low || row.limits.high > range.high))
          faults.push(
            `its limits ${row.limits.low} … ${row.limits.high} are wider than its range ${range.low} … ${range.high}`,
          );
        if (!range) faults.push("it has neither EURange nor InstrumentRange");
        for (const fault of faults) {
          report({
            key: target.key,
            message: `${target.path} feeds an output, but ${fault}.`,
            facts: [`Output: ${row.source.kind}`, `Range: ${range ? `${range.low} … ${range.high}` : "none"}`],
          });
        }
      }
    }
  },
  examples: {
    good: {
      text: "Writable, with limits inside the range.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [
            exampleMapping(c, {
              isWritable: true,
              range: { low: 0, high: 100 },
              fields: [integerField(8)],
              rows: [exampleRow({ direction: "out", limits: { low: 0, high: 80 } })],
            }),
          ],
        })),
    },
    bad: {
      text: "Limits wider than the range.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [
              exampleMapping(c, {
                isWritable: true,
                range: { low: 0, high: 50 },
                fields: [integerField(8)],
                rows: [exampleRow({ direction: "out", limits: { low: 0, high: 80 } })],
              }),
            ],
          }),
          "target",
        ),
    },
  },
};
