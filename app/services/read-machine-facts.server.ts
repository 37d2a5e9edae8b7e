/** What the Park tells of each machine beside its nodes: the revision that it follows, what feeds it, what was delivered and proved. */
import { listAsBuiltReports, type AsBuiltRow } from "../db/repositories/as-built.server";
import type { ModelRow } from "../db/repositories/models.server";
import { listGatewayMachines, listGatewayRows, listSourceRows } from "../db/repositories/sources.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import type { NodeKey } from "../domain/address-space/node-id";
import type { Machine } from "../domain/instantiation/list-machines";
import { listBoundRoles, toMachineMapping } from "../domain/mapping/bindings";
import { describePins, type PinSummary } from "./pins.server";
import { readGatewayStates, type GatewayState } from "./read-release.server";

export type MachineFacts = {
  readonly typeVersion: { readonly number: number; readonly newest: number } | null;
  /** Paths of the members that a source feeds on this machine; null where its type has no mapping. */
  readonly mapped: readonly string[] | null;
  /** `M1 1–3 · Controller B1`. */
  readonly sources: string;
  readonly gateway: { readonly name: string; readonly delivered: GatewayState["delivered"] | null; readonly provedVersion: string | null } | null;
  readonly asBuilt: { readonly verdict: string; readonly number: number; readonly at: string } | null;
};

export type FactReader = (space: AddressSpace, machine: Machine) => MachineFacts;

/** Everything that the machines of one model share is read once. */
export async function readMachineFacts(model: ModelRow): Promise<FactReader> {
  const { organizationId } = model;
  const [pins, sources, gateways, published, states, reports] = await Promise.all([
    describePins(model),
    listSourceRows(organizationId),
    listGatewayRows(organizationId),
    listGatewayMachines(organizationId),
    readGatewayStates(organizationId),
    listAsBuiltReports(model.id),
  ]);
  const nameOf = new Map(sources.map(({ id, name }) => [id, name]));
  return (space, { key }) => {
    const link = published.find((row) => row.modelId === model.id && row.machineKey === key);
    const gateway = gateways.find((row) => row.id === link?.gatewayId);
    const state = states.find((row) => row.gatewayId === gateway?.id && row.model === model.name);
    return {
      typeVersion: findTypeVersion(pins, key),
      mapped: listMapped(space, key),
      sources: describeSources(space, key, nameOf),
      gateway: gateway ? { name: gateway.name, delivered: state?.delivered ?? null, provedVersion: state?.proved?.version ?? null } : null,
      asBuilt: findReport(reports, gateway?.endpointUrl ?? null),
    };
  };
}

function findTypeVersion([pin]: readonly PinSummary[], machine: NodeKey): MachineFacts["typeVersion"] {
  return pin ? { number: pin.behind[machine] ?? pin.number, newest: pin.newest } : null;
}

/** A row counts where its source is there: its role is bound, or it needs none. */
function listMapped(space: AddressSpace, machine: NodeKey): string[] | null {
  const mapping = toMachineMapping(space, machine);
  if (!mapping) return null;
  const bound = new Set(listBoundRoles(space, machine).flatMap(({ role, binding }) => (binding ? [role] : [])));
  return [...new Set(mapping.rows.flatMap(({ source, target }) => (!("role" in source) || bound.has(source.role) ? [target] : [])))];
}

function describeSources(space: AddressSpace, machine: NodeKey, nameOf: ReadonlyMap<string, string>): string {
  const bySource = new Map<string, number[]>();
  for (const { binding } of listBoundRoles(space, machine)) {
    if (!binding) continue;
    const name = nameOf.get(binding.sourceId) ?? "?";
    bySource.set(name, [...(bySource.get(name) ?? []), ...(binding.port === undefined ? [] : [binding.port])]);
  }
  return [...bySource].map(([name, ports]) => [name, formatPorts(ports)].filter(Boolean).join(" ")).join(" · ");
}

/** `1–3, 5`. */
function formatPorts(ports: readonly number[]): string {
  const sorted = [...new Set(ports)].sort((a, b) => a - b);
  const starts = sorted.filter((port) => !sorted.includes(port - 1));
  return starts
    .map((start) => {
      let end = start;
      while (sorted.includes(end + 1)) end++;
      return end === start ? String(start) : `${start}–${end}`;
    })
    .join(", ");
}

/** The newest report that was made of the machine's gateway. */
function findReport(reports: readonly AsBuiltRow[], endpointUrl: string | null): MachineFacts["asBuilt"] {
  const row = endpointUrl === null ? undefined : reports.find((report) => report.endpointUrl === endpointUrl);
  return row ? { verdict: row.verdict, number: row.number, at: row.at.toISOString() } : null;
}
