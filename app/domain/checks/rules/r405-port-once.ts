import type { WiringRule } from "../rule";
import { exampleMachine, exampleSource, exampleWiring } from "../wiring-examples";

export const r405: WiringRule = {
  id: "R405",
  title: "A port serves one role",
  severity: "error",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition:
    "No two roles, of one machine or of several, are bound to the same port of a master or to the same Modbus unit.",
  why: "One of the two machines shows the values of the other.",
  check(wiring, _ctx, report) {
    const seen = new Map<string, { machine: string; role: string }>();
    const names = new Map(wiring.sources.map((s) => [s.id, s.name] as const));
    for (const machine of wiring.machines) {
      for (const { role, sourceId, port, unitId } of machine.bindings) {
        if (sourceId === undefined || (port === undefined && unitId === undefined)) continue;
        const place = `${sourceId} ${port === undefined ? `unit ${unitId}` : `port ${port}`}`;
        const first = seen.get(place);
        if (!first) {
          seen.set(place, { machine: machine.name, role });
          continue;
        }
        const name = `${names.get(sourceId) ?? sourceId} ${port === undefined ? `unit ${unitId}` : `port ${port}`}`;
        report({
          place: {
            kind: port === undefined ? "source" : "port",
            id: sourceId,
            name,
            ...(port === undefined ? {} : { port }),
          },
          message: `${name} is bound twice: to ${role} of ${machine.name} and to ${first.role} of ${first.machine}.`,
          facts: [`First: ${first.machine}, ${first.role}`, `Second: ${machine.name}, ${role}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Two ports.",
      build: (m) =>
        exampleWiring(m, () => ({
          sources: [exampleSource()],
          machines: [exampleMachine("P1", { port: 1 }), exampleMachine("P2", { port: 2 })],
        })),
    },
    bad: {
      text: "The same port for two machines.",
      build: (m) =>
        exampleWiring(
          m,
          () => ({
            sources: [exampleSource()],
            machines: [exampleMachine("P1", { port: 1 }), exampleMachine("P2", { port: 1 })],
          }),
          "place M1 port 1",
        ),
    },
  },
};
