/**
 * A running mapping: one for each machine. Frames and samples go in, changed Variables come out. It has no clock and no
 * timers: the caller gives the time with each input and calls `age` now and then, so that a replay of a recorded file and
 * a live source take the same path.
 *
 * Everything that can be found before the first frame is found then: each source has a slot for its newest sample, and
 * each frame knows the rows that it feeds in the order of evaluation.
 */
import type { Direction } from "../iodd/device-description";
import {
  frameKey,
  type ChannelKey,
  type ChannelSlot,
  type FormulaInput,
  type FrameChannel,
  type MappingPlan,
  type RowPlan,
} from "./plan-mapping";
import type { CompiledFormula } from "./formula";
import { badSample, toNumber, worstStatus, type Sample } from "./sample";
import { isBad, isGood, StatusCode } from "./status";
import type { TransformStep } from "./transform";

export type FrameInput = {
  readonly octets: Uint8Array;
  /** The validity flag of the direction. */
  readonly isValid: boolean;
  /** Milliseconds since 1970: when the source acquired the frame. */
  readonly time: number;
};

export type Update = { readonly target: string; readonly sample: Sample };

/** What is known of a role beside its data: no source is bound, another device answers, the device reports a failure. */
export type RoleState = "not-connected" | "wrong-device" | "device-failure";

/** In the order of what counts more. */
const STATUS_OF_ROLE: Readonly<Record<RoleState, number>> = {
  "not-connected": StatusCode.Bad_NotConnected,
  "wrong-device": StatusCode.Bad_ConfigurationError,
  "device-failure": StatusCode.Bad_DeviceFailure,
};

type RunningRow = {
  readonly plan: RowPlan;
  readonly target: string;
  readonly steps: readonly TransformStep[];
  sample: Sample;
  /** What the last evaluation went through, where somebody wants to see it. */
  path?: Sample[];
};

type RunningFrame = {
  readonly octets: number;
  readonly channels: readonly FrameChannel[];
  readonly rows: readonly RunningRow[];
};

/** A reading that is late by less than this share of its period, or by less than this time, is no outage. */
const LATE = 1.4;
const LATE_MS = 200;

const WAITING = badSample(StatusCode.Bad_WaitingForInitialData, 0);

export class MappingRunner {
  readonly #plan: MappingPlan;
  readonly #rows: readonly RunningRow[];
  readonly #rowsByTarget: ReadonlyMap<string, RunningRow>;
  /** By slot: the rows that it feeds, directly or through formulas, in the order of evaluation. */
  readonly #rowsBySlot: readonly (readonly RunningRow[])[];
  readonly #samples: Sample[];
  readonly #frames = new Map<string, RunningFrame>();
  /** What holds of a role; absent for one of which nothing does. */
  readonly #roleStates = new Map<string, ReadonlySet<RoleState>>();

  /** With `keepsPaths`, `trace` answers what each value went through. */
  constructor(plan: MappingPlan, time = 0, keepsPaths = false) {
    this.#plan = plan;
    this.#rows = plan.rows.map((row) => ({
      plan: row,
      target: row.row.target,
      steps: row.makeSteps(),
      sample: WAITING,
      ...(keepsPaths ? { path: [] } : {}),
    }));
    this.#rowsByTarget = new Map(this.#rows.map((row) => [row.target, row]));
    this.#samples = new Array<Sample>(plan.slots.size).fill(WAITING);
    const needs = this.#rows.map((row) => this.#listSlots(row, new Set()));
    this.#rowsBySlot = this.#samples.map((_, slot) => this.#rows.filter((_row, i) => needs[i]?.has(slot)));
    for (const [key, { plan: frame, channels }] of plan.frames) {
      const rows = this.#rows.filter((_row, i) => channels.some((c) => needs[i]?.has(c.slot)));
      this.#frames.set(key, { octets: frame.octets, channels, rows });
    }
    for (const row of this.#rows) {
      const { input } = row.plan;
      if (input.kind === "constant") row.sample = runRow(row, { value: input.value, status: StatusCode.Good, time });
    }
  }

  /** The present sample of a Variable; undefined for one that the mapping does not feed. */
  read(target: string): Sample | undefined {
    return this.#rowsByTarget.get(target)?.sample;
  }

  /** The source's sample and what each step made of it, at the last evaluation; empty before that. */
  trace(target: string): readonly Sample[] {
    return this.#rowsByTarget.get(target)?.path ?? [];
  }

  /** All Variables with their present samples, in the order of evaluation. */
  list(): Update[] {
    return this.#rows.map((row) => ({ target: row.target, sample: row.sample }));
  }

  /**
   * One exchange of process data. A frame of another length than described, or one marked invalid, gives no value: all
   * its fields become Bad (OPC 30120 §7.1.3), never 0.
   */
  offerFrame(role: string, direction: Direction, frame: FrameInput): Update[] {
    const entry = this.#frames.get(frameKey(role, direction));
    if (!entry) return [];
    const { octets, time } = frame;
    const { channels } = entry;
    const refused = this.#refuse(role, entry, frame);
    if (refused !== undefined) {
      const sample = badSample(refused, time);
      for (const { slot } of channels) this.#samples[slot] = sample;
    } else {
      for (let i = 0; i < channels.length; i++) {
        const channel = channels[i] as FrameChannel;
        const { value, status } = channel.field.decode(octets);
        this.#samples[channel.slot] = { value: typeof value === "object" ? null : value, status, time };
      }
    }
    return this.#evaluateAll(entry.rows);
  }

  /** A sample of any other source: a register, a tag, a parameter, the device status. */
  offerSample(channel: ChannelKey, sample: Sample): Update[] {
    const slot = this.#plan.slots.get(channel);
    if (slot === undefined || this.#isOverruled(slot)) return [];
    this.#samples[slot] = isBad(sample.status) ? badSample(sample.status, sample.time) : sample;
    return this.#evaluateAll(this.#rowsBySlot[slot] ?? []);
  }

  /** While one of the states holds, all that the role feeds is Bad with the status of the case, whatever its source says. */
  setRoleState(role: string, state: RoleState, holds: boolean, time: number): Update[] {
    const before = this.#roleStates.get(role) ?? new Set<RoleState>();
    if (before.has(state) === holds) return [];
    const after = new Set([...before, state].filter((s) => s !== state || holds));
    if (after.size > 0) this.#roleStates.set(role, after);
    else this.#roleStates.delete(role);
    const status = this.#findRoleStatus(role);
    if (status === undefined) return [];
    const slots = this.#plan.slotsOfRole.get(role) ?? [];
    for (const slot of slots) this.#samples[slot] = badSample(status, time);
    return this.#evaluateAll(this.#rows.filter((row) => slots.some((slot) => this.#rowsBySlot[slot]?.includes(row))));
  }

  /**
   * Lets values grow old: a channel that is silent for more than one period keeps its last value as
   * Uncertain_NoCommunicationLastUsable, after `keepPeriods` (3 unless the row says otherwise) it becomes
   * Bad_NoCommunication without a value, unless the row keeps it for as long as it takes.
   */
  age(now: number): Update[] {
    const updates: Update[] = [];
    for (const row of this.#rows) {
      const { period, quality } = row.plan.row;
      if (period === undefined || row.plan.input.kind === "constant" || row.sample === WAITING) continue;
      const silent = now - row.sample.time;
      if (silent <= Math.max(LATE * period, period + LATE_MS) || isBad(row.sample.status)) continue;
      const isKept = silent <= (quality?.keepPeriods ?? 3) * period;
      const status =
        isKept || quality?.afterKeep === "Uncertain_NoCommunicationLastUsable"
          ? StatusCode.Uncertain_NoCommunicationLastUsable
          : StatusCode.Bad_NoCommunication;
      if (row.sample.status === status) continue;
      row.sample = isBad(status) ? badSample(status, row.sample.time) : { ...row.sample, status };
      updates.push({ target: row.target, sample: row.sample });
    }
    return updates;
  }

  #refuse(role: string, entry: RunningFrame, frame: FrameInput): number | undefined {
    const known = this.#roleStates.size === 0 ? undefined : this.#findRoleStatus(role);
    if (known !== undefined) return known;
    if (!frame.isValid) return StatusCode.Bad;
    return frame.octets.length === entry.octets ? undefined : StatusCode.Bad_ConfigurationError;
  }

  #isOverruled(slot: ChannelSlot): boolean {
    if (this.#roleStates.size === 0) return false;
    return [...this.#roleStates.keys()].some((role) => this.#plan.slotsOfRole.get(role)?.includes(slot));
  }

  #findRoleStatus(role: string): number | undefined {
    const states = this.#roleStates.get(role);
    const worst = states && (Object.keys(STATUS_OF_ROLE) as RoleState[]).find((state) => states.has(state));
    return worst && STATUS_OF_ROLE[worst];
  }

  #listSlots(row: RunningRow, found: Set<ChannelSlot>): ReadonlySet<ChannelSlot> {
    const { input } = row.plan;
    if (input.kind === "channel") found.add(input.slot);
    if (input.kind !== "formula") return found;
    for (const { slot, target } of input.inputs) {
      if (slot !== undefined) found.add(slot);
      const member = target === undefined ? undefined : this.#rowsByTarget.get(target);
      if (member) this.#listSlots(member, found);
    }
    return found;
  }

  #evaluateAll(rows: readonly RunningRow[]): Update[] {
    const updates = new Array<Update>(rows.length);
    for (let i = 0; i < rows.length; i++) {
      const row = rows[i] as RunningRow;
      const { input } = row.plan;
      if (input.kind === "channel") row.sample = runRow(row, this.#samples[input.slot] as Sample);
      else if (input.kind === "formula") row.sample = runRow(row, this.#compute(row, input.formula, input.inputs));
      updates[i] = { target: row.target, sample: row.sample };
    }
    return updates;
  }

  /** Worst status and oldest time of the inputs; null when one of them is Bad or the result is no number. */
  #compute(row: RunningRow, formula: CompiledFormula, inputs: readonly FormulaInput[]): Sample {
    const samples = inputs.map(({ slot, target }) =>
      slot === undefined ? (this.#rowsByTarget.get(target ?? "")?.sample ?? WAITING) : (this.#samples[slot] as Sample),
    );
    const time = samples.length === 0 ? 0 : Math.min(...samples.map((s) => s.time));
    const worst = worstStatus(samples);
    const isLenient = row.plan.row.quality?.badInput === "Uncertain_SubNormal";
    if (isBad(worst) && !isLenient) return badSample(worst, time);
    const values: Record<string, number> = {};
    for (const [index, { name }] of inputs.entries()) {
      const sample = samples[index] as Sample;
      const number = isBad(sample.status) ? Number.NaN : toNumber(sample.value);
      if (number === undefined) return badSample(StatusCode.Bad_ConfigurationError, time);
      values[name] = number;
    }
    const value = formula.evaluate(values);
    if (Number.isNaN(value)) return badSample(isBad(worst) ? worst : StatusCode.Bad, time);
    const status = isLenient && !isGood(worst) ? StatusCode.Uncertain_SubNormal : worst;
    return { value, status, time };
  }
}

function runRow(row: RunningRow, sample: Sample): Sample {
  const { prepare, finish } = row.plan;
  const { steps } = row;
  let at = prepare ? prepare(sample) : sample;
  if (row.path) row.path = [at];
  for (let i = 0; i < steps.length; i++) {
    at = (steps[i] as TransformStep)(at);
    row.path?.push(at);
  }
  return finish ? finish(at) : at;
}
