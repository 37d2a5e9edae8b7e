/**
 * Variables that mappings feed: the very code of the decode bench runs here for each machine. What came last of a Variable
 * is kept, and read when a client samples it.
 */
import { type AddressSpace, DataValue, NodeClass, StatusCodes, type UAVariable, Variant, coerceStatusCode } from "node-opcua";
import { formatProblem } from "~/domain/core/problem-texts";
import { offerInput, startMachine } from "~/domain/mapping/fed-machine";
import type { MachineFeed } from "~/domain/mapping/make-feed";
import type { MappingRunner, Update } from "~/domain/mapping/mapping-runner";
import type { FeedInput } from "~/domain/mapping/plan-readings";
import type { Sample } from "~/domain/mapping/sample";
import { isBad, StatusCode } from "~/domain/mapping/status";
import type { FeedState } from "~/domain/simulation/test-server-state";
import type { BuiltInType } from "~/domain/simulation/motion";
import { DELAY_STEPS } from "../messages";
import { toWireNodeId } from "../node-ids";
import { encodeNumber, makeVariant } from "./encode-value";

export type FeedOptions = {
  readonly now: () => number;
  readonly log: (text: string) => void;
  readonly report: (state: FeedState & { readonly histogram: number[] }) => void;
};

/** How often values are let grow old and the state is told, ms. */
const TICK = 1_000;
const SAMPLING_INTERVAL = 50;

type Machine = { readonly runner: MappingRunner; readonly holders: ReadonlyMap<string, Holder> };
type Holder = { sample: Sample; readonly builtInType: BuiltInType };

export function startFeed(space: AddressSpace, machines: readonly MachineFeed[], { now, log, report }: FeedOptions): { offer(inputs: readonly FeedInput[]): void; stop(): void } {
  const running = new Map<string, Machine>();
  for (const spec of machines) {
    const runner = startMachine(spec, now());
    if (!runner.ok) {
      log(`${spec.machine} is not fed: ${runner.problems.map(formatProblem).join(" ")}`);
      continue;
    }
    const holders = bindHolders(space, spec, now, log);
    const machine = { runner: runner.value, holders };
    running.set(spec.machine, machine);
    apply(machine, runner.value.list());
  }
  let inputs = 0;
  let changes = 0;
  let delays: number[] = [];
  const histogram = new Array<number>(DELAY_STEPS.length + 1).fill(0);
  const timer = setInterval(() => {
    for (const machine of running.values()) changes += apply(machine, machine.runner.age(now()));
    report({ inputs, changes, delay: summarise(delays), histogram: [...histogram] });
    delays = [];
  }, TICK);
  return {
    offer: (offered) => {
      for (const input of offered) {
        const machine = running.get(input.machine);
        if (!machine) continue;
        inputs++;
        changes += apply(machine, offerInput(machine.runner, input));
        const delay = now() - input.time;
        delays.push(delay);
        const step = DELAY_STEPS.findIndex((end) => delay <= end);
        const at = step < 0 ? DELAY_STEPS.length : step;
        histogram[at] = (histogram[at] ?? 0) + 1;
      }
    },
    stop: () => clearInterval(timer),
  };
}

function apply({ holders }: Machine, updates: readonly Update[]): number {
  let count = 0;
  for (const { target, sample } of updates) {
    const holder = holders.get(target);
    if (!holder) continue;
    holder.sample = sample;
    count++;
  }
  return count;
}

function bindHolders(space: AddressSpace, spec: MachineFeed, now: () => number, log: (text: string) => void): Map<string, Holder> {
  const namespaces = space.getNamespaceArray().map((namespace) => namespace.namespaceUri);
  const holders = new Map<string, Holder>();
  for (const { target, nodeId, builtInType } of spec.nodes) {
    const id = toWireNodeId(nodeId, namespaces);
    const node = id.ok ? space.findNode(id.value) : null;
    if (node?.nodeClass !== NodeClass.Variable) {
      log(`${spec.machine}: the server has no Variable ${nodeId} for ${target}.`);
      continue;
    }
    const holder: Holder = { sample: { value: null, status: StatusCode.Bad_WaitingForInitialData, time: now() }, builtInType };
    const variable = node as UAVariable;
    try {
      variable.bindVariable({ timestamped_get: () => toDataValue(holder, now()) }, true);
      variable.minimumSamplingInterval = SAMPLING_INTERVAL;
      holders.set(target, holder);
    } catch (error) {
      log(`${spec.machine}: ${target} takes no values: ${error instanceof Error ? error.message : String(error)}`);
    }
  }
  return holders;
}

function toDataValue({ sample, builtInType }: Holder, time: number): DataValue {
  const value = isBad(sample.status) ? undefined : toVariant(sample, builtInType);
  const isMisfit = value === undefined && !isBad(sample.status);
  const statusCode = coerceStatusCode(isMisfit ? StatusCodes.BadTypeMismatch : sample.status);
  const sourceTimestamp = new Date(sample.time === 0 ? time : sample.time);
  return new DataValue({ value: value ?? new Variant({}), statusCode, sourceTimestamp, serverTimestamp: new Date(time) });
}

/** Undefined where the value is none of the Variable's data type. */
function toVariant({ value }: Sample, type: BuiltInType): Variant | undefined {
  if (value === null) return undefined;
  if (type === "String") return makeVariant(type, [], () => String(value));
  if (type === "DateTime") return typeof value === "number" ? makeVariant(type, [], () => new Date(value)) : undefined;
  if (type === "LocalizedText") return makeVariant(type, [], () => ({ text: String(value) }));
  if (typeof value === "string") return undefined;
  if (type === "Boolean" && typeof value !== "boolean") return undefined;
  return makeVariant(type, [], () => encodeNumber(Number(value), type));
}

function summarise(delays: readonly number[]): FeedState["delay"] {
  if (delays.length === 0) return null;
  const sorted = [...delays].sort((a, b) => a - b);
  const at = (share: number): number => sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? 0;
  return { p50: at(0.5), p99: at(0.99), highest: sorted.at(-1) ?? 0 };
}
