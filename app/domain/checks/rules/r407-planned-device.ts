import type { WiringRule } from "../rule";
import { exampleMachine, exampleSource, exampleWiring } from "../wiring-examples";

export const r407: WiringRule = {
  id: "R407",
  title: "The device of the port is the one that the mapping means",
  severity: "error",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition:
    "The device that is planned on a port has the vendor id and the device id of the role that is bound to it.",
  why: "Its process data lies elsewhere: the mapping would read other bits and show other numbers, all of them Good.",
  check(wiring, _ctx, report) {
    for (const machine of wiring.machines) {
      for (const { role, device, sourceId, port } of machine.bindings) {
        const source = wiring.sources.find((s) => s.id === sourceId);
        const planned = source?.ports.find((p) => p.number === port);
        if (
          !source ||
          port === undefined ||
          device === undefined ||
          planned?.device === undefined ||
          planned.device === device
        )
          continue;
        const name = `${source.name} port ${port}`;
        report({
          place: { kind: "port", id: source.id, name, port },
          message: `${name} is planned for ${planned.deviceName ?? planned.device}, but ${role} of ${machine.name} means device ${device}.`,
          facts: [`Planned: ${planned.device}`, `Wanted: ${device}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "The same device.",
      build: (m) =>
        exampleWiring(m, () => ({
          sources: [exampleSource({ device: "65001/1030" })],
          machines: [exampleMachine("P1", { port: 1, device: "65001/1030" })],
        })),
    },
    bad: {
      text: "Another device.",
      build: (m) =>
        exampleWiring(
          m,
          () => ({
            sources: [exampleSource({ device: "65001/1012" })],
            machines: [exampleMachine("P1", { port: 1, device: "65001/1030" })],
          }),
          "place M1 port 1",
        ),
    },
  },
};
