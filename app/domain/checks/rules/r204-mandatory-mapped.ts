import type { WiringRule } from "../rule";
import { exampleMapping, exampleRow, exampleWiring, integerField } from "../wiring-examples";

export const r204: WiringRule = {
  id: "R204",
  title: "Every mandatory Variable is mapped",
  severity: "warning",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition: "A machine type with a mapping feeds each of its mandatory Variables, from a source or by a constant.",
  why: "The member is there on every machine and never has a value; readers take it for a broken sensor.",
  check(wiring, _ctx, report) {
    for (const { mapping, targets, name } of wiring.mappings) {
      const fed = new Set(mapping.rows.map((row) => row.target));
      const readers = mapping.rows.length;
      for (const target of targets) {
        if (!target.isMandatory || target.isProperty || fed.has(target.path) || readers === 0) continue;
        report({
          key: target.key,
          message: `${target.path} is mandatory, and nothing feeds it.`,
          facts: [`Machine type: ${name}`, `Rows of its mapping: ${readers}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "The one member is fed.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [exampleMapping(c, { fields: [integerField(8)], rows: [exampleRow()] })],
        })),
    },
    bad: {
      text: "Another member is fed, this one is not.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [exampleMapping(c, { fields: [integerField(8)], rows: [exampleRow({ target: "Other" })] })],
          }),
          "target",
        ),
    },
  },
};
