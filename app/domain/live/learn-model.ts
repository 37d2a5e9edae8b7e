/**
 * A model out of what a live server has in one namespace: for old machines whose server nobody documented. What the
 * process says at the moment is no part of a model; what leads to nodes that are nowhere described is left out and told.
 */
import { AddressSpace, buildLayer, type Layer } from "../address-space/address-space";
import type { ModelEntry, ModelHeader } from "../address-space/model-header";
import type { DeclaredReference, Node } from "../address-space/node";
import { OPC_UA_NAMESPACE, type NodeKey } from "../address-space/node-id";
import { StandardReferenceType } from "../address-space/standard-ids";
import { collectSubtypes } from "../address-space/type-hierarchy";
import type { ServedModel } from "../as-built/as-built";
import { fail, ok, problem, type Problem, type Result } from "../core/result";

export type LearnIntent = {
  readonly namespaceUri: string;
  /** What the server says of its namespaces. */
  readonly served: readonly ServedModel[];
  /** What is known of them here, the base model first. */
  readonly layers: readonly Layer[];
  /** ISO 8601, UTC: the publication date where the server tells none. */
  readonly now: string;
};

const FIRST_VERSION = "1.0.0";

/** Problems: `learn.empty` when the namespace has no nodes; warning `learn.left-out` with the count of references. */
export function learnModel(nodes: readonly Node[], intent: LearnIntent): Result<{ header: ModelHeader; nodes: readonly Node[] }> {
  const own = nodes.filter((node) => node.nodeId.namespaceUri === intent.namespaceUri);
  if (own.length === 0) return fail(problem("learn.empty", { namespaceUri: intent.namespaceUri }));
  const space = AddressSpace.of(intent.layers, buildLayer({ namespaceUris: [intent.namespaceUri], models: [] }, own));
  const properties = listProperties(space, own);
  const used = new Set<string>([OPC_UA_NAMESPACE]);
  const note = (key: NodeKey): boolean => {
    const uri = space.getNode(key)?.nodeId.namespaceUri;
    if (uri !== undefined) used.add(uri);
    return uri !== undefined;
  };
  let leftOut = 0;
  const keep = (reference: DeclaredReference): boolean => {
    const isKnown = note(reference.type) && note(reference.target);
    if (!isKnown) leftOut++;
    return isKnown;
  };
  const learnt = own.map((node): Node => {
    const { value, ...rest } = node as Node & { value?: unknown };
    if ("dataType" in node && node.dataType !== undefined) note(node.dataType);
    const isHeld = node.nodeClass !== "Variable" || properties.has(node.key);
    return { ...rest, ...(isHeld && value !== undefined ? { value } : {}), references: node.references.filter(keep) } as Node;
  });
  const problems: Problem[] = leftOut > 0 ? [problem.warning("learn.left-out", { count: leftOut })] : [];
  return ok({ header: makeHeader(intent, used), nodes: learnt }, problems);
}

/** Properties describe, so their values are kept; those of other Variables belong to the moment. */
function listProperties(space: AddressSpace, own: readonly Node[]): ReadonlySet<NodeKey> {
  const types = collectSubtypes(space, StandardReferenceType.HasProperty);
  const properties = new Set<NodeKey>();
  for (const { key, references } of own) {
    for (const { type, target, isForward } of references) {
      if (type === StandardReferenceType.HasProperty || types.has(type)) properties.add(isForward ? target : key);
    }
  }
  return properties;
}

function makeHeader({ namespaceUri, served, layers, now }: LearnIntent, used: ReadonlySet<string>): ModelHeader {
  const required = [...used].filter((uri) => uri !== namespaceUri);
  const told = served.find((model) => model.modelUri === namespaceUri);
  const entry: ModelEntry = {
    modelUri: namespaceUri,
    version: told?.version ?? FIRST_VERSION,
    publicationDate: told?.publicationDate ?? now,
    requiredModels: required.map((uri): ModelEntry => ({ modelUri: uri, ...findVersion(uri, served, layers), requiredModels: [] })),
  };
  return { namespaceUris: [namespaceUri, ...required.filter((uri) => uri !== OPC_UA_NAMESPACE)], models: [entry] };
}

/** As the server tells it, else as it is known here. */
function findVersion(uri: string, served: readonly ServedModel[], layers: readonly Layer[]): Pick<ModelEntry, "version" | "publicationDate"> {
  const told = served.find((model) => model.modelUri === uri && model.version !== undefined && model.publicationDate !== undefined);
  const known = layers.map((layer) => layer.header.models[0]).find((model) => model?.modelUri === uri);
  const { version, publicationDate } = told ?? known ?? {};
  return { ...(version === undefined ? {} : { version }), ...(publicationDate === undefined ? {} : { publicationDate }) };
}
