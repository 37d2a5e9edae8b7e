/** The wiring of a model, for the checker: its mapping, the machines with their bindings, and the plan of the sources. */
import type { AddressSpace } from "../address-space/address-space";
import type { NodeKey } from "../address-space/node-id";
import type { WiredBinding, WiredMachine, WiredMapping, WiredSource, Wiring } from "../checks/wiring";
import type { DeviceDescription } from "../iodd/device-description";
import { listMachines } from "../instantiation/list-machines";
import { findMappedType, listBoundRoles, toMachineMapping } from "./bindings";
import { findConversion } from "./find-conversion";
import { listTargets } from "./list-targets";
import { listOwners, listParts } from "./mapping-entries";
import type { Mapping } from "./mapping";
import { planMapping } from "./plan-mapping";
import { runCheckCases } from "./run-check-cases";
import type { PortPlan, SourceAddress, SourceKind } from "./source-settings";
import { makeRoleLayouts, makeTargetRanges, readTypeMapping, toMapping } from "./type-mapping";

/** A source with the plan of its ports, as the organisation keeps it. */
export type PlannedSource = {
  readonly id: string;
  readonly name: string;
  readonly kind: SourceKind;
  readonly address: SourceAddress;
  readonly ports: readonly {
    readonly port: number;
    readonly plan: PortPlan | undefined;
    readonly device: { readonly name: string; readonly vendorId: number; readonly deviceId: number; readonly processDataBits?: number } | undefined;
  }[];
};

/** `sources` are those of the organisation; only those that a machine of the model binds to, or that have a fault of their own, are told. */
export function makeWiring(space: AddressSpace, sources: readonly PlannedSource[]): Wiring {
  const before = known.get(space);
  if (before?.sources === sources) return before.wiring;
  const wiring = makeAnew(space, sources);
  known.set(space, { sources, wiring });
  return wiring;
}

/** A model that stands still is asked again and again. */
const known = new WeakMap<AddressSpace, { readonly sources: readonly PlannedSource[]; readonly wiring: Wiring }>();

function makeAnew(space: AddressSpace, sources: readonly PlannedSource[]): Wiring {
  const types = [...new Set([...listOwners(space, "role"), ...listOwners(space, "row")])];
  const machines = listMachines(space).flatMap(({ key, name }) => makeMachine(space, key, name) ?? []);
  return {
    mappings: types.map((type) => makeMapping(space, type)),
    machines,
    sources: machines.length === 0 ? [] : sources.map(toWiredSource),
  };
}

function makeMapping(space: AddressSpace, type: NodeKey): WiredMapping {
  const mapping = toMapping(space, type);
  const node = space.getNode(type);
  const cases = runCheckCases(space, type);
  return {
    id: type,
    name: node?.browseName.name ?? type,
    type: node && type,
    mapping,
    targets: node ? listTargets(space, type) : [],
    lost: readTypeMapping(space, type).rows.flatMap((row) => (row.info ? [] : [row.path])),
    findLayout: makeRoleLayouts(space, type),
    problems: plan(space, type, mapping),
    cases: cases.ok ? cases.value : [],
  };
}

function plan(space: AddressSpace, type: NodeKey, mapping: Mapping) {
  const planned = planMapping(mapping, { findConversion, findLayout: makeRoleLayouts(space, type), findRanges: makeTargetRanges(space, type) });
  return planned.ok ? [] : planned.problems;
}

function makeMachine(space: AddressSpace, machine: NodeKey, name: string): WiredMachine | undefined {
  const type = findMappedType(space, machine);
  if (type === undefined) return undefined;
  const bindings = listBoundRoles(space, machine).map(({ role, value, binding }): WiredBinding => {
    const { vendorId, deviceId, portClass } = value;
    return {
      role,
      ...(vendorId === undefined || deviceId === undefined ? {} : { device: `${vendorId}/${deviceId}` }),
      ...(portClass === undefined ? {} : { portClass }),
      ...(binding === undefined ? {} : { sourceId: binding.sourceId }),
      ...(binding?.port === undefined ? {} : { port: binding.port }),
      ...(binding?.unitId === undefined ? {} : { unitId: binding.unitId }),
    };
  });
  const mapping = toMachineMapping(space, machine);
  const hasExceptions = listParts(space, "exception", machine).length > 0;
  return { id: machine, name, mappingId: type, bindings, problems: mapping && hasExceptions ? plan(space, type, mapping) : [] };
}

function toWiredSource({ id, name, kind, address, ports }: PlannedSource): WiredSource {
  return {
    id,
    name,
    kind,
    portCount: address.portCount ?? 0,
    ports: ports.flatMap(({ port, plan: planned, device }) =>
      planned
        ? [
            {
              number: port,
              portClass: planned.portClass,
              ...(device ? { device: `${device.vendorId}/${device.deviceId}`, deviceName: device.name } : {}),
              ...(device?.processDataBits === undefined ? {} : { processDataBits: device.processDataBits }),
            },
          ]
        : [],
    ),
  };
}

/** The longer direction of all layouts, in bits. */
export function countProcessDataBits({ processData }: DeviceDescription): number {
  return Math.max(0, ...processData.flatMap((p) => [p.in?.bitLength ?? 0, p.out?.bitLength ?? 0]));
}
