/** Rows of the wiring list, by source and port. */
import type { WiringRow } from "../domain/deliver/wiring-list";
import type { SourceAddress } from "../domain/mapping/source-settings";
import { readSources, type PortBinding, type PortView, type SourceView } from "./read-sources.server";

export async function makeWiringList(organizationId: string): Promise<WiringRow[]> {
  const { sources } = await readSources(organizationId);
  return sources.flatMap((source) => [
    ...source.ports.flatMap((port) => listPortRows(source, port)),
    ...source.bindings.map((binding) => toRow(source, undefined, binding)),
    ...(source.ports.length === 0 && source.bindings.length === 0 ? [toRow(source, undefined, undefined)] : []),
  ]);
}

function listPortRows(source: SourceView, port: PortView): WiringRow[] {
  if (port.bindings.length > 0) return port.bindings.map((binding) => toRow(source, port, binding));
  return [toRow(source, port, undefined)];
}

function toRow(source: SourceView, port: PortView | undefined, bound: PortBinding | undefined): WiringRow {
  const plan = port?.plan;
  const unit = bound?.binding.unitId;
  return {
    source: source.name,
    kind: source.kind,
    address: formatAddress(source.address),
    place: port ? `port ${port.port}` : unit === undefined ? "" : `unit ${unit}`,
    portClass: plan?.portClass ?? "",
    mode: plan?.mode ?? "",
    cycle: plan?.cycleMs === undefined ? "" : `${plan.cycleMs} ms`,
    machine: bound?.machine ?? "",
    role: bound?.role ?? (plan ? "" : port ? "free" : ""),
    device: port?.device?.name ?? bound?.productName ?? "",
    serialNumber: bound?.binding.serialNumber ?? plan?.serialNumber ?? "",
    note: plan?.note ?? "",
  };
}

function formatAddress({ url, host, port }: SourceAddress): string {
  return url ?? (host === undefined ? "" : `${host}${port === undefined ? "" : `:${port}`}`);
}
