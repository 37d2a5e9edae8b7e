/**
 * A running mapping: one for each machine. Frames and samples go in, changed Variables come out. It has no clock and no
 * timers: the caller gives the time with each input and calls `age` now and then, so that a replay of a recorded file and
 * a live source take the same path.
 */
import type { Direction } from "../iodd/device-description";
import { frameKey, type ChannelKey, type FormulaInput, type MappingPlan, type RowPlan } from "./plan-mapping";
import { badSample, toNumber, worstStatus, type Sample } from "./sample";
import { isBad, StatusCode } from "./status";
import type { TransformStep } from "./transform";

export type FrameInput = {
  readonly octets: Uint8Array;
  /** The validity flag of the direction. */
  readonly isValid: boolean;
  /** Milliseconds since 1970: when the source acquired the frame. */
  readonly time: number;
};

export type Update = { readonly target: string; readonly sample: Sample };

type RunningRow = { readonly plan: RowPlan; readonly steps: readonly TransformStep[]; sample: Sample };

const WAITING = badSample(StatusCode.Bad_WaitingForInitialData, 0);

export class MappingRunner {
  readonly #plan: MappingPlan;
  readonly #rows: readonly RunningRow[];
  readonly #rowsByTarget: ReadonlyMap<string, RunningRow>;
  /** Rows that a channel feeds, those that read them by formula behind them. */
  readonly #rowsByChannel = new Map<ChannelKey, RunningRow[]>();
  readonly #channels = new Map<ChannelKey, Sample>();

  constructor(plan: MappingPlan, time = 0) {
    this.#plan = plan;
    this.#rows = plan.rows.map((row) => ({ plan: row, steps: row.makeSteps(), sample: WAITING }));
    this.#rowsByTarget = new Map(this.#rows.map((row) => [row.plan.row.target, row]));
    for (const row of this.#rows) this.#register(row);
    for (const row of this.#rows) {
      if (row.plan.input.kind === "constant") {
        row.sample = runSteps(row, { value: row.plan.input.value, status: StatusCode.Good, time });
      }
    }
  }

  /** The present sample of a Variable; undefined for one that the mapping does not feed. */
  read(target: string): Sample | undefined {
    return this.#rowsByTarget.get(target)?.sample;
  }

  /** All Variables with their present samples, in the order of evaluation. */
  list(): Update[] {
    return this.#rows.map((row) => ({ target: row.plan.row.target, sample: row.sample }));
  }

  /**
   * One exchange of process data. A frame of another length than described, or one marked invalid, gives no value: all
   * its fields become Bad (OPC 30120 §7.1.3), never 0.
   */
  offerFrame(role: string, direction: Direction, frame: FrameInput): Update[] {
    const entry = this.#plan.frames.get(frameKey(role, direction));
    if (!entry) return [];
    const changed: ChannelKey[] = [];
    const isUsable = frame.isValid && frame.octets.length === entry.plan.octets;
    const status = frame.isValid ? StatusCode.Bad_ConfigurationError : StatusCode.Bad;
    for (const { field, channel } of entry.channels) {
      if (!isUsable) {
        this.#channels.set(channel, badSample(status, frame.time));
      } else {
        const decoded = field.decode(frame.octets);
        const value = typeof decoded.value === "object" ? null : decoded.value;
        this.#channels.set(channel, { value, status: decoded.status, time: frame.time });
      }
      changed.push(channel);
    }
    return this.#update(changed);
  }

  /** A sample of any other source: a register, a tag, a parameter, the device status. */
  offerSample(channel: ChannelKey, sample: Sample): Update[] {
    if (!this.#rowsByChannel.has(channel)) return [];
    this.#channels.set(channel, isBad(sample.status) ? badSample(sample.status, sample.time) : sample);
    return this.#update([channel]);
  }

  /**
   * Lets values grow old: a channel that is silent for more than one period keeps its last value as
   * Uncertain_NoCommunicationLastUsable, after `keepPeriods` (3 unless the row says otherwise) it becomes
   * Bad_NoCommunication without a value.
   */
  age(now: number): Update[] {
    const updates: Update[] = [];
    for (const row of this.#rows) {
      const { period, quality } = row.plan.row;
      if (period === undefined || row.plan.input.kind === "constant" || row.sample === WAITING) continue;
      const silent = now - row.sample.time;
      const keep = (quality?.keepPeriods ?? 3) * period;
      const status =
        silent > keep
          ? StatusCode.Bad_NoCommunication
          : silent > period
            ? StatusCode.Uncertain_NoCommunicationLastUsable
            : undefined;
      if (status === undefined || isBad(row.sample.status) || row.sample.status === status) continue;
      row.sample = isBad(status) ? badSample(status, row.sample.time) : { ...row.sample, status };
      updates.push({ target: row.plan.row.target, sample: row.sample });
    }
    return updates;
  }

  #register(row: RunningRow): void {
    for (const channel of this.#listChannels(row, new Set())) {
      const rows = this.#rowsByChannel.get(channel);
      if (rows) rows.push(row);
      else this.#rowsByChannel.set(channel, [row]);
    }
  }

  #listChannels(row: RunningRow, found: Set<ChannelKey>): ReadonlySet<ChannelKey> {
    const { input } = row.plan;
    if (input.kind === "channel") found.add(input.channel);
    if (input.kind !== "formula") return found;
    for (const { channel, target } of input.inputs) {
      if (channel !== undefined) found.add(channel);
      const member = target === undefined ? undefined : this.#rowsByTarget.get(target);
      if (member) this.#listChannels(member, found);
    }
    return found;
  }

  #update(changed: readonly ChannelKey[]): Update[] {
    const updates: Update[] = [];
    if (changed.length === 1) {
      for (const row of this.#rowsByChannel.get(changed[0] ?? "") ?? []) updates.push(this.#evaluate(row));
      return updates;
    }
    const rows = new Set<RunningRow>();
    for (const channel of changed) for (const row of this.#rowsByChannel.get(channel) ?? []) rows.add(row);
    // A formula comes behind what it reads: plan order, which a Set of several channels may not keep.
    const ordered = [...rows].some((row) => row.plan.input.kind === "formula")
      ? this.#rows.filter((row) => rows.has(row))
      : rows;
    for (const row of ordered) updates.push(this.#evaluate(row));
    return updates;
  }

  #evaluate(row: RunningRow): Update {
    const { input } = row.plan;
    if (input.kind === "channel") row.sample = runSteps(row, this.#channels.get(input.channel) ?? WAITING);
    else if (input.kind === "formula") row.sample = runSteps(row, this.#compute(input.formula.evaluate, input.inputs));
    return { target: row.plan.row.target, sample: row.sample };
  }

  /** Worst status and oldest time of the inputs; null when one of them is Bad or the result is no number. */
  #compute(evaluate: (inputs: Record<string, number>) => number | boolean, inputs: readonly FormulaInput[]): Sample {
    const samples = inputs.map(({ channel, target }) =>
      channel !== undefined
        ? (this.#channels.get(channel) ?? WAITING)
        : (this.#rowsByTarget.get(target ?? "")?.sample ?? WAITING),
    );
    const status = worstStatus(samples);
    const time = samples.length === 0 ? 0 : Math.min(...samples.map((s) => s.time));
    if (isBad(status)) return badSample(status, time);
    const values: Record<string, number> = {};
    for (const [index, { name }] of inputs.entries()) {
      const number = toNumber(samples[index]?.value ?? null);
      if (number === undefined) return badSample(StatusCode.Bad_ConfigurationError, time);
      values[name] = number;
    }
    const value = evaluate(values);
    return Number.isNaN(value) ? badSample(StatusCode.Bad, time) : { value, status, time };
  }
}

function runSteps(row: RunningRow, sample: Sample): Sample {
  let at = sample;
  for (const step of row.steps) at = step(at);
  return at;
}
