/** The bench's input: bytes by role and direction, values of everything else. Pure. */
import type { Direction } from "~/domain/iodd/device-description";
import { formatHex, parseHex } from "~/domain/mapping/bits";
import type { CheckCase } from "~/domain/mapping/mapping-parts";
import { parseFrameText } from "~/domain/mapping/parse-frame-text";
import type { ChannelReference } from "~/domain/mapping/plan-mapping";
import type { SampleValue } from "~/domain/mapping/sample";
import { StatusCode } from "~/domain/mapping/status";
import type { TraceInputs } from "~/domain/mapping/trace-row";
import type { NodeReading } from "./bench-readings";
import { describeSource } from "./describe-source";
import type { MappingScene } from "./mapping-scene";
import { parseFigure } from "./parse-figure";

/** `text` as it was pasted; `isValid` is the validity flag that goes with it. */
export type FrameInput = { readonly text: string; readonly isValid: boolean };

export type BenchInputs = {
  /** By role and direction, parted by a line feed. */
  readonly frames: Readonly<Record<string, FrameInput>>;
  /** By JSON of the reference. */
  readonly samples: Readonly<Record<string, string>>;
};

export const noInputs: BenchInputs = { frames: {}, samples: {} };

export type BenchPoint = { readonly id: string; readonly reference: ChannelReference; readonly label: string };

export function toFrameId(role: string, direction: Direction): string {
  return `${role}\n${direction}`;
}

/** Everything beside process data that rows and formulas read, once each. */
export function listPoints(scene: MappingScene): BenchPoint[] {
  const points = new Map<string, BenchPoint>();
  const add = (reference: ChannelReference): void => {
    const id = JSON.stringify(reference);
    if (reference.kind !== "process-data")
      points.set(id, { id, reference, label: describeSource(reference, scene.roles) });
  };
  for (const { row } of scene.members) {
    if (!row || row.direction === "out") continue;
    const { source } = row;
    if (source.kind === "formula") {
      for (const input of Object.values(source.inputs))
        if (input.kind !== "member" && input.kind !== "constant") add(input);
    } else if (source.kind !== "constant") add(source);
  }
  return [...points.values()];
}

/** Bytes that can be read and values that are there; the rest is left out and said beside its field. */
export function toTraceInputs(inputs: BenchInputs, points: readonly BenchPoint[]): TraceInputs {
  return {
    frames: Object.entries(inputs.frames).flatMap(([id, { text, isValid }]) => {
      const [role = "", direction = "in"] = id.split("\n");
      const parsed = text.trim() === "" ? undefined : parseFrameText(text, direction as Direction);
      if (!parsed?.ok) return [];
      return [
        {
          role,
          direction: direction as Direction,
          octets: parsed.value.octets,
          isValid: isValid && parsed.value.isValid,
        },
      ];
    }),
    samples: points.flatMap(({ id, reference }) => {
      const text = inputs.samples[id] ?? "";
      return text.trim() === "" ? [] : [{ reference, value: parseSample(text) }];
    }),
  };
}

export function parseSample(text: string): SampleValue {
  const trimmed = text.trim();
  if (trimmed === "true" || trimmed === "false") return trimmed === "true";
  return parseFigure(trimmed) ?? trimmed;
}

/** The present input with what came out, as a check case; nodes that wait for their first sample are left out. */
export function makeCheckCase(
  name: string,
  inputs: BenchInputs,
  scene: MappingScene,
  readings: ReadonlyMap<string, NodeReading>,
): CheckCase {
  const traced = toTraceInputs(inputs, listPoints(scene));
  return {
    name,
    frames: traced.frames.map(({ role, direction, octets, isValid }) => ({
      role,
      direction,
      hex: formatHex(octets),
      ...(isValid === false ? { isValid: false } : {}),
    })),
    samples: traced.samples.map(({ reference, value }) => ({ reference, value: toJsonValue(value) })),
    expected: scene.members.flatMap((member) => {
      const reading = readings.get(member.id);
      if (!reading || reading.statusCode === StatusCode.Bad_WaitingForInitialData) return [];
      return [{ target: member.target.target, value: toJsonValue(reading.value), status: reading.statusCode }];
    }),
  };
}

function toJsonValue(value: SampleValue): number | boolean | string | null {
  return typeof value === "bigint" ? value.toString() : value;
}

/** A case laid on the bench again. */
export function fromCheckCase({ frames, samples }: CheckCase): BenchInputs {
  return {
    frames: Object.fromEntries(
      frames.map(({ role, direction, hex, isValid = true }) => [
        toFrameId(role, direction),
        { text: formatHex(parseHex(hex) ?? new Uint8Array()), isValid },
      ]),
    ),
    samples: Object.fromEntries(samples.map(({ reference, value }) => [JSON.stringify(reference), String(value)])),
  };
}
