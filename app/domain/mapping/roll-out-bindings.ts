/**
 * Binds the roles of many machines in one go, by a pattern a role: `M{ceil(n / 2)}:{(n - 1) % 2 * 3 + 1}` is a port of a
 * master, `Hall meters/{20 + n}` a Modbus unit, `Line server` a source without either. In braces stands a formula (formula.ts) over `n`, the number at
 * the end of the machine's name (else its place in the list), and `i`, its place in the list; `{name}` is the name.
 */
import type { AddressSpace } from "../address-space/address-space";
import { getDisplayName } from "../address-space/browse";
import type { NodeKey } from "../address-space/node-id";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import type { Operation } from "../editing/operation";
import { listBoundRoles } from "./bindings";
import { compileFormula } from "./formula";
import type { Binding } from "./mapping-parts";
import { isIoLinkMaster } from "./source-settings";
import type { PlannedSource } from "./make-wiring";

export type RollOutIntent = {
  readonly machines: readonly NodeKey[];
  /** By role; a role without a pattern keeps what it has. */
  readonly patterns: Readonly<Record<string, string>>;
};

export type RollOutCell = {
  readonly machine: NodeKey;
  readonly machineName: string;
  readonly role: string;
  /** What the pattern makes; undefined where it makes nothing. */
  readonly binding: Binding | undefined;
  /** The place in words: `M1, port 4`. */
  readonly text: string;
  readonly present: Binding | undefined;
  readonly isChanged: boolean;
  readonly conflicts: readonly Problem[];
};

export type RollOutPlan = {
  readonly cells: readonly RollOutCell[];
  /** Of the cells without a conflict. */
  readonly operations: readonly Operation[];
};

/** The table and what carrying it out means. Conflicts stand in the cells: `roll-out.pattern`, `.no-source`, `.no-port`, `.port-taken`, `.other-device`, `.port-class`. */
export function planBindings(space: AddressSpace, sources: readonly PlannedSource[], intent: RollOutIntent): RollOutPlan {
  const taken = listTaken(space, sources, intent);
  const cells: RollOutCell[] = [];
  const operations: Operation[] = [];
  intent.machines.forEach((machine, index) => {
    const node = space.getNode(machine);
    const machineName = node ? getDisplayName(node) : machine;
    for (const { role, value, binding: present } of listBoundRoles(space, machine)) {
      const pattern = intent.patterns[role];
      if (pattern === undefined || pattern.trim() === "") continue;
      const made = readPattern(pattern, sources, machineName, index + 1);
      const conflicts = made.ok ? [] : [...made.problems];
      const place = made.ok ? made.value : undefined;
      if (place) {
        const holder = taken.get(place.key);
        if (holder) conflicts.push(problem("roll-out.port-taken", { place: place.text, machine: holder.machine, role: holder.role }));
        else if (place.isSingle) taken.set(place.key, { machine: machineName, role });
        conflicts.push(...checkPort(place, value));
      }
      const binding = place && { ...keepSerial(present, place.binding), ...place.binding };
      const isChanged = binding !== undefined && !isSamePlace(binding, present);
      cells.push({ machine, machineName, role, binding, text: place?.text ?? "", present, isChanged, conflicts });
      if (binding && isChanged && conflicts.every((c) => c.severity !== "error")) {
        operations.push({ kind: "setMapping", part: "binding", owner: machine, id: role, value: binding });
      }
    }
  });
  return { cells, operations };
}

type Place = {
  readonly binding: Binding;
  readonly key: string;
  readonly text: string;
  /** A port or a unit serves one role only. */
  readonly isSingle: boolean;
  readonly source: PlannedSource;
};

/** Ports and units that roles hold which this roll-out does not bind anew. */
function listTaken(space: AddressSpace, sources: readonly PlannedSource[], { machines, patterns }: RollOutIntent) {
  const taken = new Map<string, { machine: string; role: string }>();
  const owners = new Set<NodeKey>();
  for (const entry of space.own.mapping?.values() ?? []) if (entry.part === "binding") owners.add(entry.owner);
  for (const owner of owners) {
    const node = space.getNode(owner);
    for (const { role, binding } of listBoundRoles(space, owner)) {
      const isReplaced = machines.includes(owner) && (patterns[role] ?? "").trim() !== "";
      const source = sources.find((s) => s.id === binding?.sourceId);
      if (!binding || !source || isReplaced || (binding.port === undefined && binding.unitId === undefined)) continue;
      taken.set(placeKey(binding), { machine: node ? getDisplayName(node) : owner, role });
    }
  }
  return taken;
}

function placeKey({ sourceId, port, unitId }: Binding): string {
  return `${sourceId} ${port ?? ""} ${unitId ?? ""}`;
}

function readPattern(pattern: string, sources: readonly PlannedSource[], name: string, place: number): Result<Place> {
  const text = fillPattern(pattern, name, place);
  if (!text.ok) return text;
  const [, sourceName = "", mark, number] = /^(.*?)(?:\s*([:/])\s*(\d+))?$/.exec(text.value.trim()) ?? [];
  const source = sources.find((s) => s.name === sourceName.trim());
  if (!source) return fail(problem("roll-out.no-source", { name: sourceName.trim() }));
  const value = number === undefined ? undefined : Number(number);
  const needsPort = isIoLinkMaster(source.kind);
  if (needsPort && (mark !== ":" || value === undefined)) return fail(problem("roll-out.pattern", { pattern, message: "a port is needed, as in M1:4" }));
  if (needsPort && value !== undefined && (value < 1 || value > (source.address.portCount ?? 0))) {
    return fail(problem("roll-out.no-port", { name: source.name, port: value, portCount: source.address.portCount ?? 0 }));
  }
  if (source.kind === "modbus-unit" && (mark !== "/" || value === undefined || value > 255)) {
    return fail(problem("roll-out.pattern", { pattern, message: "a unit is needed, as in Meters/21" }));
  }
  const alias = needsPort ? source.ports.find((p) => p.port === value)?.plan?.deviceAlias : undefined;
  const binding: Binding = {
    sourceId: source.id,
    ...(needsPort ? { port: value } : source.kind === "modbus-unit" ? { unitId: value } : {}),
    ...(alias === undefined || alias === "" ? {} : { deviceAlias: alias }),
  };
  const where = binding.port === undefined ? (binding.unitId === undefined ? source.name : `${source.name}, unit ${binding.unitId}`) : `${source.name}, port ${binding.port}`;
  return ok({ binding, key: placeKey(binding), text: where, isSingle: value !== undefined, source });
}

function fillPattern(pattern: string, name: string, place: number): Result<string> {
  const number = Number(/(\d+)\D*$/.exec(name)?.[1] ?? place);
  let failure: Problem | undefined;
  const text = pattern.replace(/\{([^{}]*)\}/g, (_, inner: string) => {
    if (inner.trim() === "name") return name;
    const formula = compileFormula(inner, ["n", "i"]);
    const value = formula.ok ? formula.value.evaluate({ n: number, i: place }) : Number.NaN;
    if (!formula.ok) failure ??= problem("roll-out.pattern", { pattern, message: `“${inner}” cannot be read` });
    else if (typeof value !== "number" || !Number.isInteger(value)) failure ??= problem("roll-out.pattern", { pattern, message: `“${inner}” gives no whole number for ${name}` });
    return String(value);
  });
  return failure ? fail(failure) : ok(text);
}

function checkPort({ binding, source, text }: Place, role: { readonly vendorId?: number; readonly deviceId?: number; readonly portClass?: "A" | "B" }): Problem[] {
  const port = source.ports.find((p) => p.port === binding.port);
  if (!port || binding.port === undefined) return [];
  const found: Problem[] = [];
  const { device, plan } = port;
  const isOther = device !== undefined && role.deviceId !== undefined && (device.vendorId !== role.vendorId || device.deviceId !== role.deviceId);
  if (isOther) found.push(problem("roll-out.other-device", { place: text, device: device.name }));
  if (plan && role.portClass !== undefined && plan.portClass !== role.portClass) {
    found.push(problem("roll-out.port-class", { place: text, portClass: plan.portClass, wanted: role.portClass }));
  }
  return found;
}

/** The device that sits on a port stays what it is while the port stays. */
function keepSerial(present: Binding | undefined, next: Binding): Partial<Binding> {
  if (!present || placeKey(present) !== placeKey(next)) return {};
  return present;
}

function isSamePlace(a: Binding, b: Binding | undefined): boolean {
  return b !== undefined && placeKey(a) === placeKey(b) && a.deviceAlias === b.deviceAlias;
}
