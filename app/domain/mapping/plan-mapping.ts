/**
 * A mapping made ready to run: every reference resolved to a channel, every transform and formula checked. Problems name
 * the row by its target, so that a list of them is a list of work.
 */
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import type { DeviceDescription, Direction, ProcessDataImage } from "../iodd/device-description";
import { chooseLayout } from "./choose-layout";
import { planFrame, type FieldPlan, type FramePlan } from "./decode-frame";
import { compileFormula, type CompiledFormula } from "./formula";
import type { InputReference, Mapping, MappingRow, SourceReference } from "./mapping";
import { makeFinish, makePrepare, type SampleChange, type TargetRanges } from "./row-quality";
import { makeTransform, type FindConversion, type TransformStep } from "./transform";

/** Names a source: one text for each distinct one, so that two rows on one source share it. */
export type ChannelKey = string;

/** Place of a channel's newest sample in a running mapping. */
export type ChannelSlot = number;

export type FormulaInput = { readonly name: string; readonly slot?: ChannelSlot; readonly target?: string };

export type RowInput =
  | { readonly kind: "channel"; readonly slot: ChannelSlot }
  | { readonly kind: "constant"; readonly value: number | boolean | string }
  | { readonly kind: "formula"; readonly formula: CompiledFormula; readonly inputs: readonly FormulaInput[] };

export type RowPlan = {
  readonly row: MappingRow;
  readonly input: RowInput;
  /** What the row's quality rules make of the source's sample, before any transform; undefined for nothing. */
  readonly prepare: SampleChange | undefined;
  /** Makes a fresh chain with a memory of its own. */
  readonly makeSteps: () => TransformStep[];
  /** What the target's ranges make of the result; undefined for nothing. */
  readonly finish: SampleChange | undefined;
};

export type FrameChannel = { readonly field: FieldPlan; readonly fieldIndex: number; readonly slot: ChannelSlot };

export type FrameEntry = { readonly plan: FramePlan; readonly channels: readonly FrameChannel[] };

export type MappingPlan = {
  /** Rows from sources to Variables, each behind those that its formula reads. */
  readonly rows: readonly RowPlan[];
  /** Rows from Variables to sources, as they stand. */
  readonly outputs: readonly MappingRow[];
  readonly slots: ReadonlyMap<ChannelKey, ChannelSlot>;
  /** The channels of a role, device status left out: what becomes Bad when its device is not the planned one. */
  readonly slotsOfRole: ReadonlyMap<string, readonly ChannelSlot[]>;
  /** By `role` and direction: how the frame is read and which of its fields are asked for. */
  readonly frames: ReadonlyMap<string, FrameEntry>;
};

export type Layout = { readonly image: ProcessDataImage; readonly profileCharacteristic: readonly number[] };

export type FindLayout = (role: string, direction: Direction) => Result<Layout>;

export type PlanMappingOptions = {
  /** The layout of a role's process data: of a device description, or as a mapping document carries it. */
  readonly findLayout: FindLayout;
  readonly findConversion: FindConversion;
  /** Ranges of the Variable that a row feeds; without them no value is found to lie outside. */
  readonly findRanges?: (target: string) => TargetRanges | undefined;
};

/** Layouts of attached device descriptions. `conditions`: present value of the parameter that decides a role's layout. */
export function makeDeviceLayouts(
  devices: ReadonlyMap<string, DeviceDescription>,
  conditions: Readonly<Record<string, string>> = {},
): FindLayout {
  return (role, direction) => {
    const device = devices.get(role);
    if (!device) return fail(problem("mapping.no-device", { role }));
    const image = chooseLayout(device, direction, conditions[role]);
    return image.ok ? ok({ image: image.value, profileCharacteristic: device.profileCharacteristic }) : image;
  };
}

export function frameKey(role: string, direction: Direction): string {
  return `${role}\n${direction}`;
}

/** A reference that a sample can come from. */
export type ChannelReference = Exclude<InputReference, { kind: "constant" }>;

/** The channel of a reference that is no constant. */
export function toChannelKey(reference: ChannelReference): ChannelKey {
  const { kind, ...rest } = reference;
  return `${kind}\n${JSON.stringify(rest, Object.keys(rest).sort())}`;
}

/** Problems: `mapping.unknown-role`, `mapping.unknown-field`, `mapping.target-twice`, `mapping.formula-cycle` and those of parts. */
export function planMapping(mapping: Mapping, options: PlanMappingOptions): Result<MappingPlan> {
  const planner = new Planner(mapping, options);
  return planner.plan();
}

class Planner {
  readonly #mapping: Mapping;
  readonly #options: PlanMappingOptions;
  readonly #roles: ReadonlySet<string>;
  readonly #targets: ReadonlySet<string>;
  readonly #slots = new Map<ChannelKey, ChannelSlot>();
  readonly #slotsOfRole = new Map<string, ChannelSlot[]>();
  readonly #frames = new Map<string, { plan: FramePlan; channels: FrameChannel[] }>();

  constructor(mapping: Mapping, options: PlanMappingOptions) {
    this.#mapping = mapping;
    this.#options = options;
    this.#roles = new Set(mapping.roles.map((r) => r.role));
    this.#targets = new Set(mapping.rows.filter((r) => r.direction !== "out").map((r) => r.target));
  }

  plan(): Result<MappingPlan> {
    const problems: Problem[] = [];
    const rows: RowPlan[] = [];
    const outputs: MappingRow[] = [];
    const seen = new Set<string>();
    for (const row of this.#mapping.rows) {
      const at = { path: row.target };
      const name = `${row.target}\n${row.direction ?? "in"}`;
      if (seen.has(name)) problems.push({ ...problem("mapping.target-twice", { target: row.target }), at });
      seen.add(name);
      const planned = row.direction === "out" ? this.#checkOutput(row) : this.#planRow(row);
      if (!planned.ok) problems.push(...planned.problems.map((p) => ({ ...p, at })));
      else if (planned.value === undefined) outputs.push(row);
      else rows.push(planned.value);
    }
    const ordered = orderByDependence(rows);
    if (!ordered) problems.push(problem("mapping.formula-cycle"));
    if (problems.length > 0 || !ordered) return fail(...problems);
    return ok({ rows: ordered, outputs, slots: this.#slots, slotsOfRole: this.#slotsOfRole, frames: this.#frames });
  }

  #checkOutput(row: MappingRow): Result<undefined> {
    const { source } = row;
    if (source.kind === "formula" || source.kind === "constant") return fail(problem("mapping.output-kind"));
    if (!row.limits) return fail(problem("mapping.output-limits"));
    if (row.mirrorsSafetySignal) return fail(problem("mapping.output-safety"));
    const channel = this.#planChannel(source);
    return channel.ok ? ok(undefined) : channel;
  }

  #planRow(row: MappingRow): Result<RowPlan> {
    const input = this.#planInput(row.source);
    if (!input.ok) return input;
    const steps = this.#makeSteps(row);
    if (!steps.ok) return steps;
    const makeSteps = (): TransformStep[] => {
      const made = this.#makeSteps(row);
      return made.ok ? made.value : [];
    };
    const field = this.#findField(row.source);
    const prepare = makePrepare(row.quality, field);
    const finish = makeFinish(row.quality, this.#options.findRanges?.(row.target));
    return ok({ row, input: input.value, prepare, makeSteps, finish });
  }

  #makeSteps(row: MappingRow): Result<TransformStep[]> {
    const steps: TransformStep[] = [];
    for (const transform of row.transforms) {
      const made = makeTransform(transform, this.#options.findConversion);
      if (!made.ok) return made;
      steps.push(made.value);
    }
    return ok(steps);
  }

  #findField(source: SourceReference): FieldPlan | undefined {
    if (source.kind !== "process-data") return undefined;
    const entry = this.#frames.get(frameKey(source.role, source.direction));
    return entry?.plan.fields.find((f) => f.subindex === source.subindex);
  }

  #planInput(source: SourceReference): Result<RowInput> {
    if (source.kind === "constant") return ok({ kind: "constant", value: source.value });
    if (source.kind !== "formula") {
      const channel = this.#planChannel(source);
      return channel.ok ? ok({ kind: "channel", slot: channel.value }) : channel;
    }
    const formula = compileFormula(source.expression, Object.keys(source.inputs));
    if (!formula.ok) return formula;
    const inputs: FormulaInput[] = [];
    for (const name of formula.value.names) {
      const reference = source.inputs[name];
      if (!reference) continue;
      if (reference.kind === "constant") return fail(problem("mapping.constant-input", { name }));
      if (reference.kind === "member") {
        const { target } = reference;
        if (!this.#targets.has(target)) return fail(problem("mapping.unknown-member", { target }));
        inputs.push({ name, target });
      } else {
        const channel = this.#planChannel(reference);
        if (!channel.ok) return channel;
        inputs.push({ name, slot: channel.value });
      }
    }
    return ok({ kind: "formula", formula: formula.value, inputs });
  }

  #planChannel(reference: ChannelReference): Result<ChannelSlot> {
    const roles = reference.kind === "device-status" ? reference.roles : [reference.role];
    const unknown = roles.find((role) => !this.#roles.has(role));
    if (unknown !== undefined) {
      return fail(problem("mapping.unknown-role", { role: unknown, choices: [...this.#roles].join(", ") }));
    }
    const key = toChannelKey(reference);
    const known = this.#slots.get(key);
    if (known !== undefined) return ok(known);
    const slot = this.#slots.size;
    if (reference.kind === "process-data") {
      const field = this.#planField(reference, slot);
      if (!field.ok) return field;
    }
    this.#slots.set(key, slot);
    const isOfOneDevice = reference.kind !== "device-status" && reference.kind !== "port-status";
    if (isOfOneDevice) this.#slotsOfRole.set(reference.role, [...(this.#slotsOfRole.get(reference.role) ?? []), slot]);
    return ok(slot);
  }

  #planField(reference: Extract<ChannelReference, { kind: "process-data" }>, slot: ChannelSlot): Result<FieldPlan> {
    const { role, direction, subindex } = reference;
    const key = frameKey(role, direction);
    let entry = this.#frames.get(key);
    if (!entry) {
      const layout = this.#options.findLayout(role, direction);
      if (!layout.ok) return layout;
      const { image, profileCharacteristic } = layout.value;
      entry = { plan: planFrame(image, { profileCharacteristic }), channels: [] };
      this.#frames.set(key, entry);
    }
    const fieldIndex = entry.plan.fields.findIndex((f) => f.subindex === subindex);
    const field = entry.plan.fields[fieldIndex];
    if (!field) return fail(problem("mapping.unknown-field", { role, direction, subindex }));
    entry.channels.push({ field, fieldIndex, slot });
    return ok(field);
  }
}

/** Rows that a formula reads come before it; undefined where formulas read each other in a circle. */
function orderByDependence(rows: readonly RowPlan[]): RowPlan[] | undefined {
  const ordered: RowPlan[] = [];
  const done = new Set<string>();
  let waiting = [...rows];
  while (waiting.length > 0) {
    const ready = waiting.filter((plan) => listMemberTargets(plan).every((target) => done.has(target)));
    if (ready.length === 0) return undefined;
    for (const plan of ready) done.add(plan.row.target);
    ordered.push(...ready);
    waiting = waiting.filter((plan) => !done.has(plan.row.target));
  }
  return ordered;
}

function listMemberTargets(plan: RowPlan): string[] {
  if (plan.input.kind !== "formula") return [];
  return plan.input.inputs.flatMap((input) => (input.target === undefined ? [] : [input.target]));
}
