/** Another type for an Object or Variable that exists: its reference, its mandatory members, and what a Variable's type fixes. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findTypeDefinition } from "~/domain/address-space/browse";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardReferenceType } from "~/domain/address-space/standard-ids";
import type { Result } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import { EditDraft, type CommandContext, type Edit } from "~/domain/editing/edit-draft";
import { addDeclaredMembers } from "~/domain/instantiation/instantiate";

export type SetTypeDefinitionIntent = { readonly node: NodeKey; readonly type: NodeKey };

/** Members that the old type gave stay: whether they still make sense is the engineer's decision, and the checker tells. */
export function setTypeDefinition(space: AddressSpace, context: CommandContext, { node, type }: SetTypeDefinitionIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const { HasTypeDefinition } = StandardReferenceType;
  const old = findTypeDefinition(space, node);
  if (old === type) return draft.finish();
  if (old !== undefined) draft.removeReference({ source: node, type: HasTypeDefinition, target: old });
  draft.addReference({ source: node, type: HasTypeDefinition, target: type }, "source");
  const changed = draft.finish();
  if (!changed.ok) return changed;
  const applied = applyOperations(space, changed.value.operations);
  if (!applied.ok) return applied;
  const completed = addDeclaredMembers(applied.value, context, { instance: node, includeMissing: true });
  if (!completed.ok) return completed;
  return { ...completed, value: { operations: [...changed.value.operations, ...completed.value.operations], made: completed.value.made } };
}
