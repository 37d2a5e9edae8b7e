/**
 * What has to be read of which source so that the mappings of machines run: the rows of all machines gathered into few
 * readings, each with its period, and the way back from a reading to what the running mappings are offered.
 */
import { decodeParameter } from "./decode-parameter";
import { countRegisters, decodeRegisters } from "./decode-registers";
import { toItemKey, type RegisterTable, type SourceItem, type SourceReading } from "./live-source";
import type { InputReference, Mapping } from "./mapping";
import type { Binding } from "./mapping-parts";
import type { RoleState } from "./mapping-runner";
import type { Direction } from "../iodd/device-description";
import { toChannelKey, type ChannelKey, type ChannelReference } from "./plan-mapping";
import type { SampleValue } from "./sample";
import { isIoLinkMaster, type SourceKind } from "./source-settings";
import { StatusCode } from "./status";

export type FedMachine = {
  readonly machine: string;
  readonly mapping: Mapping;
  readonly bindings: ReadonlyMap<string, { readonly binding: Binding; readonly kind: SourceKind }>;
};

/** What a running mapping is offered. */
export type FeedInput =
  | { readonly kind: "frame"; readonly machine: string; readonly role: string; readonly direction: Direction; readonly octets: Uint8Array; readonly isValid: boolean; readonly time: number }
  | { readonly kind: "sample"; readonly machine: string; readonly channel: ChannelKey; readonly value: SampleValue; readonly status: number; readonly time: number }
  | { readonly kind: "role"; readonly machine: string; readonly role: string; readonly state: RoleState; readonly holds: boolean; readonly time: number };

type Use =
  | { readonly kind: "frame"; readonly machine: string; readonly role: string }
  | { readonly kind: "identity"; readonly machine: string; readonly role: string; readonly vendorId: number | undefined; readonly deviceId: number | undefined; readonly channel: ChannelKey | undefined }
  | { readonly kind: "device-status"; readonly machine: string; readonly role: string; readonly channels: readonly ChannelKey[] }
  | { readonly kind: "value"; readonly machine: string; readonly channel: ChannelKey; readonly reference: ChannelReference; readonly first: number };

export type PlannedReading = {
  readonly sourceId: string;
  readonly item: SourceItem;
  readonly period: number;
  readonly uses: readonly Use[];
};

export type ReadingPlan = {
  readonly readings: readonly PlannedReading[];
  /** Roles that no source is bound to. */
  readonly unbound: readonly { readonly machine: string; readonly role: string }[];
};

export const DEFAULT_PERIOD = 500;
/** Parameters are slow and wear nothing when read; device status and identity change rarely. */
const SLOW_PERIOD = 5_000;
const EVENT_PERIOD = 1_000;
const DEVICE_STATUS_INDEX = 36;
const MAX_WORDS = 125;
const MAX_BITS = 2_000;

export function planReadings(machines: readonly FedMachine[]): ReadingPlan {
  const collector = new Collector();
  for (const machine of machines) collector.addMachine(machine);
  return collector.finish();
}

type Wanted = { sourceId: string; item: SourceItem; period: number; uses: Use[] };
type WantedRegister = {
  readonly sourceId: string;
  readonly unitId: number;
  readonly table: RegisterTable;
  readonly address: number;
  readonly count: number;
  readonly period: number;
  readonly use: (first: number) => Use;
};

class Collector {
  readonly #readings = new Map<string, Wanted>();
  readonly #registers: WantedRegister[] = [];
  readonly #unbound: { machine: string; role: string }[] = [];

  addMachine({ machine, mapping, bindings }: FedMachine): void {
    for (const { role } of mapping.roles) if (!bindings.has(role)) this.#unbound.push({ machine, role });
    for (const row of mapping.rows) {
      if (row.direction === "out") continue;
      const period = row.period ?? DEFAULT_PERIOD;
      const { source } = row;
      const references = source.kind === "formula" ? Object.values(source.inputs).flatMap((i) => (i.kind === "member" ? [] : [i])) : [source];
      for (const reference of references) this.#addReference(machine, mapping, bindings, reference, period);
    }
    for (const { role, vendorId, deviceId, kind } of mapping.roles) {
      const bound = bindings.get(role);
      if (kind !== "io-link-device" || !bound || !isIoLinkMaster(bound.kind) || bound.binding.port === undefined) continue;
      const item: SourceItem = { kind: "port", ...toPort(bound.binding) };
      this.#add(bound.binding.sourceId, item, SLOW_PERIOD, { kind: "identity", machine, role, vendorId, deviceId, channel: undefined });
    }
  }

  finish(): ReadingPlan {
    for (const range of mergeRegisters(this.#registers)) {
      const { sourceId, unitId, table, address, count, period } = range;
      for (const use of range.uses) this.#add(sourceId, { kind: "registers", unitId, table, address, count }, period, use);
    }
    return { readings: [...this.#readings.values()], unbound: this.#unbound };
  }

  #addReference(machine: string, mapping: Mapping, bindings: FedMachine["bindings"], reference: InputReference, period: number): void {
    if (reference.kind === "constant") return;
    if (reference.kind === "device-status") return this.#addDeviceStatus(machine, bindings, reference, period);
    const bound = bindings.get(reference.role);
    if (!bound) return;
    const { binding } = bound;
    const channel = toChannelKey(reference);
    const value = (first = 0): Use => ({ kind: "value", machine, channel, reference, first });
    const port = binding.port === undefined ? undefined : toPort(binding);
    switch (reference.kind) {
      case "process-data":
        if (port) this.#add(binding.sourceId, { kind: "process-data", ...port }, period, { kind: "frame", machine, role: reference.role });
        return;
      case "validity":
        if (port) this.#add(binding.sourceId, { kind: "process-data", ...port }, period, value());
        return;
      case "port-status": {
        const role = mapping.roles.find((r) => r.role === reference.role);
        const use: Use = { kind: "identity", machine, role: reference.role, vendorId: role?.vendorId, deviceId: role?.deviceId, channel };
        if (port) this.#add(binding.sourceId, { kind: "port", ...port }, Math.max(period, 1_000), use);
        return;
      }
      case "parameter": {
        const { index, subindex } = reference;
        if (port) this.#add(binding.sourceId, { kind: "parameter", ...port, index, subindex }, Math.max(period, SLOW_PERIOD), value());
        return;
      }
      case "register": {
        const isWord = reference.table.endsWith("register");
        const count = isWord && reference.bit === undefined ? countRegisters(reference.type ?? "UInt16") : 1;
        const address = reference.address + (binding.addressOffset ?? 0);
        const { sourceId, unitId = 1 } = binding;
        if (address < 0 || address + count > 65_536) return;
        this.#registers.push({ sourceId, unitId, table: reference.table, address, count, period, use: (first) => value(address - first) });
        return;
      }
      case "opc-ua-node":
        this.#add(binding.sourceId, { kind: "node", nodeId: reference.nodeId }, period, value());
        return;
      case "tag":
        this.#add(binding.sourceId, { kind: "node", nodeId: `${binding.path ?? ""}${reference.name}` }, period, value());
        return;
      case "json-path":
        this.#add(binding.sourceId, { kind: "document" }, period, value());
        return;
      case "event-code":
        if (port) this.#add(binding.sourceId, { kind: "events", ...port }, Math.max(period, EVENT_PERIOD), value());
        return;
    }
  }

  #addDeviceStatus(machine: string, bindings: FedMachine["bindings"], reference: Extract<InputReference, { kind: "device-status" }>, period: number): void {
    const channel = toChannelKey(reference);
    for (const role of reference.roles) {
      const bound = bindings.get(role);
      if (!bound || bound.binding.port === undefined) continue;
      const item: SourceItem = { kind: "parameter", ...toPort(bound.binding), index: DEVICE_STATUS_INDEX, subindex: 0 };
      this.#add(bound.binding.sourceId, item, Math.max(period, SLOW_PERIOD), { kind: "device-status", machine, role, channels: [channel] });
    }
  }

  #add(sourceId: string, item: SourceItem, period: number, use: Use): void {
    const key = `${sourceId} ${toItemKey(item)}`;
    const known = this.#readings.get(key);
    if (!known) {
      this.#readings.set(key, { sourceId, item, period, uses: [use] });
      return;
    }
    known.period = Math.min(known.period, period);
    // Several rows read one frame; it is offered once.
    const isKnown = known.uses.some((u) => u.kind === "frame" && use.kind === "frame" && u.machine === use.machine && u.role === use.role);
    if (!isKnown) known.uses.push(use);
  }
}

function toPort({ port = 0, deviceAlias }: Binding): { port: number; alias?: string } {
  return { port, ...(deviceAlias === undefined ? {} : { alias: deviceAlias }) };
}

type RegisterRange = Omit<WantedRegister, "use"> & { readonly uses: Use[] };

/** Neighbours are read in one request; a gap is never read, since an address that is not there fails the whole request. */
function mergeRegisters(wanted: readonly WantedRegister[]): RegisterRange[] {
  const groups = new Map<string, WantedRegister[]>();
  for (const entry of wanted) {
    const key = `${entry.sourceId} ${entry.unitId} ${entry.table} ${entry.period}`;
    groups.set(key, [...(groups.get(key) ?? []), entry]);
  }
  const ranges: RegisterRange[] = [];
  for (const entries of groups.values()) {
    const sorted = [...entries].sort((a, b) => a.address - b.address);
    let members: WantedRegister[] = [];
    let end = 0;
    const close = (): void => {
      const [first] = members;
      if (!first) return;
      const { use: _use, ...common } = first;
      ranges.push({ ...common, count: end - first.address, uses: members.map((m) => m.use(first.address)) });
    };
    for (const entry of sorted) {
      const [first] = members;
      const limit = entry.table.endsWith("register") ? MAX_WORDS : MAX_BITS;
      const fits = first !== undefined && entry.address <= end && entry.address + entry.count - first.address <= limit;
      if (!fits) {
        close();
        members = [];
        end = entry.address;
      }
      members.push(entry);
      end = Math.max(end, entry.address + entry.count);
    }
    close();
  }
  return ranges;
}

/** Remembers what several readings make together: the worst device status of several roles. */
export class ReadingMemory {
  readonly #status = new Map<string, Map<string, number>>();

  /** The worst of the roles' device status as DI's DeviceHealth, once every role has told one. */
  keep(machine: string, channel: ChannelKey, role: string, status: number): number {
    const key = `${machine} ${channel}`;
    const known = this.#status.get(key) ?? new Map<string, number>();
    known.set(role, status);
    this.#status.set(key, known);
    return DEVICE_HEALTH[Math.max(...known.values())] ?? 1;
  }
}

/** IO-Link device status 0 … 4 (ok, maintenance, out of specification, functional check, failure) → DI DeviceHealth. */
const DEVICE_HEALTH = [0, 4, 3, 2, 1] as const;
const FAILURE = 4;

/** What the running mappings are offered after a reading. An outage offers nothing: values then grow old by themselves. */
export function toInputs({ uses }: PlannedReading, reading: SourceReading, memory: ReadingMemory): FeedInput[] {
  if (!reading.ok) return uses.flatMap((use) => toFailure(use, reading.status, reading.time));
  return uses.flatMap((use) => toInput(use, reading.value, reading.time, memory));
}

function toFailure(use: Use, status: number, time: number): FeedInput[] {
  if (status === StatusCode.Bad_NoCommunication || use.kind === "identity" || use.kind === "device-status") return [];
  if (use.kind === "frame") return [{ kind: "frame", machine: use.machine, role: use.role, direction: "in", octets: new Uint8Array(), isValid: true, time }];
  return [{ kind: "sample", machine: use.machine, channel: use.channel, value: null, status, time }];
}

type Value = Extract<SourceReading, { ok: true }>["value"];

function toInput(use: Use, value: Value, time: number, memory: ReadingMemory): FeedInput[] {
  const { machine } = use;
  switch (use.kind) {
    case "frame": {
      if (value.kind !== "process-data") return [];
      const { role } = use;
      return (["in", "out"] satisfies Direction[]).flatMap((direction) => {
        const frame = value[direction];
        return frame ? [{ kind: "frame" as const, machine, role, direction, octets: frame.octets, isValid: frame.isValid, time }] : [];
      });
    }
    case "identity": {
      if (value.kind !== "port") return [];
      const { role, vendorId, deviceId, channel } = use;
      const isKnown = value.deviceId !== undefined && deviceId !== undefined;
      const isOther = isKnown && (value.deviceId !== deviceId || (value.vendorId !== undefined && value.vendorId !== vendorId));
      const states: FeedInput[] = isKnown ? [{ kind: "role", machine, role, state: "wrong-device", holds: isOther, time }] : [];
      if (channel === undefined || value.status === undefined) return states;
      return [...states, { kind: "sample", machine, channel, value: value.status, status: StatusCode.Good, time }];
    }
    case "device-status": {
      if (value.kind !== "octets" || value.octets[0] === undefined) return [];
      const status = value.octets[0];
      const { role, channels } = use;
      return [
        ...channels.map((channel): FeedInput => ({ kind: "sample", machine, channel, value: memory.keep(machine, channel, role, status), status: StatusCode.Good, time })),
        { kind: "role", machine, role, state: "device-failure", holds: status === FAILURE, time },
      ];
    }
    case "value": {
      const { channel } = use;
      const read = readValue(use, value);
      return [{ kind: "sample", machine, channel, value: read.status >>> 31 === 1 ? null : read.value, status: read.status, time }];
    }
  }
}

function readValue({ reference, first }: Extract<Use, { kind: "value" }>, value: Value): { value: SampleValue; status: number } {
  const good = (found: SampleValue | undefined) =>
    found === undefined ? { value: null, status: StatusCode.Bad_ConfigurationError } : { value: found, status: StatusCode.Good };
  if (value.kind === "scalar") return { value: value.value, status: value.status };
  switch (reference.kind) {
    case "register":
      return good(value.kind === "words" ? readRegister(reference, value.words, first) : undefined);
    case "parameter":
      return good(value.kind === "octets" ? decodeParameter(value.octets, reference.encoding) : undefined);
    case "validity":
      return good(value.kind === "process-data" ? value[reference.direction]?.isValid : undefined);
    case "event-code":
      return good(value.kind === "events" ? value.codes.includes(reference.code) : undefined);
    case "json-path":
      return good(value.kind === "document" ? readPath(value.json, reference.path) : undefined);
    default:
      return good(undefined);
  }
}

/** The value of a register reference in words (or bits) as they were read; undefined when they are too few. */
export function readRegister(reference: Extract<InputReference, { kind: "register" }>, words: readonly number[], first: number): SampleValue | undefined {
  const [word] = words.slice(first, first + 1);
  if (word === undefined) return undefined;
  if (!reference.table.endsWith("register")) return word !== 0;
  if (reference.bit !== undefined) return ((word >> reference.bit) & 1) === 1;
  const type = reference.type ?? "UInt16";
  const taken = words.slice(first, first + countRegisters(type));
  return taken.length === countRegisters(type) ? decodeRegisters(taken, type, reference.order) : undefined;
}

function readPath(json: unknown, path: readonly (string | number)[]): SampleValue | undefined {
  let at = json;
  for (const step of path) {
    if (typeof at !== "object" || at === null || !Object.hasOwn(at, step)) return undefined;
    at = (at as Readonly<Record<string | number, unknown>>)[step];
  }
  return typeof at === "number" || typeof at === "string" || typeof at === "boolean" || at === null ? at : undefined;
}
