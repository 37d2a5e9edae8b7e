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
import { makeTransform, type FindConversion, type TransformStep } from "./transform";

/** Where a sample enters: one text for each distinct source, so that two rows on one source share it. */
export type ChannelKey = string;

export type RowPlan = {
  readonly row: MappingRow;
  readonly input:
    | { readonly kind: "channel"; readonly channel: ChannelKey }
    | { readonly kind: "constant"; readonly value: number | boolean | string }
    | { readonly kind: "formula"; readonly formula: CompiledFormula; readonly inputs: readonly FormulaInput[] };
  /** Makes a fresh chain with a memory of its own. */
  readonly makeSteps: () => TransformStep[];
};

export type FormulaInput = { readonly name: string; readonly channel?: ChannelKey; readonly target?: string };

export type FrameChannel = { readonly field: FieldPlan; readonly fieldIndex: number; readonly channel: ChannelKey };

export type MappingPlan = {
  readonly rows: readonly RowPlan[];
  /** By `role` and direction: how the frame is read and which of its fields are asked for. */
  readonly frames: ReadonlyMap<string, { readonly plan: FramePlan; readonly channels: readonly FrameChannel[] }>;
};

export type Layout = { readonly image: ProcessDataImage; readonly profileCharacteristic: readonly number[] };

export type PlanMappingOptions = {
  /** The layout of a role's process data: of a device description, or as a mapping document carries it. */
  readonly findLayout: (role: string, direction: Direction) => Result<Layout>;
  readonly findConversion: FindConversion;
};

/** Layouts of attached device descriptions. `conditions`: present value of the parameter that decides a role's layout. */
export function makeDeviceLayouts(
  devices: ReadonlyMap<string, DeviceDescription>,
  conditions: Readonly<Record<string, string>> = {},
): PlanMappingOptions["findLayout"] {
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

/** The channel of a reference that is no constant. */
export function toChannelKey(reference: Exclude<InputReference, { kind: "constant" }>): ChannelKey {
  const { kind, ...rest } = reference;
  return `${kind}\n${JSON.stringify(rest, Object.keys(rest).sort())}`;
}

/** Problems: `mapping.unknown-role`, `mapping.unknown-field`, `mapping.target-twice`, `mapping.formula-cycle` and those of parts. */
export function planMapping(mapping: Mapping, options: PlanMappingOptions): Result<MappingPlan> {
  const problems: Problem[] = [];
  const frames: FrameTable = new Map();
  const rows: RowPlan[] = [];
  const targets = new Set<string>();
  for (const row of mapping.rows) {
    const at = { path: row.target };
    if (targets.has(row.target)) problems.push({ ...problem("mapping.target-twice", { target: row.target }), at });
    targets.add(row.target);
    const planned = planRow(row, mapping, options, frames);
    if (planned.ok) rows.push(planned.value);
    else problems.push(...planned.problems.map((p) => ({ ...p, at })));
  }
  const ordered = orderByDependence(rows);
  if (!ordered) problems.push(problem("mapping.formula-cycle"));
  return problems.length > 0 || !ordered ? fail(...problems) : ok({ rows: ordered, frames });
}

type FrameTable = Map<string, { plan: FramePlan; channels: FrameChannel[] }>;

function planRow(row: MappingRow, mapping: Mapping, options: PlanMappingOptions, frames: FrameTable): Result<RowPlan> {
  const input = planInput(row.source, mapping, options, frames);
  if (!input.ok) return input;
  for (const transform of row.transforms) {
    const made = makeTransform(transform, options.findConversion);
    if (!made.ok) return made;
  }
  const makeSteps = (): TransformStep[] =>
    row.transforms.flatMap((transform) => {
      const made = makeTransform(transform, options.findConversion);
      return made.ok ? [made.value] : [];
    });
  return ok({ row, input: input.value, makeSteps });
}

function planInput(
  source: SourceReference,
  mapping: Mapping,
  options: PlanMappingOptions,
  frames: FrameTable,
): Result<RowPlan["input"]> {
  if (source.kind === "constant") return ok({ kind: "constant", value: source.value });
  if (source.kind !== "formula") {
    const channel = planChannel(source, mapping, options, frames);
    return channel.ok ? ok({ kind: "channel", channel: channel.value }) : channel;
  }
  const names = Object.keys(source.inputs);
  const formula = compileFormula(source.expression, names);
  if (!formula.ok) return formula;
  const inputs: FormulaInput[] = [];
  for (const name of formula.value.names) {
    const reference = source.inputs[name];
    if (!reference) continue;
    if (reference.kind === "member") {
      if (!mapping.rows.some((r) => r.target === reference.target)) {
        return fail(problem("mapping.unknown-member", { target: reference.target }));
      }
      inputs.push({ name, target: reference.target });
    } else if (reference.kind === "constant") {
      return fail(problem("mapping.constant-input", { name }));
    } else {
      const channel = planChannel(reference, mapping, options, frames);
      if (!channel.ok) return channel;
      inputs.push({ name, channel: channel.value });
    }
  }
  return ok({ kind: "formula", formula: formula.value, inputs });
}

function planChannel(
  reference: Exclude<InputReference, { kind: "constant" }>,
  mapping: Mapping,
  options: PlanMappingOptions,
  frames: FrameTable,
): Result<ChannelKey> {
  const roles = reference.kind === "device-status" ? reference.roles : [reference.role];
  const unknown = roles.find((role) => !mapping.roles.some((r) => r.role === role));
  if (unknown !== undefined) {
    return fail(
      problem("mapping.unknown-role", { role: unknown, choices: mapping.roles.map((r) => r.role).join(", ") }),
    );
  }
  const channel = toChannelKey(reference);
  if (reference.kind !== "process-data") return ok(channel);

  const { role, direction, subindex } = reference;
  const key = frameKey(role, direction);
  let entry = frames.get(key);
  if (!entry) {
    const layout = options.findLayout(role, direction);
    if (!layout.ok) return layout;
    const { image, profileCharacteristic } = layout.value;
    entry = { plan: planFrame(image, { profileCharacteristic }), channels: [] };
    frames.set(key, entry);
  }
  const fieldIndex = entry.plan.fields.findIndex((f) => f.subindex === subindex);
  const field = entry.plan.fields[fieldIndex];
  if (!field) return fail(problem("mapping.unknown-field", { role, direction, subindex }));
  if (!entry.channels.some((c) => c.channel === channel)) entry.channels.push({ field, fieldIndex, channel });
  return ok(channel);
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
    waiting = waiting.filter((plan) => !ready.includes(plan));
  }
  return ordered;
}

function listMemberTargets(plan: RowPlan): string[] {
  if (plan.input.kind !== "formula") return [];
  return plan.input.inputs.flatMap((input) => (input.target === undefined ? [] : [input.target]));
}
