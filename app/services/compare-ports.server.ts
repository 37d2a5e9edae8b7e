/** Which device answers on each port that a machine is bound to, against what its role and the plan of the port want. */
import type { AddressSpace } from "../domain/address-space/address-space";
import type { AsBuiltDifference } from "../domain/as-built/as-built";
import { formatProblem } from "../domain/core/problem-texts";
import { listMachines } from "../domain/instantiation/list-machines";
import { listBoundRoles } from "../domain/mapping/bindings";
import type { PlannedSource } from "../domain/mapping/make-wiring";
import { isIoLinkMaster } from "../domain/mapping/source-settings";
import { readSourceNow } from "./live-sources.server";

export type PortComparison = { readonly differences: readonly AsBuiltDifference[]; readonly remarks: readonly string[] };

type Wanted = { readonly path: string; readonly source: PlannedSource; readonly port: number; readonly vendorId: number | undefined; readonly deviceId: number | undefined };

/** A port that cannot be read contradicts nothing; a remark says that it was not compared. */
export async function comparePorts(organizationId: string, space: AddressSpace, sources: readonly PlannedSource[]): Promise<PortComparison> {
  const differences: AsBuiltDifference[] = [];
  const remarks: string[] = [];
  for (const wanted of listWanted(space, sources)) {
    const { source, port } = wanted;
    const plan = source.ports.find((p) => p.port === port)?.plan;
    const alias = plan?.deviceAlias;
    const read = await readSourceNow(organizationId, source.id, { kind: "port", port, ...(alias ? { alias } : {}) });
    if (!read.ok) remarks.push(`${wanted.path}: port ${port} of ${source.name} was not compared. ${read.problems.map(formatProblem).join(" ")}`);
    else if (read.value.value.kind === "port") differences.push(...judge(wanted, plan?.serialNumber, read.value.value));
  }
  return { differences, remarks };
}

function listWanted(space: AddressSpace, sources: readonly PlannedSource[]): Wanted[] {
  return listMachines(space).flatMap(({ key, name }) =>
    listBoundRoles(space, key).flatMap(({ role, value, binding }): Wanted[] => {
      const source = sources.find((s) => s.id === binding?.sourceId);
      if (value.kind !== "io-link-device" || !source || binding?.port === undefined || !isIoLinkMaster(source.kind)) return [];
      return [{ path: `${name}/${role}`, source, port: binding.port, vendorId: value.vendorId, deviceId: value.deviceId }];
    }),
  );
}

type Found = { readonly vendorId?: number; readonly deviceId?: number; readonly serialNumber?: string };

function judge({ path, source, port, vendorId, deviceId }: Wanted, serialNumber: string | undefined, found: Found): AsBuiltDifference[] {
  const place = `port ${port} of ${source.name}`;
  const tell = (detail: string, released: string, seen: string | null): AsBuiltDifference => ({ aspect: "device", kind: "device-differs", path, detail: `${place}: ${detail}`, released, found: seen });
  if (vendorId === undefined || deviceId === undefined) return [];
  if (found.vendorId === undefined || found.deviceId === undefined) return [tell("no device answers", formatIds(vendorId, deviceId), null)];
  if (found.vendorId !== vendorId || found.deviceId !== deviceId) return [tell("another device", formatIds(vendorId, deviceId), formatIds(found.vendorId, found.deviceId))];
  if (!serialNumber || found.serialNumber === undefined || found.serialNumber === serialNumber) return [];
  return [tell("another one of the same kind", `serial number ${serialNumber}`, `serial number ${found.serialNumber}`)];
}

function formatIds(vendorId: number, deviceId: number): string {
  return `vendor ${vendorId}, device ${deviceId}`;
}
