import { formatProblem } from "../../core/problem-texts";
import { problem, type Problem } from "../../core/result";
import type { WiringRule } from "../rule";
import type { WiringPlace } from "../wiring";
import { exampleMapping, exampleRow, exampleWiring, integerField } from "../wiring-examples";

export const r401: WiringRule = {
  id: "R401",
  title: "The mapping can run",
  severity: "error",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition:
    "Every row names a role, a field and a transform that exist; formulas can be read and do not read each other in a circle.",
  why: "A mapping that cannot run feeds no machine at all.",
  check(wiring, _ctx, report) {
    const tell = (found: Problem, place: WiringPlace): void => {
      const target = found.at?.path;
      report({
        place: { ...place, ...(target === undefined ? {} : { target }) },
        message: `${place.name}${target === undefined ? "" : `, ${target}`}: ${formatProblem(found)}`,
        facts: [`Problem: ${found.code}`],
      });
    };
    for (const { id, name, problems } of wiring.mappings)
      for (const found of problems) tell(found, { kind: "mapping", id, name });
    for (const { id, name, problems } of wiring.machines)
      for (const found of problems) tell(found, { kind: "machine", id, name });
  },
  examples: {
    good: {
      text: "A row on a field that is there.",
      build: (m) =>
        exampleWiring(m, (c) => ({
          mappings: [exampleMapping(c, { fields: [integerField(8)], rows: [exampleRow()] })],
        })),
    },
    bad: {
      text: "A row on a role that does not exist.",
      build: (m) =>
        exampleWiring(
          m,
          (c) => ({
            mappings: [
              exampleMapping(c, {
                problems: [
                  problem("mapping.unknown-role", { role: "oil sensor", choices: "sensor" }, { path: "Value" }),
                ],
              }),
            ],
          }),
          "place PressType",
        ),
    },
  },
};
