import type { WiringRule } from "../rule";
import { exampleSource, exampleWiring } from "../wiring-examples";

/** 32 octets in each direction. */
const MAX_BITS = 256;

export const r408: WiringRule = {
  id: "R408",
  title: "Process data has at most 32 octets",
  severity: "error",
  clause: "common practice, no source (public manuals of IO-Link masters: 0 … 32 octets a direction)",
  priority: 2,
  concerns: "wiring",
  condition: "The process data of a device on an IO-Link port has at most 32 octets in each direction.",
  why: "No master exchanges more: the description is wrong, or it is not that of this device.",
  check(wiring, _ctx, report) {
    for (const source of wiring.sources) {
      for (const { number, processDataBits = 0, deviceName, device } of source.ports) {
        if (processDataBits <= MAX_BITS) continue;
        const name = `${source.name} port ${number}`;
        report({
          place: { kind: "port", id: source.id, name, port: number },
          message: `${name}: ${deviceName ?? device ?? "the device"} describes ${Math.ceil(processDataBits / 8)} octets of process data; IO-Link has 32.`,
          facts: [`Bits: ${processDataBits}`, `Limit: ${MAX_BITS}`],
        });
      }
    }
  },
  examples: {
    good: {
      text: "Four octets.",
      build: (m) => exampleWiring(m, () => ({ sources: [exampleSource({ processDataBits: 32 })] })),
    },
    bad: {
      text: "33 octets.",
      build: (m) => exampleWiring(m, () => ({ sources: [exampleSource({ processDataBits: 264 })] }), "place M1 port 1"),
    },
  },
};
