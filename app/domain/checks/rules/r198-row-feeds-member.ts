import { exampleMapping, exampleRow, exampleWiring } from "../wiring-examples";
import type { WiringRule } from "../rule";

export const r198: WiringRule = {
  id: "R198",
  title: "A row feeds a member that is there",
  severity: "error",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition: "Each row of a mapping names a Variable that the machine type has.",
  why: "The row runs nowhere: its Variable keeps Bad_NoValue on every machine, and nobody is told.",
  check(wiring, _ctx, report) {
    for (const { id, name, lost } of wiring.mappings) {
      for (const member of lost) {
        report({
          place: { kind: "mapping", id, name, target: member },
          message: `The mapping of ${name} feeds ${member}, which the type has no more.`,
          facts: [`Machine type: ${name}`, `Row: ${member}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Every member is there.",
      build: (m) => exampleWiring(m, (c) => ({ mappings: [exampleMapping(c, { rows: [exampleRow()] })] })),
    },
    bad: {
      text: "The member was deleted.",
      build: (m) =>
        exampleWiring(m, (c) => ({ mappings: [exampleMapping(c, { lost: ["OilLevel"] })] }), "place PressType"),
    },
  },
};
