/**
 * `setModelInfo`: version and publication date of the model, in the Models row and in the namespace metadata Object at once
 * (OPC 10000-5 §6.3.13). `setRequiredModels`: the required models and with them the namespace table.
 */
import type { AddressSpace } from "../../address-space/address-space";
import { listDeclaredEdges } from "../../address-space/edge-index";
import type { ModelEntry } from "../../address-space/model-header";
import type { Node } from "../../address-space/node";
import { OPC_UA_NAMESPACE, parseNodeKey, type NodeKey } from "../../address-space/node-id";
import { problem, type Result } from "../../core/result";
import { EditDraft, type CommandContext, type Edit } from "../edit-draft";
import { toRequiredRow, updateMetadata } from "./create-model";

export type SetModelInfoIntent = {
  readonly version?: string;
  readonly publicationDate?: string;
  readonly modelVersion?: string;
};

/** Problem: `model.no-row`. */
export function setModelInfo(space: AddressSpace, context: CommandContext, intent: SetModelInfoIntent): Result<Edit> {
  const draft = new EditDraft(space, context);
  const [row, ...others] = space.own.header.models;
  if (!row) draft.fail(problem("model.no-row"));
  else {
    const given = Object.fromEntries(Object.entries(intent).filter(([, value]) => value !== undefined));
    draft.do({ kind: "setHeader", field: "models", value: [{ ...row, ...given }, ...others] });
    updateMetadata(draft);
  }
  return draft.finish();
}

export type SetRequiredModelsIntent = { readonly requiredModels: readonly ModelEntry[] };

/** Problems: `model.no-row`, `model.required-in-use` (data: uri, count) where a model that nodes use would go. */
export function setRequiredModels(
  space: AddressSpace,
  context: CommandContext,
  intent: SetRequiredModelsIntent,
): Result<Edit> {
  const draft = new EditDraft(space, context);
  const { models, namespaceUris } = space.own.header;
  const [row, ...others] = models;
  if (!row) {
    draft.fail(problem("model.no-row"));
    return draft.finish();
  }
  const wanted = new Set(intent.requiredModels.map((m) => m.modelUri));
  const gone = row.requiredModels.map((m) => m.modelUri).filter((uri) => !wanted.has(uri));
  for (const uri of gone) {
    const count = countUses(space, uri);
    if (count > 0) draft.fail(problem("model.required-in-use", { uri, count }));
  }
  draft.do({
    kind: "setHeader",
    field: "models",
    value: [{ ...row, requiredModels: intent.requiredModels.map(toRequiredRow) }, ...others],
  });
  const kept = namespaceUris.filter((uri) => !gone.includes(uri));
  const added = [...wanted].filter((uri) => uri !== OPC_UA_NAMESPACE && !kept.includes(uri));
  draft.do({ kind: "setHeader", field: "namespaceUris", value: [...kept, ...added] });
  return draft.finish();
}

/** Own nodes that name something of the namespace. */
function countUses(space: AddressSpace, uri: string): number {
  let count = 0;
  for (const node of space.own.nodes.values()) if (listNamespaces(space, node).has(uri)) count++;
  return count;
}

function listNamespaces(space: AddressSpace, node: Node): ReadonlySet<string> {
  const keys = new Set<NodeKey>();
  for (const edge of listDeclaredEdges(node)) for (const key of [edge.source, edge.type, edge.target]) keys.add(key);
  if ("dataType" in node && node.dataType !== undefined) keys.add(node.dataType);
  if (node.nodeClass === "DataType")
    for (const field of node.definition?.fields ?? []) if (field.dataType !== undefined) keys.add(field.dataType);
  const uris = new Set([node.browseName.namespaceUri]);
  for (const key of keys) uris.add((space.getNode(key)?.nodeId ?? parseNodeKey(key)).namespaceUri);
  return uris;
}
