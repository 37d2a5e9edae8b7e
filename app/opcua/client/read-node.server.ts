/** Everything that a node's card shows, in three requests. */
import { AttributeIds, BrowseDirection, type ClientSession, coerceNodeId, DataType, type DataValue, NodeClass as WireNodeClass, type NodeId } from "node-opcua";
import { fail, ok, problem, type Result } from "~/domain/core/result";
import type { NodeClass } from "~/domain/address-space/node";
import type { NodeCard } from "~/domain/live/live-node";
import { fromWireNodeId, toWireNodeId } from "../node-ids";
import { readArguments } from "./act.server";
import { decodeSample, type StateTexts } from "./decode-value";
import type { EndpointClient } from "./endpoint-client.server";
import { readProperties, toRange, toUnit } from "./find-properties.server";
import { readStateTexts } from "./read-states.server";

const ATTRIBUTES = [
  "NodeClass",
  "BrowseName",
  "DisplayName",
  "Description",
  "DataType",
  "ValueRank",
  "ArrayDimensions",
  "AccessLevel",
  "MinimumSamplingInterval",
  "Historizing",
  "Executable",
  "Value",
] as const;
type AttributeName = (typeof ATTRIBUTES)[number];

/** OPC 10000-3 §8.57, bit by bit. */
const ACCESS_LEVEL_BITS = ["CurrentRead", "CurrentWrite", "HistoryRead", "HistoryWrite", "SemanticChange", "StatusWrite", "TimestampWrite"];
const HAS_TYPE_DEFINITION = coerceNodeId("i=40");
const HAS_PROPERTY = coerceNodeId("i=46");

/** Problems: `endpoint.namespace-unknown`, `endpoint.node-unknown`. */
export async function readNode(client: EndpointClient, nodeId: string): Promise<Result<NodeCard>> {
  return client.use(async (session, namespaces) => {
    const wireId = toWireNodeId(nodeId, namespaces);
    if (!wireId.ok) return wireId;
    const attributes = await readAttributes(session, wireId.value);
    if (!attributes("NodeClass")?.statusCode.isGoodish()) return fail(problem("endpoint.node-unknown", { node: nodeId }));
    const states = (await readStateTexts(session, [nodeId], namespaces)).get(nodeId);
    const [properties] = await readProperties(session, [wireId.value], ["EngineeringUnits", "EURange", "InstrumentRange"]);
    const relations = await readRelations(session, wireId.value);
    const card = await toCard(session, namespaces, nodeId, attributes, states, properties ?? new Map(), relations);
    return ok({ ...card, ...(await readTypes(session, wireId.value, card.nodeClass)) });
  });
}

/** What an editor needs to offer the right field. */
async function readTypes(session: ClientSession, nodeId: NodeId, nodeClass: NodeClass): Promise<Pick<NodeCard, "builtInType" | "inputArguments">> {
  if (nodeClass === "Method") return { builtInType: null, inputArguments: (await readArguments(session, nodeId)).inputs };
  if (nodeClass !== "Variable") return { builtInType: null, inputArguments: [] };
  // A Variable of an abstract data type has no one built-in type, which is no reason not to show it.
  const type = await session.getBuiltInDataType(nodeId).catch(() => DataType.Null);
  return { builtInType: DataType[type] ?? null, inputArguments: [] };
}

type Attributes = (name: AttributeName) => DataValue | undefined;

async function readAttributes(session: ClientSession, nodeId: NodeId): Promise<Attributes> {
  const values = await session.read(ATTRIBUTES.map((name) => ({ nodeId, attributeId: AttributeIds[name] })));
  return (name) => values[ATTRIBUTES.indexOf(name)];
}

async function readRelations(session: ClientSession, nodeId: NodeId): Promise<{ typeName: string | null; isProperty: boolean }> {
  const [types, owners] = await session.browse([
    { nodeId, browseDirection: BrowseDirection.Forward, referenceTypeId: HAS_TYPE_DEFINITION, includeSubtypes: false, nodeClassMask: 0, resultMask: 63 },
    { nodeId, browseDirection: BrowseDirection.Inverse, referenceTypeId: HAS_PROPERTY, includeSubtypes: true, nodeClassMask: 0, resultMask: 1 },
  ]);
  return { typeName: types?.references?.[0]?.browseName.name ?? null, isProperty: (owners?.references?.length ?? 0) > 0 };
}

async function toCard(
  session: ClientSession,
  namespaces: readonly string[],
  nodeId: string,
  attributes: Attributes,
  states: StateTexts | undefined,
  properties: Awaited<ReturnType<typeof readProperties>>[number],
  relations: { typeName: string | null; isProperty: boolean },
): Promise<NodeCard> {
  const get = <T>(name: AttributeName): T | null => {
    const value = attributes(name);
    return value?.statusCode.isGoodish() ? ((value.value.value as T | null | undefined) ?? null) : null;
  };
  const nodeClass = (WireNodeClass[get<number>("NodeClass") ?? 1] ?? "Object") as NodeClass;
  const dataType = get<NodeId>("DataType");
  const accessLevel = get<number>("AccessLevel") ?? 0;
  const value = nodeClass === "Variable" ? attributes("Value") : undefined;
  return {
    nodeId,
    nodeClass,
    browseName: get<{ name: string }>("BrowseName")?.name ?? "",
    displayName: get<{ text: string }>("DisplayName")?.text ?? "",
    description: get<{ text: string | null }>("Description")?.text || null,
    ...relations,
    dataType: dataType ? { nodeId: fromWireNodeId(dataType, namespaces), name: await readName(session, dataType) } : null,
    valueRank: get<number>("ValueRank"),
    arrayDimensions: Array.from(get<ArrayLike<number>>("ArrayDimensions") ?? []),
    accessLevel: ACCESS_LEVEL_BITS.filter((_, bit) => (accessLevel >> bit) & 1),
    minimumSamplingInterval: get<number>("MinimumSamplingInterval"),
    historizing: get<boolean>("Historizing"),
    executable: get<boolean>("Executable"),
    builtInType: null,
    inputArguments: [],
    unit: toUnit(properties.get("EngineeringUnits")),
    range: toRange(properties.get("EURange")),
    instrumentRange: toRange(properties.get("InstrumentRange")),
    states: [...(states ?? [])].map(([number, text]) => ({ value: number, text })),
    sample: value ? decodeSample(value, states, 0) : null,
  };
}

async function readName(session: ClientSession, nodeId: NodeId): Promise<string> {
  const value = await session.read({ nodeId, attributeId: AttributeIds.BrowseName });
  return (value.value.value as { name?: string | null } | null)?.name ?? nodeId.toString();
}
