/**
 * `renameNode`: BrowseName, and with it what says the same: the DisplayName in every locale that repeated the old name,
 * the SymbolicName where the name cannot serve as one, the Name of a DataType's Definition (OPC 10000-6 §F.12).
 */
import type { AddressSpace } from "../../address-space/address-space";
import { findParent } from "../../address-space/browse";
import { isTypeNode, type Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";
import { qualifiedName } from "../../address-space/qualified-name";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { checkName, checkSiblingName, checkTypeName } from "../names";
import { toSymbolicName } from "../symbolic-name";

export type RenameNodeIntent = { readonly node: NodeKey; readonly name: string; readonly namespaceUri?: string };

/** Problems: `name.*`, `operation.node-missing`, `operation.node-foreign`. */
export function renameNode(space: AddressSpace, context: CommandContext, intent: RenameNodeIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const node = space.getNode(intent.node);
  // A name that another namespace defines stays its own; a new name is one of this model.
  const isSameName = node?.browseName.name === intent.name;
  const namespaceUri = intent.namespaceUri ?? (isSameName ? node.browseName.namespaceUri : draft.ownNamespace);
  const browseName = qualifiedName(namespaceUri, intent.name);
  const found = node
    ? (checkName(intent.name) ?? checkTaken(space, node, browseName))
    : problem("operation.node-missing", { node: intent.node }, { node: intent.node });
  if (found) draft.fail(found);
  else if (node) rename(draft, node, browseName);
  return draft.finish();
}

function checkTaken(space: AddressSpace, node: Node, browseName: Node["browseName"]): ReturnType<typeof checkName> {
  if (isTypeNode(node)) return checkTypeName(space, browseName, node.key);
  const parent = findParent(space, node.key);
  return parent === undefined ? undefined : checkSiblingName(space, parent, browseName, node.key);
}

function rename(draft: EditDraft, node: Node, browseName: Node["browseName"]): void {
  const oldName = node.browseName.name;
  draft.set(node.key, "browseName", browseName);
  const displayName = node.displayName.map((text) =>
    text.text === oldName ? { ...text, text: browseName.name } : text,
  );
  draft.set(node.key, "displayName", displayName);
  const hadMadeName = node.symbolicName === undefined || node.symbolicName === toSymbolicName(oldName);
  if (hadMadeName) draft.set(node.key, "symbolicName", toSymbolicName(browseName.name));
  if (node.nodeClass === "DataType" && node.definition) {
    draft.set(node.key, "definition", { ...node.definition, name: browseName });
  }
}
