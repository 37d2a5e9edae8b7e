/**
 * What the decode bench shows: frames and samples go in, and each node comes out with value, unit and status and with the
 * path of its steps: bits → raw → scaled → transforms → node. It runs the very code that runs a machine.
 */
import type { Problem, Result } from "../core/result";
import { ok, problem } from "../core/result";
import type { Direction } from "../iodd/device-description";
import { unitByCode } from "../units/units";
import { formatHex } from "./bits";
import type { FieldPlan } from "./decode-frame";
import type { Mapping, MappingRow, Transform } from "./mapping";
import { MappingRunner } from "./mapping-runner";
import { frameKey, planMapping, toChannelKey, type ChannelReference, type MappingPlan, type PlanMappingOptions } from "./plan-mapping";
import type { Sample, SampleValue } from "./sample";

export type TraceInputs = {
  readonly frames: readonly { readonly role: string; readonly direction: Direction; readonly octets: Uint8Array; readonly isValid?: boolean; readonly time?: number }[];
  readonly samples: readonly { readonly reference: ChannelReference; readonly value: SampleValue; readonly status?: number; readonly time?: number }[];
};

export type TraceStep = {
  readonly kind: "bits" | "raw" | "scaled" | "source" | "formula" | "transform" | "node";
  /** What the step is, in few words. */
  readonly text: string;
  readonly value: SampleValue;
  /** Symbol of the unit after the step; "" where none is known. */
  readonly unit: string;
  readonly status: number;
  readonly transform?: Transform;
};

export type NodeTrace = {
  readonly target: string;
  readonly value: SampleValue;
  readonly status: number;
  readonly steps: readonly TraceStep[];
};

/** Problems: those of `planMapping`; `decode.length` as a warning for a frame that is shorter or longer than described. */
export function traceMapping(mapping: Mapping, options: PlanMappingOptions, inputs: TraceInputs): Result<NodeTrace[]> {
  const plan = planMapping(mapping, options);
  if (!plan.ok) return plan;
  const bench = new TraceBench(plan.value);
  return ok(bench.offer(inputs), bench.problems);
}

/** A mapping at the bench: it keeps its memory from one input to the next, as a recorded file needs. */
export class TraceBench {
  readonly #plan: MappingPlan;
  readonly #runner: MappingRunner;
  readonly #frames = new Map<string, Uint8Array>();
  readonly problems: Problem[] = [];

  constructor(plan: MappingPlan) {
    this.#plan = plan;
    this.#runner = new MappingRunner(plan, 0, true);
  }

  /** Feeds the inputs in order and answers all nodes. */
  offer(inputs: TraceInputs): NodeTrace[] {
    for (const { role, direction, octets, isValid = true, time = 0 } of inputs.frames) {
      const expected = this.#plan.frames.get(frameKey(role, direction))?.plan.octets;
      if (expected !== undefined && expected !== octets.length) {
        this.problems.push(problem.warning("decode.length", { octets: octets.length, id: role, expected }, { path: role }));
      }
      this.#frames.set(frameKey(role, direction), octets);
      this.#runner.offerFrame(role, direction, { octets, isValid, time });
    }
    for (const { reference, value, status = 0, time = 0 } of inputs.samples) {
      this.#runner.offerSample(toChannelKey(reference), { value, status, time });
    }
    return this.list();
  }

  list(): NodeTrace[] {
    return this.#plan.rows.map(({ row }) => {
      const sample = this.#runner.read(row.target) as Sample;
      return { target: row.target, value: sample.value, status: sample.status, steps: this.#listSteps(row, sample) };
    });
  }

  #listSteps(row: MappingRow, result: Sample): TraceStep[] {
    const path = this.#runner.trace(row.target);
    const [source, ...made] = path;
    if (!source) return [];
    const steps = this.#listSourceSteps(row, source);
    let unit = steps.at(-1)?.unit ?? "";
    row.transforms.forEach((transform, i) => {
      const sample = made[i];
      if (!sample) return;
      unit = unitAfter(transform, unit);
      steps.push({ kind: "transform", text: transform.kind, value: sample.value, unit, status: sample.status, transform });
    });
    steps.push({ kind: "node", text: row.target, value: result.value, unit, status: result.status });
    return steps;
  }

  #listSourceSteps(row: MappingRow, sample: Sample): TraceStep[] {
    const { source } = row;
    const { value, status } = sample;
    if (source.kind === "formula") return [{ kind: "formula", text: source.expression, value, unit: "", status }];
    if (source.kind !== "process-data") return [{ kind: "source", text: source.kind, value, unit: "", status }];
    const key = frameKey(source.role, source.direction);
    const octets = this.#frames.get(key);
    const field = this.#plan.frames.get(key)?.plan.fields.find((f) => f.subindex === source.subindex);
    if (!octets || !field || octets.length !== this.#plan.frames.get(key)?.plan.octets) {
      return [{ kind: "source", text: source.role, value, unit: "", status }];
    }
    return listFieldSteps(field, octets, sample);
  }
}

function listFieldSteps(field: FieldPlan, octets: Uint8Array, sample: Sample): TraceStep[] {
  const decoded = field.decode(octets);
  const last = octets.length - 1 - (field.bitOffset >> 3);
  const first = octets.length - 1 - ((field.bitOffset + field.bitLength - 1) >> 3);
  const place = first === last ? `octet ${first}` : `octets ${first} … ${last}`;
  const bits = field.bitLength === 1 ? `bit ${field.bitOffset}` : `bits ${field.bitOffset} … ${field.bitOffset + field.bitLength - 1}`;
  const unit = field.unit?.symbol ?? "";
  const raw = toSampleValue(decoded.raw);
  const isScaled = field.gradient !== 1 || field.offset !== 0;
  const steps: TraceStep[] = [
    { kind: "bits", text: `${place}, ${bits}: ${formatHex(octets.subarray(first, last + 1))}`, value: null, unit: "", status: 0 },
    { kind: "raw", text: decoded.text ?? "raw", value: raw, unit: "", status: decoded.status },
  ];
  if (isScaled || unit !== "" || sample.status !== decoded.status) {
    const text = isScaled ? `× ${field.gradient}${field.offset === 0 ? "" : ` + ${field.offset}`}` : "as it is";
    steps.push({ kind: "scaled", text, value: sample.value, unit, status: sample.status });
  }
  return steps;
}

function toSampleValue(value: ReturnType<FieldPlan["decode"]>["raw"]): SampleValue {
  if (value instanceof Uint8Array) return formatHex(value);
  return typeof value === "object" && value !== null ? null : value;
}

function unitAfter(transform: Transform, unit: string): string {
  if (transform.kind === "unit") return unitByCode(transform.to)?.symbol ?? transform.to;
  const keeps = transform.kind === "deadband" || transform.kind === "average";
  return keeps ? unit : "";
}
