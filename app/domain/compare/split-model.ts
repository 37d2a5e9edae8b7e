/**
 * Moves types of a model into a namespace of their own. They become nodes of a new model with new NodeIds, the old model
 * requires the new one and names its nodes where it named the old ones. For readers this is as breaking as a removal
 * (OPC 10000-3 §5.2.2), which the comparison then says.
 */
import { AddressSpace, buildLayer } from "../address-space/address-space";
import { findParent, getPath, listChildren, listEdgesFrom } from "../address-space/browse";
import type { ModelEntry } from "../address-space/model-header";
import { isTypeNode, type DeclaredReference, type Node } from "../address-space/node";
import { formatNodeId, OPC_UA_NAMESPACE, toNodeKey, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { BlockAllocator } from "../editing/allocate-node-id";
import { createModel, toRequiredRow, type ModelContent } from "../editing/commands/create-model";
import type { Operation } from "../editing/operation";
import { listMentions } from "./merge/merge-presence";
import { toState } from "./merge/model-state";
import { listStateOperations } from "./merge/state-operations";

export type SplitIntent = {
  /** Types of the own model; what belongs to them goes along. */
  readonly types: readonly NodeKey[];
  readonly namespaceUri: string;
  readonly version: string;
  /** ISO 8601 with zone. */
  readonly publicationDate: string;
};

export type SplitModel = {
  readonly content: ModelContent;
  /** For the model that is left, once the new one can be required. */
  readonly operations: readonly Operation[];
  readonly moved: number;
};

/** The namespace's metadata takes the first identifiers of the new model. */
const FIRST_METADATA_ID = 1;
const LAST_METADATA_ID = 64;

/** Problems: `split.nothing`, `split.depends-on-rest` (each use of a node that stays), `split.uri`, those of `createModel`. */
export function splitModel(space: AddressSpace, intent: SplitIntent): Result<SplitModel> {
  const part = collectPart(space, intent.types);
  if (part.size === 0) return fail(problem("split.nothing"));
  if (space.layers.some((l) => l.header.models.some((m) => m.modelUri === intent.namespaceUri))) {
    return fail(problem("split.uri", { uri: intent.namespaceUri }));
  }
  const needs = listNeedsOfRest(space, part);
  if (needs.length > 0) return fail(...needs);
  const keys = new Map<NodeKey, NodeKey>();
  for (const key of part)
    keys.set(key, toNodeKey({ ...space.requireNode(key).nodeId, namespaceUri: intent.namespaceUri }));
  const made = makeModel(space, intent);
  if (!made.ok)
    return made.problems.some((p) => p.code === "model.uri")
      ? fail(problem("split.uri", { uri: intent.namespaceUri }))
      : made;
  const content: ModelContent = {
    header: made.value.header,
    nodes: [...made.value.nodes, ...movePart(space, part, keys, intent.namespaceUri, made.value.nodes.length)],
  };
  return ok({ content, operations: listRestOperations(space, part, keys, content), moved: part.size });
}

/** The types with members, encodings and all below. */
function collectPart(space: AddressSpace, types: readonly NodeKey[]): Set<NodeKey> {
  const part = new Set(types.filter((key) => space.isOwn(key) && isTypeNode(space.requireNode(key))));
  for (const key of part) {
    const encodings = listEdgesFrom(space, key, StandardReferenceType.HasEncoding).map((e) => e.target);
    for (const below of [...listChildren(space, key).map((n) => n.key), ...encodings])
      if (space.isOwn(below)) part.add(below);
  }
  return part;
}

function listNeedsOfRest(space: AddressSpace, part: ReadonlySet<NodeKey>): Problem[] {
  const problems: Problem[] = [];
  for (const key of part) {
    const node = space.requireNode(key);
    const isFromAbove = (other: NodeKey): boolean => isNamedFromAbove(node, other);
    for (const other of new Set(listMentions(node))) {
      if (!space.isOwn(other) || part.has(other) || isFromAbove(other)) continue;
      problems.push(
        problem("split.depends-on-rest", { path: getPath(space, key), other: getPath(space, other) }, { node: key }),
      );
    }
  }
  return problems;
}

/** A subtype or member that stays names its owner too; a reference from it to the part is no need of the part. */
function isNamedFromAbove(node: Node, other: NodeKey): boolean {
  const references = node.references.filter((r) => r.target === other);
  return references.length > 0 && references.every((r) => r.type === StandardReferenceType.HasSubtype && r.isForward);
}

function makeModel(space: AddressSpace, { namespaceUri, version, publicationDate }: SplitIntent): Result<ModelContent> {
  const required = (space.own.header.models[0]?.requiredModels ?? []).map(toRequiredRow);
  const ids = new BlockAllocator(namespaceUri, [{ from: FIRST_METADATA_ID, to: LAST_METADATA_ID }]);
  return createModel(space.layers.slice(0, -1), ids, {
    namespaceUri,
    version,
    publicationDate,
    requiredModels: required,
  });
}

type Renaming = ReadonlyMap<NodeKey, NodeKey>;

function movePart(
  space: AddressSpace,
  part: ReadonlySet<NodeKey>,
  keys: Renaming,
  namespaceUri: string,
  firstOrder: number,
): Node[] {
  const own = space.own.header.models[0]?.modelUri;
  return space
    .listOwnNodes()
    .filter((node) => part.has(node.key))
    .map((node, i) => {
      const references = node.references.filter((r) => part.has(r.target) || !space.isOwn(r.target));
      const renamed = renameIn({ ...node, references }, keys);
      const browseName = node.browseName.namespaceUri === own ? { ...node.browseName, namespaceUri } : node.browseName;
      const nodeId = { ...node.nodeId, namespaceUri };
      return { ...renamed, key: toNodeKey(nodeId), nodeId, browseName, order: firstOrder + i } as Node;
    });
}

/** The node with every name of a moved node replaced. Values name nodes by their NodeId, which is the key of the new node. */
function renameIn(node: Node, keys: Renaming): Node {
  const to = (key: NodeKey): NodeKey => keys.get(key) ?? key;
  const references = node.references.map((r): DeclaredReference => ({ ...r, type: to(r.type), target: to(r.target) }));
  const changed: Record<string, unknown> = { ...node, references };
  for (const name of ["dataType", "parent", "methodDeclaration"]) {
    const value = changed[name];
    if (typeof value === "string") changed[name] = to(value as NodeKey);
  }
  if ("value" in node && node.value) changed["value"] = { ...node.value, xml: renameInXml(node.value.xml, keys) };
  if (node.nodeClass === "DataType" && node.definition) {
    const fields = node.definition.fields.map((f) =>
      f.dataType === undefined ? f : { ...f, dataType: to(f.dataType) },
    );
    changed["definition"] = { ...node.definition, fields };
  }
  return changed as unknown as Node;
}

function renameInXml(xml: string, keys: Renaming): string {
  return xml.replace(
    /(<(?:\w+:)?Identifier>\s*)([^<]+?)(\s*<)/g,
    (whole, before: string, id: string, after: string) => {
      const renamed = keys.get(id as NodeKey);
      return renamed === undefined ? whole : `${before}${renamed}${after}`;
    },
  );
}

/** The rest of the model without the part, naming the new nodes, on the new required model. */
function listRestOperations(
  space: AddressSpace,
  part: ReadonlySet<NodeKey>,
  keys: Renaming,
  content: ModelContent,
): Operation[] {
  const nodes = new Map<NodeKey, Node>();
  for (const node of toState(space).nodes.values()) {
    if (part.has(node.key)) continue;
    const renamed = renameIn(node, keys);
    const owner = findParent(space, node.key);
    const isHeldByPart = owner !== undefined && part.has(owner) && !node.references.some((r) => r.target === owner);
    const references = isHeldByPart
      ? [...renamed.references, toOwner(space, node.key, keys.get(owner) as NodeKey, owner)]
      : renamed.references;
    nodes.set(node.key, { ...renamed, references });
  }
  const { header } = space.own;
  const [row, ...others] = header.models;
  const entry = content.header.models[0] as ModelEntry;
  const models = row
    ? [{ ...row, requiredModels: [...row.requiredModels, toRequiredRow(entry)] }, ...others]
    : header.models;
  const namespaceUris = [...header.namespaceUris, entry.modelUri];
  const required = [...space.layers.slice(0, -1), buildLayer(content.header, content.nodes)];
  return listStateOperations(AddressSpace.of(required, space.own), {
    header: { ...header, models, namespaceUris },
    nodes,
    mapping: toState(space).mapping,
  });
}

/** The reference by which the part held a node that stays, declared at the node from now on. */
function toOwner(space: AddressSpace, key: NodeKey, target: NodeKey, owner: NodeKey): DeclaredReference {
  const edge = space.edgesTo(key).find((e) => e.source === owner);
  return { type: edge?.type ?? StandardReferenceType.HasSubtype, target, isForward: false };
}

/** Whether the types can be told apart from the rest: for a screen that offers them. */
export function listSplittableTypes(
  space: AddressSpace,
): { readonly key: NodeKey; readonly nodeId: string; readonly name: string }[] {
  return space
    .listOwnNodes()
    .filter(isTypeNode)
    .filter((node) => node.nodeId.namespaceUri !== OPC_UA_NAMESPACE)
    .map((node) => ({ key: node.key, nodeId: formatNodeId(node.nodeId), name: node.browseName.name }));
}
