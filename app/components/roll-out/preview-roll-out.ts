/** What a roll-out would make and what the checker would say of it, before anything is made. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeId } from "~/domain/address-space/node-id";
import type { Finding } from "~/domain/checks/finding";
import { runChecks } from "~/domain/checks/run-checks";
import type { Problem } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import { IdStock } from "~/domain/editing/id-stock";
import { listMachines } from "~/domain/instantiation/list-machines";
import { rollOutMachines, type RollOutIntent } from "~/domain/instantiation/roll-out-machines";

export type RollOutPreview =
  | {
      readonly ok: true;
      readonly nodes: number;
      /** The machines by name; a NodeId from the block of numbers is not known before it is leased. */
      readonly machines: readonly { readonly name: string; readonly nodeId: string }[];
      readonly findings: readonly Finding[];
    }
  | { readonly ok: false; readonly problems: readonly Problem[] };

export function previewRollOut(space: AddressSpace, intent: RollOutIntent): RollOutPreview {
  const edit = rollOutMachines(space, IdStock.forTrial(space), intent);
  const after = edit.ok ? applyOperations(space, edit.value.operations) : edit;
  if (!edit.ok || !after.ok) return { ok: false, problems: after.problems };
  const findings = runChecks(after.value).filter((finding) => finding.key !== undefined && !space.getNode(finding.key));
  const known = new Set(listMachines(space).map(({ key }) => key));
  const machines = listMachines(after.value)
    .filter(({ key }) => !known.has(key))
    .map(({ key, name }) => ({ name, nodeId: formatGivenId(after.value.requireNode(key).nodeId) }));
  return { ok: true, nodes: after.value.own.nodes.size - space.own.nodes.size, machines, findings };
}

function formatGivenId({ type, identifier }: NodeId): string {
  return type === "i" ? "a number" : `${type}=${identifier}`;
}
