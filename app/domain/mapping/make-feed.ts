/** From a model of machines to what feeding them needs: specs for the running mappings and the readings of the sources. */
import type { AddressSpace } from "../address-space/address-space";
import { getDataType } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import type { Direction } from "../iodd/device-description";
import { listMachines } from "../instantiation/list-machines";
import { findBuiltInType } from "../simulation/find-built-in-type";
import type { BuiltInType } from "../simulation/motion";
import { findMappedType, listBoundRoles, toMachineMapping } from "./bindings";
import type { FedMachineSpec } from "./fed-machine";
import { findMachineNode, findTargetByPath } from "./list-targets";
import { listParts } from "./mapping-entries";
import type { PlannedSource } from "./make-wiring";
import { planReadings, type FedMachine, type PlannedReading } from "./plan-readings";
import type { TargetRanges } from "./row-quality";

export type FedNode = { readonly target: string; readonly nodeId: string; readonly builtInType: BuiltInType };

export type MachineFeed = FedMachineSpec & { readonly nodes: readonly FedNode[] };

export type Feed = { readonly machines: readonly MachineFeed[]; readonly readings: readonly PlannedReading[] };

/** All machines of the model whose type has a mapping. */
export function makeFeed(space: AddressSpace, sources: readonly PlannedSource[]): Feed {
  const machines: MachineFeed[] = [];
  const fed: FedMachine[] = [];
  for (const { key, name } of listMachines(space)) {
    const type = findMappedType(space, key);
    const mapping = toMachineMapping(space, key);
    if (type === undefined || !mapping) continue;
    const bindings = new Map(
      listBoundRoles(space, key).flatMap(({ role, binding }) => {
        const source = sources.find((s) => s.id === binding?.sourceId);
        return binding && source ? [[role, { binding, kind: source.kind }] as const] : [];
      }),
    );
    const unbound = mapping.roles.flatMap(({ role }) => (bindings.has(role) ? [] : [role]));
    fed.push({ machine: name, mapping, bindings });
    machines.push({ machine: name, mapping, unbound, ...describeType(space, type, key, mapping.rows.map((r) => r.target)) });
  }
  return { machines, readings: planReadings(fed).readings };
}

function describeType(space: AddressSpace, type: NodeKey, machine: NodeKey, targets: readonly string[]): Pick<MachineFeed, "layouts" | "ranges" | "nodes"> {
  const layouts = listParts(space, "role", type).flatMap(({ id: role, value }) =>
    (["in", "out"] satisfies Direction[]).flatMap((direction) => {
      const image = value.layouts?.[direction];
      return image ? [{ role, direction, image, profileCharacteristic: value.profileCharacteristic ?? [] }] : [];
    }),
  );
  const ranges: Record<string, TargetRanges> = {};
  const nodes: FedNode[] = [];
  for (const path of targets) {
    const target = findTargetByPath(space, type, path);
    const node = target && findMachineNode(space, machine, target);
    if (!target || node?.nodeClass !== "Variable") continue;
    const { range, instrumentRange } = target;
    if (range || instrumentRange) ranges[path] = { ...(range ? { range } : {}), ...(instrumentRange ? { instrumentRange } : {}) };
    nodes.push({ target: path, nodeId: formatNodeId(node.nodeId), builtInType: findBuiltInType(space, getDataType(node)) });
  }
  return { layouts, ranges, nodes };
}
