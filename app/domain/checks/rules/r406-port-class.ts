import type { WiringRule } from "../rule";
import { exampleMachine, exampleSource, exampleWiring } from "../wiring-examples";

export const r406: WiringRule = {
  id: "R406",
  title: "The class of the port fits the device",
  severity: "error",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition:
    "A device that needs the second supply of port class B is planned on a port of class B, and one of class A on a port of class A.",
  why: "On class A the actuator has no supply; on class B a signal of the device on pin 2 meets 24 V.",
  check(wiring, _ctx, report) {
    for (const machine of wiring.machines) {
      for (const { role, portClass, sourceId, port } of machine.bindings) {
        const source = wiring.sources.find((s) => s.id === sourceId);
        const planned = source?.ports.find((p) => p.number === port);
        if (
          !source ||
          portClass === undefined ||
          planned?.portClass === undefined ||
          planned.portClass === portClass ||
          port === undefined
        )
          continue;
        const name = `${source.name} port ${port}`;
        report({
          place: { kind: "port", id: source.id, name, port },
          message: `${name} is of class ${planned.portClass}, but ${role} of ${machine.name} needs class ${portClass}.`,
          facts: [`Port: class ${planned.portClass}`, `${role}: class ${portClass}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Class B on class B.",
      build: (m) =>
        exampleWiring(m, () => ({
          sources: [exampleSource({ portClass: "B" })],
          machines: [exampleMachine("P1", { port: 1, portClass: "B" })],
        })),
    },
    bad: {
      text: "Class B on class A.",
      build: (m) =>
        exampleWiring(
          m,
          () => ({
            sources: [exampleSource({ portClass: "A" })],
            machines: [exampleMachine("P1", { port: 1, portClass: "B" })],
          }),
          "place M1 port 1",
        ),
    },
  },
};
