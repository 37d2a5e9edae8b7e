import type { SourceReference } from "../../mapping/mapping";
import type { WiringRule } from "../rule";
import { findTargetOf } from "../source-facts";
import { exampleMapping, exampleRow, exampleWiring, integerField } from "../wiring-examples";

export const r110: WiringRule = {
  id: "R110",
  title: "What is measured cannot be written",
  severity: "hint",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition: "A Variable that a sensor or a controller feeds, and that feeds no output, does not have CurrentWrite.",
  why: "A client that writes it gets “good” and sees its value vanish with the next reading, or others act on an invented one.",
  check(wiring, ctx, report) {
    for (const mapping of wiring.mappings) {
      const outputs = new Set(mapping.mapping.rows.filter((r) => r.direction === "out").map((r) => r.target));
      for (const row of mapping.mapping.rows) {
        const target = findTargetOf(mapping, row);
        if (!target?.isWritable || row.direction === "out" || outputs.has(row.target)) continue;
        if (!isMeasured(row.source)) continue;
        report({
          key: target.key,
          attribute: "accessLevel",
          message: `${target.path} is measured, and clients may write it.`,
          facts: [
            `Fed by: ${row.source.kind}`,
            `AccessLevel of ${ctx.describe(target.key)}: bit 1, CurrentWrite, is set`,
          ],
        });
      }
    }
  },
  examples: {
    good: {
      text: "A measured value that can be read only.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [exampleMapping(c, { fields: [integerField(8)], rows: [exampleRow({})] })],
        })),
    },
    bad: {
      text: "A measured value that can be written.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [exampleMapping(c, { isWritable: true, fields: [integerField(8)], rows: [exampleRow({})] })],
          }),
          "target",
        ),
    },
  },
};

/** What a device puts out is set by somebody, and reading it back measures nothing. */
function isMeasured(source: SourceReference): boolean {
  return source.kind !== "constant" && !(source.kind === "process-data" && source.direction === "out");
}
