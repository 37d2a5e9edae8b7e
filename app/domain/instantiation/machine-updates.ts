/**
 * What a newer revision of the types means for machines, machine by machine. The consequences are those of any change of a
 * type (see consequences.ts); here they are sorted by the machine that they belong to and told in words.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findParent } from "../address-space/browse";
import { hasValueAttributes, type Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { formatTexts, formatValueText, nameOf } from "../compare/describe-facts";
import { listConsequences, type Consequence } from "./consequences";
import { listMachines } from "./list-machines";

export type MachineUpdate = { readonly machine: NodeKey; readonly consequences: readonly Consequence[] };

/** Both spaces hold the same machines on different revisions of their types. A machine that nothing touches is listed with none. */
export function listMachineUpdates(before: AddressSpace, after: AddressSpace): MachineUpdate[] {
  const byMachine = new Map<NodeKey, Consequence[]>(listMachines(before).map(({ key }) => [key, []]));
  for (const consequence of listConsequences(before, after)) {
    const at = consequence.kind === "missing-member" ? consequence.instance : consequence.node;
    findMachine(before, at, byMachine)?.push(consequence);
  }
  return [...byMachine].map(([machine, consequences]) => ({ machine, consequences }));
}

function findMachine<T>(space: AddressSpace, key: NodeKey, machines: ReadonlyMap<NodeKey, T>): T | undefined {
  const seen = new Set<NodeKey>();
  for (let at: NodeKey | undefined = key; at !== undefined && !seen.has(at); at = findParent(space, at)) {
    const found = machines.get(at);
    if (found !== undefined) return found;
    seen.add(at);
  }
  return undefined;
}

export type UpdateFact = {
  readonly kind: Consequence["kind"];
  /** Names below the machine, ` / ` between them. */
  readonly path: string;
  readonly attribute: string | undefined;
  readonly from: string | undefined;
  readonly to: string | undefined;
};

/** One consequence in words. `space` holds the machines on the newer revision. */
export function describeUpdate(space: AddressSpace, machine: NodeKey, consequence: Consequence): UpdateFact {
  const fact = { kind: consequence.kind, attribute: undefined, from: undefined, to: undefined };
  switch (consequence.kind) {
    case "missing-member": {
      const above = formatBelow(space, machine, consequence.instance);
      return { ...fact, path: [...above, ...consequence.path.map((name) => name.name)].join(" / ") };
    }
    case "removed-member":
      return { ...fact, path: formatBelow(space, machine, consequence.node).join(" / ") };
    case "renamed-member": {
      const path = formatBelow(space, machine, consequence.node).join(" / ");
      return { ...fact, path, from: consequence.from.name, to: consequence.to.name };
    }
    case "changed-attribute": {
      const { node, attribute, from, to } = consequence;
      const path = formatBelow(space, machine, node).join(" / ");
      const tell = (value: unknown): string | undefined => formatAttribute(space, space.getNode(node), attribute, value);
      return { ...fact, path, attribute, from: tell(from), to: tell(to) };
    }
  }
}

function formatBelow(space: AddressSpace, machine: NodeKey, key: NodeKey): string[] {
  const names: string[] = [];
  const seen = new Set<NodeKey>();
  for (let at: NodeKey | undefined = key; at !== undefined && at !== machine && !seen.has(at); at = findParent(space, at)) {
    seen.add(at);
    names.unshift(space.getNode(at)?.browseName.name ?? at);
  }
  return names;
}

function formatAttribute(space: AddressSpace, node: Node | undefined, attribute: string, value: unknown): string | undefined {
  if (value === undefined) return undefined;
  if (attribute === "dataType") return nameOf(space, value as NodeKey) ?? undefined;
  if (attribute === "displayName" || attribute === "description")
    return formatTexts(value as Node["displayName"]) ?? undefined;
  if (attribute === "value" && node && hasValueAttributes(node))
    return formatValueText({ ...node, value: value as NonNullable<typeof node.value> }) ?? undefined;
  return String(value);
}
