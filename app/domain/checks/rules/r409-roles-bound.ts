import type { WiringRule } from "../rule";
import { exampleMachine, exampleSource, exampleWiring } from "../wiring-examples";

export const r409: WiringRule = {
  id: "R409",
  title: "Every role of a machine has its source",
  severity: "warning",
  clause: "common practice, no source",
  priority: 2,
  concerns: "wiring",
  condition: "A machine of a mapped type binds each role to a source that exists, and to a port that this has.",
  why: "What the role feeds stays Bad_NotConnected on this machine.",
  check(wiring, _ctx, report) {
    for (const { id, name, bindings } of wiring.machines) {
      for (const { role, sourceId, port } of bindings) {
        const source = wiring.sources.find((s) => s.id === sourceId);
        const fault =
          sourceId === undefined
            ? "is bound to no source"
            : !source
              ? "is bound to a source that is gone"
              : port !== undefined && port > source.portCount
                ? `is bound to port ${port} of ${source.name}, which has ${source.portCount}`
                : undefined;
        if (fault === undefined) continue;
        report({
          place: { kind: "machine", id, name },
          message: `${role} of ${name} ${fault}.`,
          facts: [`Machine: ${name}`, `Role: ${role}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Bound.",
      build: (m) =>
        exampleWiring(m, () => ({ sources: [exampleSource()], machines: [exampleMachine("P1", { port: 1 })] })),
    },
    bad: {
      text: "Not bound.",
      build: (m) =>
        exampleWiring(m, () => ({ sources: [exampleSource()], machines: [exampleMachine("P1")] }), "place P1"),
    },
  },
};
