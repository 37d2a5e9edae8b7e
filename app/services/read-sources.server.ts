/** Everything about sources that pages, lists and checks ask for: the plan of the ports and what machines bind to them. */
import { listDeviceRows, type DeviceRow } from "../db/repositories/devices.server";
import { listModels } from "../db/repositories/models.server";
import {
  listGatewayMachines,
  listGatewayRows,
  listPortRows,
  listSourceRows,
  type SourcePortRow,
  type SourceRow,
} from "../db/repositories/sources.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import type { NodeKey } from "../domain/address-space/node-id";
import { listMachines, type Machine } from "../domain/instantiation/list-machines";
import { listBoundRoles } from "../domain/mapping/bindings";
import type { Binding } from "../domain/mapping/mapping-parts";
import {
  portPlanSchema,
  sourceAddressSchema,
  type PortPlan,
  type SourceAddress,
  type SourceKind,
} from "../domain/mapping/source-settings";
import { loadWorkingModel } from "./working-model.server";

export type PortBinding = {
  readonly modelId: string;
  readonly machineKey: NodeKey;
  readonly machine: string;
  readonly role: string;
  readonly binding: Binding;
  /** What the role wants there. */
  readonly vendorId: number | undefined;
  readonly deviceId: number | undefined;
  readonly productName: string | undefined;
};

export type PortView = {
  readonly port: number;
  readonly plan: PortPlan | undefined;
  /** The device planned there, as the library knows it. */
  readonly device: { readonly id: string; readonly name: string; readonly vendorId: number; readonly deviceId: number } | undefined;
  readonly bindings: readonly PortBinding[];
};

export type SourceView = {
  readonly id: string;
  readonly name: string;
  readonly kind: SourceKind;
  readonly address: SourceAddress;
  readonly note: string;
  /** One entry a port, planned or not; empty for sources without ports. */
  readonly ports: readonly PortView[];
  /** Bindings without a port. */
  readonly bindings: readonly PortBinding[];
};

export type GatewayView = {
  readonly id: string;
  readonly name: string;
  readonly endpointUrl: string | null;
  readonly note: string;
  readonly machines: readonly { readonly modelId: string; readonly machineKey: string; readonly name: string }[];
};

export type BoundMachine = {
  readonly modelId: string;
  readonly modelName: string;
  readonly key: NodeKey;
  readonly name: string;
  readonly typeName: string;
  readonly gatewayId: string | undefined;
};

export type Sources = {
  readonly sources: readonly SourceView[];
  readonly gateways: readonly GatewayView[];
  readonly machines: readonly BoundMachine[];
};

export async function readSources(organizationId: string): Promise<Sources> {
  const [rows, ports, gateways, assigned, devices] = await Promise.all([
    listSourceRows(organizationId),
    listPortRows(organizationId),
    listGatewayRows(organizationId),
    listGatewayMachines(organizationId),
    listDeviceRows(organizationId),
  ]);
  const parks = await loadParks(organizationId);
  const bindings = parks.flatMap(listBindings);
  const gatewayOf = new Map(assigned.map((a) => [`${a.modelId} ${a.machineKey}`, a.gatewayId] as const));
  const machines = parks.flatMap(({ modelId, modelName, machines: list }) =>
    list.map(({ key, name, typeName }) => ({ modelId, modelName, key, name, typeName, gatewayId: gatewayOf.get(`${modelId} ${key}`) })),
  );
  return {
    sources: rows.map((row) => toSourceView(row, ports, bindings, devices)),
    gateways: gateways.map(({ id, name, endpointUrl, note }) => ({
      id,
      name,
      endpointUrl,
      note,
      machines: machines.filter((m) => m.gatewayId === id).map((m) => ({ modelId: m.modelId, machineKey: m.key, name: m.name })),
    })),
    machines,
  };
}

export type Park = {
  readonly modelId: string;
  readonly modelName: string;
  readonly space: AddressSpace;
  readonly machines: readonly Machine[];
};

/** The machines of all models of machines. */
export async function loadParks(organizationId: string): Promise<Park[]> {
  const parks: Park[] = [];
  for (const row of await listModels(organizationId)) {
    const working = row.kind === "machines" ? await loadWorkingModel(row.id) : undefined;
    if (!working) continue;
    parks.push({ modelId: row.id, modelName: row.name, space: working.space, machines: listMachines(working.space) });
  }
  return parks;
}

function listBindings({ modelId, space, machines }: Park): (PortBinding & { readonly sourceId: string })[] {
  return machines.flatMap(({ key, name }) =>
    listBoundRoles(space, key).flatMap(({ role, value, binding }) =>
      binding
        ? [
            {
              modelId,
              machineKey: key,
              machine: name,
              role,
              binding,
              sourceId: binding.sourceId,
              vendorId: value.vendorId,
              deviceId: value.deviceId,
              productName: value.productName,
            },
          ]
        : [],
    ),
  );
}

function toSourceView(
  row: SourceRow,
  ports: readonly SourcePortRow[],
  bindings: readonly (PortBinding & { readonly sourceId: string })[],
  devices: readonly DeviceRow[],
): SourceView {
  const address = sourceAddressSchema.parse(row.address);
  const own = bindings.filter((b) => b.sourceId === row.id);
  const planned = new Map(ports.filter((p) => p.sourceId === row.id).map((p) => [p.port, portPlanSchema.parse(p.plan)] as const));
  const count = Math.max(address.portCount ?? 0, ...planned.keys());
  return {
    id: row.id,
    name: row.name,
    kind: row.kind as SourceKind,
    address,
    note: row.note,
    ports: Array.from({ length: count }, (_, i): PortView => {
      const plan = planned.get(i + 1);
      const device = devices.find((d) => d.id === plan?.deviceDescriptionId);
      return {
        port: i + 1,
        plan,
        device: device && { id: device.id, name: device.deviceName, vendorId: device.vendorId, deviceId: device.deviceId },
        bindings: own.filter((b) => b.binding.port === i + 1),
      };
    }),
    bindings: own.filter((b) => b.binding.port === undefined),
  };
}
