import type { NodeKey } from "../../address-space/node-id";
import type { MappingRow } from "../../mapping/mapping";
import type { WiringRule } from "../rule";
import { findTargetOf } from "../source-facts";
import { exampleMapping, exampleRow, exampleWiring, integerField } from "../wiring-examples";

export const r203: WiringRule = {
  id: "R203",
  title: "A source has one scaling and an output one writer",
  severity: "warning",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition:
    "Rows that read the same field, register or tag scale it in the same way, and an output is fed by one Variable.",
  why: "Two scalings of one value mean that one of them is wrong; two writers of one output undo each other.",
  check(wiring, _ctx, report) {
    for (const mapping of wiring.mappings) {
      const bySource = new Map<string, MappingRow[]>();
      for (const row of mapping.mapping.rows) {
        if (row.source.kind === "formula" || row.source.kind === "constant") continue;
        const name = `${row.direction ?? "in"} ${JSON.stringify(row.source)}`;
        bySource.set(name, [...(bySource.get(name) ?? []), row]);
      }
      for (const rows of bySource.values()) {
        const isOutput = rows[0]?.direction === "out";
        const [first, ...others] = isOutput ? rows : rows.filter((row) => scalingOf(row) !== "");
        const firstTarget = first && findTargetOf(mapping, first);
        for (const row of others) {
          const target = findTargetOf(mapping, row);
          if (!first || !firstTarget || !target || (!isOutput && scalingOf(row) === scalingOf(first))) continue;
          report({
            key: target.key as NodeKey,
            message: isOutput
              ? `${target.path} and ${firstTarget.path} feed the same output.`
              : `${target.path} and ${firstTarget.path} scale the same source differently.`,
            facts: [
              `${firstTarget.path}: ${scalingOf(first) || "written"}`,
              `${target.path}: ${scalingOf(row) || "written"}`,
            ],
          });
        }
      }
    }
  },
  examples: {
    good: {
      text: "One row a field.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [exampleMapping(c, { fields: [integerField(8)], rows: [exampleRow()] })],
        })),
    },
    bad: {
      text: "The same field times 0.1 and times 0.01.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [
              exampleMapping(c, {
                fields: [integerField(8)],
                rows: [
                  exampleRow({ target: "Other", transforms: [{ kind: "linear", gradient: 0.1, offset: 0 }] }),
                  exampleRow({ transforms: [{ kind: "linear", gradient: 0.01, offset: 0 }] }),
                ],
              }),
            ],
          }),
          "target",
        ),
    },
  },
};

/** What of a row's transforms changes the number by a factor; a row without one takes the value as it is. */
function scalingOf(row: MappingRow): string {
  return row.transforms.flatMap((t) => (t.kind === "linear" ? [`× ${t.gradient} + ${t.offset}`] : [])).join(", ");
}
