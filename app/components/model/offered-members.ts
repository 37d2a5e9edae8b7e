/** Which optional members a new instance could have, asked before it exists: it is made on a scratch copy of the model. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import { numericNodeId, type NodeKey } from "~/domain/address-space/node-id";
import { ok } from "~/domain/core/result";
import type { NodeIdAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { addObject, addVariable } from "~/domain/editing/commands/add-member";
import { listOfferedMembers } from "~/domain/instantiation/missing-members";

/** `path` holds the plain names joined by `/`, as commands take it. */
export type OfferedMember = { readonly path: string; readonly isPlaceholder: boolean };

export type InstancePreview = { readonly offered: readonly OfferedMember[]; readonly mandatory: readonly string[] };

const SCRATCH_IDS = 3_000_000_000;
const MOST = 400;

/** What an instance of the type below the parent gets by itself, and what could be chosen beside it. Undefined where none can be made. */
export function previewInstance(space: AddressSpace, parent: NodeKey, type: NodeKey, chosen: readonly string[]): InstancePreview | undefined {
  const namespaceUri = getOwnNamespace(space.own.header);
  let next = SCRATCH_IDS;
  const scratch: NodeIdAllocator = { allocate: () => ok(numericNodeId(namespaceUri, next++)) };
  const intent = { parent, name: "…", typeDefinition: type, optional: chosen };
  const edit = space.getNode(type)?.nodeClass === "VariableType" ? addVariable(space, scratch, intent) : addObject(space, scratch, intent);
  if (!edit.ok) return undefined;
  const made = edit.value.made[0];
  const after = applyOperations(space, edit.value.operations);
  if (!after.ok || made === undefined) return undefined;
  const isDetail = (owner: NodeKey): boolean => owner !== made && after.value.getNode(owner)?.nodeClass === "Variable";
  const offered = listOfferedMembers(after.value, made).filter((member) => !isDetail(member.parent)).slice(0, MOST);
  return {
    mandatory: edit.value.made.slice(1).map((key) => after.value.requireNode(key).browseName.name),
    offered: offered.map((member) => ({
      path: member.path.map((name) => name.name).join("/"),
      isPlaceholder: member.isPlaceholder,
    })),
  };
}
