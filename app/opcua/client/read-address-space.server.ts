/**
 * The nodes that a live server has in chosen namespaces, as nodes of the domain: to be learnt as a model, or compared with
 * what was released. A server tells less than a file: one language, no symbolic names, no modeller's notes.
 */
import { AttributeIds, type ClientSession, type DataTypeDefinition as WireDefinition, type DataValue, NodeClass as WireNodeClass, type LocalizedText, type NodeId } from "node-opcua";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { ModelHeader } from "~/domain/address-space/model-header";
import type { DataTypeDefinition, DataTypeField, DeclaredReference, Node, NodeClass } from "~/domain/address-space/node";
import { OPC_UA_NAMESPACE, type NodeKey, toNodeKey } from "~/domain/address-space/node-id";
import type { QualifiedName } from "~/domain/address-space/qualified-name";
import { StandardReferenceType } from "~/domain/address-space/standard-ids";
import { ok, problem, type Problem, type Result } from "~/domain/core/result";
import { SpaceDataTypes } from "~/domain/nodeset/values/data-type-shapes";
import { writeValue } from "~/domain/nodeset/values/write-value";
import { crawl, readInPortions, type Crawl, type CrawledNode } from "./crawl.server";
import type { EndpointClient } from "./endpoint-client.server";
import { fromWireVariant, toDomainNodeId, toDomainQualifiedName, toDomainText, type WireContext } from "./wire-variant";

export type ReadAddressSpaceOptions = {
  /** URIs of the namespaces to read; all but namespace 0 when absent. */
  readonly namespaceUris?: readonly string[];
  /** Layers beneath, for the structures that values hold. */
  readonly layers: readonly Layer[];
  readonly maxNodes?: number;
  readonly onProgress?: (progress: { readonly stage: "browse" | "read"; readonly done: number; readonly found: number }) => void;
  readonly shouldStop?: () => boolean;
};

export type LiveAddressSpace = {
  /** The server's own table, index 0 first. */
  readonly namespaceUris: readonly string[];
  readonly nodes: readonly Node[];
  readonly isComplete: boolean;
};

const MAX_NODES = 500_000;

/** Attributes by class, beside the names that browsing answers. */
const ATTRIBUTES: Readonly<Record<NodeClass, readonly (keyof typeof AttributeIds)[]>> = {
  Object: ["Description", "EventNotifier"],
  Variable: ["Description", "Value", "DataType", "ValueRank", "ArrayDimensions", "AccessLevel", "MinimumSamplingInterval", "Historizing"],
  Method: ["Description", "Executable"],
  View: ["Description", "EventNotifier", "ContainsNoLoops"],
  ObjectType: ["Description", "IsAbstract"],
  VariableType: ["Description", "IsAbstract", "Value", "DataType", "ValueRank", "ArrayDimensions"],
  DataType: ["Description", "IsAbstract", "DataTypeDefinition"],
  ReferenceType: ["Description", "IsAbstract", "Symmetric", "InverseName"],
};

/** Problems (warnings): `endpoint.walk-cut` when a limit ended it, `endpoint.value-unreadable` with the count of values that could not be taken over. */
export async function readAddressSpace(client: EndpointClient, options: ReadAddressSpaceOptions): Promise<Result<LiveAddressSpace>> {
  const release = client.hold();
  try {
    const { session, namespaces } = await client.use((session, namespaces) => Promise.resolve({ session, namespaces }));
    return await readAll(session, namespaces, options);
  } finally {
    release();
  }
}

async function readAll(session: ClientSession, namespaces: readonly string[], options: ReadAddressSpaceOptions): Promise<Result<LiveAddressSpace>> {
  const wanted = options.namespaceUris && new Set(options.namespaceUris);
  const isWanted = (index: number): boolean => index > 0 && (!wanted || wanted.has(namespaces[index] ?? ""));
  const found = await crawl(session, {
    maxNodes: options.maxNodes ?? MAX_NODES,
    onProgress: ({ found, browsed }) => options.onProgress?.({ stage: "browse", done: browsed, found }),
    ...(options.shouldStop ? { shouldStop: options.shouldStop } : {}),
  });
  const own = [...found.nodes.values()].filter((n) => isWanted(n.description.nodeId.namespace));
  const attributes = await readAttributes(session, own);
  options.onProgress?.({ stage: "read", done: own.length, found: own.length });
  return makeNodes(found, own, attributes, namespaces, options.layers);
}

type Attributes = ReadonlyMap<keyof typeof AttributeIds, DataValue>;

async function readAttributes(session: ClientSession, nodes: readonly CrawledNode[]): Promise<Attributes[]> {
  const requests = nodes.flatMap(({ description }) =>
    ATTRIBUTES[toClass(description.nodeClass)].map((name) => ({ nodeId: description.nodeId as NodeId, attributeId: AttributeIds[name] })),
  );
  const answers = await readInPortions(session, requests);
  let at = 0;
  return nodes.map(({ description }) => new Map(ATTRIBUTES[toClass(description.nodeClass)].map((name) => [name, answers[at++] as DataValue])));
}

function toClass(nodeClass: WireNodeClass): NodeClass {
  return (WireNodeClass[nodeClass] ?? "Object") as NodeClass;
}

function makeNodes(
  found: Crawl,
  own: readonly CrawledNode[],
  attributes: readonly Attributes[],
  namespaces: readonly string[],
  layers: readonly Layer[],
): Result<LiveAddressSpace> {
  // Reference types and type definitions come again with every node.
  const keys = new Map<string, NodeKey>();
  const keyOf = (id: NodeId): NodeKey => {
    const text = id.toString();
    const known = keys.get(text) ?? toNodeKey(toDomainNodeId(id, namespaces));
    keys.set(text, known);
    return known;
  };
  const ownKeys = new Set(own.map((n) => n.description.nodeId.toString()));
  const incoming = listIncoming(found, ownKeys, keyOf);
  const bare = own.map((node, order) => makeNode(node, attributes[order] ?? new Map(), order, incoming, namespaces, keyOf));
  // Values come second: their structures may be defined by the nodes that were just made.
  const types = new SpaceDataTypes(AddressSpace.of(layers, buildLayer(makeHeader(namespaces), bare)));
  let unreadable = 0;
  const nodes = bare.map((node, i) => {
    if (node.nodeClass !== "Variable" && node.nodeClass !== "VariableType") return node;
    const answer = attributes[i]?.get("Value");
    const value = answer && toXmlValue(answer, { namespaces, types });
    if (value === null) unreadable++;
    return value ? { ...node, value } : node;
  });
  const problems: Problem[] = [];
  if (!found.isComplete) problems.push(problem.warning("endpoint.walk-cut", { count: found.nodes.size }));
  if (unreadable > 0) problems.push(problem.warning("endpoint.value-unreadable", { count: unreadable }));
  return ok({ namespaceUris: [OPC_UA_NAMESPACE, ...namespaces.slice(1)], nodes, isComplete: found.isComplete }, problems);
}

function makeHeader(namespaces: readonly string[]): ModelHeader {
  return { namespaceUris: namespaces.slice(1), models: [] };
}

/** The text of a value; null where the server has one that no file can hold, undefined where there is none. */
function toXmlValue(answer: DataValue, context: WireContext): ReturnType<typeof writeValue> | null | undefined {
  if (answer.statusCode.value >= 0x80000000) return undefined;
  const variant = fromWireVariant(answer.value, context);
  if (!variant) return undefined;
  try {
    return writeValue(variant, context.types);
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

/** References into a node from nodes that are not read: without them it would hang in the air. Subtypes name both ends. */
function listIncoming(found: Crawl, ownKeys: ReadonlySet<string>, keyOf: (id: NodeId) => NodeKey): ReadonlyMap<string, DeclaredReference[]> {
  const incoming = new Map<string, DeclaredReference[]>();
  for (const [sourceText, source] of found.nodes) {
    for (const reference of source.references) {
      const targetText = reference.nodeId.toString();
      if (!ownKeys.has(targetText)) continue;
      const type = keyOf(reference.referenceTypeId);
      if (ownKeys.has(sourceText) && type !== StandardReferenceType.HasSubtype) continue;
      const list = incoming.get(targetText) ?? [];
      list.push({ type, target: keyOf(source.description.nodeId as NodeId), isForward: false });
      incoming.set(targetText, list);
    }
  }
  return incoming;
}

function makeNode(
  { description, references }: CrawledNode,
  attributes: Attributes,
  order: number,
  incoming: ReadonlyMap<string, readonly DeclaredReference[]>,
  namespaces: readonly string[],
  keyOf: (id: NodeId) => NodeKey,
): Node {
  const nodeId = toDomainNodeId(description.nodeId as NodeId, namespaces);
  const text = get<LocalizedText>(attributes, "Description");
  const base = {
    key: toNodeKey(nodeId),
    nodeId,
    order,
    browseName: toDomainQualifiedName(description.browseName, namespaces),
    displayName: [toDomainText(description.displayName)],
    ...(text?.text ? { description: [toDomainText(text)] } : {}),
    references: [
      ...references.map((r) => ({ type: keyOf(r.referenceTypeId), target: keyOf(r.nodeId as NodeId), isForward: true })),
      ...(incoming.get(description.nodeId.toString()) ?? []),
    ],
  };
  return { ...base, nodeClass: toClass(description.nodeClass), ...readClassAttributes(toClass(description.nodeClass), attributes, base.browseName, keyOf) } as Node;
}

function get<T>(attributes: Attributes, name: keyof typeof AttributeIds): T | undefined {
  const answer = attributes.get(name);
  return answer?.statusCode.isGoodish() ? ((answer.value.value as T | null) ?? undefined) : undefined;
}

/** Only what differs from the default of the file format is set (OPC 10000-6 Annex F), as a modeller would write it. */
function readClassAttributes(nodeClass: NodeClass, attributes: Attributes, name: QualifiedName, keyOf: (id: NodeId) => NodeKey): Record<string, unknown> {
  const set: Record<string, unknown> = {};
  const put = (name: string, value: unknown, fallback: unknown): void => {
    if (value !== undefined && value !== fallback) set[name] = value;
  };
  const dataType = get<NodeId>(attributes, "DataType");
  if (dataType && !dataType.isEmpty()) put("dataType", keyOf(dataType), "i=24");
  put("valueRank", get<number>(attributes, "ValueRank"), -1);
  const dimensions = Array.from(get<ArrayLike<number>>(attributes, "ArrayDimensions") ?? []);
  if (dimensions.length > 0) set["arrayDimensions"] = dimensions.join(",");
  put("accessLevel", get<number>(attributes, "AccessLevel"), 1);
  put("minimumSamplingInterval", get<number>(attributes, "MinimumSamplingInterval"), 0);
  put("historizing", get<boolean>(attributes, "Historizing"), false);
  put("eventNotifier", get<number>(attributes, "EventNotifier"), 0);
  put("containsNoLoops", get<boolean>(attributes, "ContainsNoLoops"), false);
  put("executable", get<boolean>(attributes, "Executable"), true);
  put("isAbstract", get<boolean>(attributes, "IsAbstract"), false);
  put("symmetric", get<boolean>(attributes, "Symmetric"), false);
  const inverseName = nodeClass === "ReferenceType" ? get<LocalizedText>(attributes, "InverseName") : undefined;
  if (inverseName?.text) set["inverseName"] = [toDomainText(inverseName)];
  const definition = nodeClass === "DataType" ? get<WireDefinition>(attributes, "DataTypeDefinition") : undefined;
  if (definition) put("definition", readDefinition(definition, name, keyOf), undefined);
  return set;
}

type WireField = { name?: string | null; dataType?: NodeId; valueRank?: number; arrayDimensions?: ArrayLike<number> | null; maxStringLength?: number; isOptional?: boolean; description?: LocalizedText; displayName?: LocalizedText; value?: readonly [number, number] };

/** A StructureDefinition or EnumDefinition (OPC 10000-3 §8.48, §8.50). */
function readDefinition(definition: WireDefinition, name: QualifiedName, keyOf: (id: NodeId) => NodeKey): DataTypeDefinition | undefined {
  const { fields, structureType } = definition as { fields?: readonly WireField[] | null; structureType?: number };
  if (!fields) return undefined;
  const isStructure = structureType !== undefined;
  // 2 and 4 are unions, 3 and 4 allow subtypes (OPC 10000-3 §8.49).
  const isUnion = structureType === 2 || structureType === 4;
  const allows = structureType === 3 || structureType === 4;
  return {
    name,
    ...(isUnion ? { isUnion } : {}),
    fields: fields.map((field): DataTypeField => ({
      name: field.name ?? "",
      ...(field.displayName?.text && field.displayName.text !== field.name ? { displayName: [toDomainText(field.displayName)] } : {}),
      ...(field.description?.text ? { description: [toDomainText(field.description)] } : {}),
      ...(isStructure ? readStructureField(field, allows, keyOf) : { value: Number(BigInt.asIntN(64, (BigInt(field.value?.[0] ?? 0) << 32n) | BigInt(field.value?.[1] ?? 0))) }),
    })),
  };
}

function readStructureField(field: WireField, allows: boolean, keyOf: (id: NodeId) => NodeKey): Partial<DataTypeField> {
  const dimensions = Array.from(field.arrayDimensions ?? []);
  return {
    ...(field.dataType ? { dataType: keyOf(field.dataType) } : {}),
    ...(field.valueRank !== undefined && field.valueRank !== -1 ? { valueRank: field.valueRank } : {}),
    ...(dimensions.length > 0 ? { arrayDimensions: dimensions.join(",") } : {}),
    ...(field.maxStringLength ? { maxStringLength: field.maxStringLength } : {}),
    // Where subtypes are allowed, the same bit says so instead of "optional".
    ...(field.isOptional ? (allows ? { allowSubTypes: true } : { isOptional: true }) : {}),
  };
}
