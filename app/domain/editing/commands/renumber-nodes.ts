/**
 * `renumberNodes`: gives nodes other NodeIds, all at once, so that two can exchange theirs. References, owners and Method
 * declarations name keys and need no change; NodeIds inside values (DataTypes of arguments, values of type NodeId, TypeIds
 * of structures) are rewritten in the same transaction, whose operations and inverse are the record of old and new. The
 * old NodeIds stay given for ever.
 */
import type { AddressSpace } from "../../address-space/address-space";
import { hasValueAttributes, type XmlText } from "../../address-space/node";
import { formatNodeId, toNodeKey, type NodeId, type NodeKey } from "../../address-space/node-id";
import { problem, type Result } from "../../core/result";
import { escapeText } from "../../nodeset/xml/escape";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";

export type Renumbering = { readonly node: NodeKey; readonly nodeId: NodeId };
export type RenumberNodesIntent = { readonly changes: readonly Renumbering[] };

/** Problems: `operation.node-id-taken`, `operation.node-missing`, `operation.node-foreign`, `renumber.namespace`. */
export function renumberNodes(space: AddressSpace, context: CommandContext, intent: RenumberNodesIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const moving = new Set(intent.changes.map((change) => change.node));
  const renamed = new Map<string, string>();
  const changes: { key: NodeKey; nodeId: NodeId }[] = [];
  for (const { node, nodeId } of intent.changes) {
    if (nodeId.namespaceUri !== draft.ownNamespace)
      draft.fail(problem("renumber.namespace", { uri: nodeId.namespaceUri }, { node }));
    const old = space.getNode(node)?.nodeId;
    if (old && formatNodeId(old) === formatNodeId(nodeId)) continue;
    if (old) renamed.set(formatNodeId(old), formatNodeId(nodeId));
    // The id by which a node was first seen stays its own, unless it takes part in the exchange.
    const first = space.getNode(toNodeKey(nodeId));
    if (first && first.key !== node && !moving.has(first.key))
      draft.fail(problem("operation.node-id-taken", { nodeId: formatNodeId(nodeId) }, { node }));
    changes.push({ key: node, nodeId });
  }
  if (changes.length > 0) draft.do({ kind: "renumber", changes });
  if (renamed.size > 0) rewriteValues(draft, renamed);
  return draft.finish();
}

function rewriteValues(draft: EditDraft, renamed: ReadonlyMap<string, string>): void {
  for (const node of draft.space.listOwnNodes()) {
    if (!hasValueAttributes(node) || !node.value) continue;
    const value = rewriteIdentifiers(node.value, renamed);
    if (value !== node.value) draft.set(node.key, "value", value);
  }
}

const IDENTIFIER = /(<((?:[\w.-]+:)?Identifier)(?:\s[^<>]*)?>)([^<]*)(<\/\2\s*>)/g;

/** The value with NodeIds replaced; the same object where none occurs. */
export function rewriteIdentifiers(value: XmlText, renamed: ReadonlyMap<string, string>): XmlText {
  const escaped = new Map([...renamed].map(([from, to]) => [escapeText(from), escapeText(to)]));
  let isChanged = false;
  const xml = value.xml.replace(IDENTIFIER, (whole, open: string, _name: string, text: string, close: string) => {
    const to = escaped.get(text.trim());
    if (to === undefined) return whole;
    isChanged = true;
    return `${open}${to}${close}`;
  });
  return isChanged ? { ...value, xml } : value;
}
