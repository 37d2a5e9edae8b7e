/** Which device answers on each port that a machine is bound to, against what its role and the plan of the port want. */
import type { AddressSpace } from "../domain/address-space/address-space";
import type { AsBuiltDifference } from "../domain/as-built/as-built";
import { comparePort } from "../domain/as-built/compare-port";
import { formatProblem } from "../domain/core/problem-texts";
import { listMachines } from "../domain/instantiation/list-machines";
import { listBoundRoles } from "../domain/mapping/bindings";
import type { PlannedSource } from "../domain/mapping/make-wiring";
import { isIoLinkMaster } from "../domain/mapping/source-settings";
import { readSourceNow } from "./live-sources.server";

export type PortComparison = { readonly differences: readonly AsBuiltDifference[]; readonly remarks: readonly string[] };

type Wanted = { readonly path: string; readonly source: PlannedSource; readonly port: number; readonly vendorId: number; readonly deviceId: number };

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
    else if (read.value.value.kind === "port") {
      const serial = plan?.serialNumber === undefined ? {} : { serialNumber: plan.serialNumber };
      differences.push(...comparePort({ ...wanted, ...serial, place: `port ${port} of ${source.name}` }, read.value.value));
    }
  }
  return { differences, remarks };
}

function listWanted(space: AddressSpace, sources: readonly PlannedSource[]): Wanted[] {
  return listMachines(space).flatMap(({ key, name }) =>
    listBoundRoles(space, key).flatMap(({ role, value, binding }): Wanted[] => {
      const source = sources.find((s) => s.id === binding?.sourceId);
      const { kind, vendorId, deviceId } = value;
      if (kind !== "io-link-device" || !source || binding?.port === undefined || !isIoLinkMaster(source.kind)) return [];
      return vendorId === undefined || deviceId === undefined ? [] : [{ path: `${name}/${role}`, source, port: binding.port, vendorId, deviceId }];
    }),
  );
}
