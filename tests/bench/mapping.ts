/** Frames of 32 octets with twelve fields through a mapping, beside hand-written code that returns the same. */
import { getValue, ok } from "~/domain/core/result";
import type { ProcessDataImage, RecordItem } from "~/domain/iodd/device-description";
import type { Mapping } from "~/domain/mapping/mapping";
import { findConversion } from "~/domain/mapping/find-conversion";
import { MappingRunner } from "~/domain/mapping/mapping-runner";
import { planMapping } from "~/domain/mapping/plan-mapping";
import type { Sample } from "~/domain/mapping/sample";
import { compare, limit, median, record, type BenchResult } from "./result";

const OCTETS = 32;
const FRAMES = 200_000;

const item = (subindex: number, bitOffset: number, type: RecordItem["type"]): RecordItem => ({
  subindex,
  bitOffset,
  type,
});
const plain = { singleValues: [], ranges: [] } as const;

/** Twelve fields as condition monitors have them: words, a Float, octets, long integers and bits. */
const image: ProcessDataImage = {
  id: "PD_Bench",
  bitLength: OCTETS * 8,
  type: {
    kind: "RecordT",
    bitLength: OCTETS * 8,
    items: [
      item(1, 240, { kind: "IntegerT", bitLength: 16, ...plain }),
      item(2, 224, { kind: "UIntegerT", bitLength: 16, ...plain }),
      item(3, 192, { kind: "Float32T", ...plain }),
      item(4, 184, { kind: "UIntegerT", bitLength: 8, ...plain }),
      item(5, 176, { kind: "IntegerT", bitLength: 8, ...plain }),
      item(6, 144, { kind: "UIntegerT", bitLength: 32, ...plain }),
      item(7, 112, { kind: "IntegerT", bitLength: 32, ...plain }),
      item(8, 96, { kind: "IntegerT", bitLength: 14, ...plain }),
      item(9, 80, { kind: "UIntegerT", bitLength: 12, ...plain }),
      item(10, 1, { kind: "BooleanT", ...plain }),
      item(11, 0, { kind: "BooleanT", ...plain }),
      item(12, 64, { kind: "IntegerT", bitLength: 16, ...plain }),
    ],
  },
  info: { 1: { gradient: 0.1, unitCode: 1013 }, 2: { gradient: 0.01, unitCode: 1062 }, 12: { gradient: 0.1, offset: -40, unitCode: 1001 } },
};

const targets = Array.from({ length: 12 }, (_, i) => `Process/Field${i + 1}`);

const mapping: Mapping = {
  machineType: "BenchType",
  roles: [{ role: "sensor", kind: "io-link-device" }],
  rows: targets.map((target, i) => ({
    target,
    source: { kind: "process-data", role: "sensor", direction: "in", subindex: i + 1 },
    transforms: [],
  })),
};

type Plain = { readonly target: string; readonly unit: string | undefined; readonly sample: Sample };

/** What somebody writes who knows this one layout: no plan, no special values, no checks but the length. */
function decodeByHand(view: DataView, time: number): Plain[] {
  const sample = (value: number | boolean): Sample => ({ value, status: 0, time });
  return [
    { target: "Process/Field1", unit: "mm", sample: sample(view.getInt16(0) / 10) },
    { target: "Process/Field2", unit: "mm/s", sample: sample(view.getUint16(2) / 100) },
    { target: "Process/Field3", unit: undefined, sample: sample(view.getFloat32(4)) },
    { target: "Process/Field4", unit: undefined, sample: sample(view.getUint8(8)) },
    { target: "Process/Field5", unit: undefined, sample: sample(view.getInt8(9)) },
    { target: "Process/Field6", unit: undefined, sample: sample(view.getUint32(10)) },
    { target: "Process/Field7", unit: undefined, sample: sample(view.getInt32(14)) },
    { target: "Process/Field8", unit: undefined, sample: sample(((view.getUint16(18) & 0x3fff) << 18) >> 18) },
    { target: "Process/Field9", unit: undefined, sample: sample(view.getUint16(20) & 0x0fff) },
    { target: "Process/Field10", unit: undefined, sample: sample((view.getUint8(31) & 2) !== 0) },
    { target: "Process/Field11", unit: undefined, sample: sample((view.getUint8(31) & 1) !== 0) },
    { target: "Process/Field12", unit: "°C", sample: sample((view.getInt16(22) - 400) / 10) },
  ];
}

/** The asked for: 300 000 frames a second, and an eighth of the hand-written code's speed. */
export function measureMapping(): Promise<BenchResult[]> {
  const plan = getValue(planMapping(mapping, { findConversion, findLayout: () => ok({ image, profileCharacteristic: [] }) }));
  const runner = new MappingRunner(plan);
  const frames = Array.from({ length: 64 }, (_, n) => Uint8Array.from({ length: OCTETS }, (_o, i) => (n * 37 + i * 11) & 0xff));
  const views = frames.map((octets) => new DataView(octets.buffer));
  checkSame(runner, frames, views);
  const ours = time(() => {
    let seen = 0;
    for (let i = 0; i < FRAMES; i++) {
      seen += runner.offerFrame("sensor", "in", { octets: frames[i & 63] as Uint8Array, isValid: true, time: i }).length;
    }
    return seen;
  });
  const hand = time(() => {
    let seen = 0;
    for (let i = 0; i < FRAMES; i++) seen += decodeByHand(views[i & 63] as DataView, i).length;
    return seen;
  });
  const each = (ours / FRAMES) * 1e6;
  return Promise.resolve([
    record("frames of 32 octets with 12 fields through a mapping", "frames/s", FRAMES / ours),
    // 300 000 a second.
    limit("decode and map one of them", "µs", each, 1e6 / 300_000),
    compare("decode and map one, hand-written DataView code as reference", "µs", each, (hand / FRAMES) * 1e6, 8),
  ]);
}

function checkSame(runner: MappingRunner, frames: readonly Uint8Array[], views: readonly DataView[]): void {
  frames.forEach((octets, i) => {
    const found = runner.offerFrame("sensor", "in", { octets, isValid: true, time: 1 });
    const wanted = decodeByHand(views[i] as DataView, 1);
    for (const { target, sample } of wanted) {
      const ours = found.find((u) => u.target === target)?.sample;
      if (JSON.stringify(ours) !== JSON.stringify(sample)) throw new Error(`${target}: ${JSON.stringify(ours)} and ${JSON.stringify(sample)}`);
    }
  });
}

/** Seconds: the median of several passes after a warm-up. */
function time(run: () => number): number {
  run();
  const passes = Array.from({ length: 5 }, () => {
    const start = performance.now();
    if (run() === 0) throw new Error("Nothing was decoded");
    return (performance.now() - start) / 1000;
  });
  return median(passes);
}
