import { formatProblem } from "../../core/problem-texts";
import { formatMiss } from "../../mapping/run-check-cases";
import type { WiringRule } from "../rule";
import { exampleCase, exampleMapping, exampleRow, exampleWiring, integerField } from "../wiring-examples";

export const r402: WiringRule = {
  id: "R402",
  title: "Check cases hold",
  severity: "error",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition: "Every check case of a mapping gives the values and status codes that were written down with it.",
  why: "Somebody proved these values once, on real bytes. What changed them since changes them on every machine.",
  check(wiring, _ctx, report) {
    for (const { id, name, cases, targets } of wiring.mappings) {
      for (const { name: caseName, misses, problems } of cases) {
        for (const miss of misses) {
          const key = targets.find((t) => t.path === miss.path)?.key;
          const place = { kind: "mapping", id, name, target: miss.path } as const;
          report({
            ...(key === undefined ? { place } : { key }),
            message: `Check case “${caseName}”: ${formatMiss(miss)}.`,
            facts: [`Machine type: ${name}`],
          });
        }
        for (const found of problems) {
          report({
            place: { kind: "mapping", id, name },
            message: `Check case “${caseName}” cannot run: ${formatProblem(found)}`,
            facts: [`Problem: ${found.code}`],
          });
        }
      }
    }
  },
  examples: {
    good: {
      text: "The case holds.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [
            exampleMapping(c, { fields: [integerField(8)], rows: [exampleRow()], cases: [exampleCase(true)] }),
          ],
        })),
    },
    bad: {
      text: "Another value than expected.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [
              exampleMapping(c, { fields: [integerField(8)], rows: [exampleRow()], cases: [exampleCase(false)] }),
            ],
          }),
          "target",
        ),
    },
  },
};
