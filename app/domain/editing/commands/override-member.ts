/**
 * `overrideMember`: copies an inherited instance declaration into a subtype, so that it can be changed there (OPC 10000-3
 * §6.3.3.3). Every declaration on the way is copied too, since a nested one is overridden only through its parent.
 */
import type { AddressSpace } from "../../address-space/address-space";
import { listEdgesFrom } from "../../address-space/browse";
import {
  listInstanceDeclarations,
  toPathKey,
  type InstanceDeclaration,
} from "../../address-space/instance-declarations";
import type { DeclaredReference } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { isSameQualifiedName } from "../../address-space/qualified-name";
import { StandardReferenceType } from "../../address-space/standard-ids";
import { problem, type Result } from "../../core/result";
import { copyAttributes } from "../../instantiation/copy-attributes";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";

const R = StandardReferenceType;

export type OverrideMemberIntent = {
  readonly type: NodeKey;
  /** Browse path below the type: a key of `toPathKey`, or plain names joined by `/`. */
  readonly path: string;
};

/** The last of `made` is the override. Problems: `override.no-such-member`, `override.exists`, `operation.*`. */
export function overrideMember(
  space: AddressSpace,
  context: CommandContext,
  intent: OverrideMemberIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  const table = listInstanceDeclarations(space, intent.type);
  const row = findRow(table, intent.path);
  if (!row) draft.fail(problem("override.no-such-member", { path: intent.path }, { node: intent.type }));
  else override(draft, intent.type, row, table);
  return draft.finish();
}

function findRow(table: ReadonlyMap<string, InstanceDeclaration>, path: string): InstanceDeclaration | undefined {
  const exact = table.get(path);
  if (exact) return exact;
  for (const row of table.values()) if (row.path.map((n) => n.name).join("/") === path) return row;
  return undefined;
}

function override(
  draft: EditDraft,
  type: NodeKey,
  row: InstanceDeclaration,
  table: ReadonlyMap<string, InstanceDeclaration>,
): void {
  let parent = type;
  let isNew = false;
  for (let length = 1; length <= row.path.length; length++) {
    const step = table.get(toPathKey(row.path.slice(0, length)));
    if (!step) return;
    const own = findDirect(draft.space, parent, step);
    isNew = own === undefined;
    const next = own ?? addCopy(draft, parent, step);
    if (next === undefined) return;
    parent = next;
  }
  if (!isNew) draft.fail(problem("override.exists", { name: row.browseName.name }, { node: parent }));
}

function findDirect(space: AddressSpace, parent: NodeKey, step: InstanceDeclaration): NodeKey | undefined {
  return listEdgesFrom(space, parent, R.HierarchicalReferences)
    .map((e) => space.getNode(e.target))
    .find((n) => n && n.nodeClass === step.node.nodeClass && isSameQualifiedName(n.browseName, step.browseName))?.key;
}

function addCopy(draft: EditDraft, parent: NodeKey, step: InstanceDeclaration): NodeKey | undefined {
  const references: DeclaredReference[] = step.referenceTypes.map((type) => ({
    type,
    target: parent,
    isForward: false,
  }));
  if (step.typeDefinition !== undefined)
    references.push({ type: R.HasTypeDefinition, target: step.typeDefinition, isForward: true });
  references.push({ type: R.HasModellingRule, target: step.rule, isForward: true });
  // An override is a declaration itself, it has no MethodDeclarationId (OPC 10000-6 §F.9).
  const attributes = { ...copyAttributes(draft.space, step), methodDeclaration: undefined, parent };
  return draft.add({
    nodeClass: step.node.nodeClass,
    browseName: step.browseName,
    displayName: step.node.displayName,
    ...(step.node.description ? { description: step.node.description } : {}),
    references,
    attributes,
  });
}
