/**
 * The two things that Live does to a server beside looking: writing one value and calling one Method. Everything is looked
 * up afresh at the server before it acts; what is asked is checked against what the server says that it allows.
 */
import { AttributeIds, type ClientSession, DataType, type DataValue, type NodeId, type Variant } from "node-opcua";
import { fail, ok, problem, type Result } from "~/domain/core/result";
import type { CallAnswer, MethodArgument, WriteAnswer } from "~/domain/live/live-action";
import { toWireNodeId } from "../node-ids";
import { decodeSample, decodeVariant, formatValue, nameStatus } from "./decode-value";
import { encodeInput, type Input } from "./encode-input";
import type { EndpointClient } from "./endpoint-client.server";
import { readProperties, toRange } from "./find-properties.server";

const CURRENT_WRITE = 2;

/**
 * Writes one scalar value and reads it back. Problems: `endpoint.not-writable`, `endpoint.array`, `endpoint.beyond-range`,
 * `endpoint.input`, `endpoint.input-type`, `endpoint.namespace-unknown`.
 */
export async function writeValue(client: EndpointClient, nodeId: string, input: Input): Promise<Result<WriteAnswer>> {
  return client.use(async (session, namespaces) => {
    const id = toWireNodeId(nodeId, namespaces);
    if (!id.ok) return id;
    const variant = await prepareWrite(session, id.value, nodeId, input);
    if (!variant.ok) return variant;
    const before = await readValue(session, id.value);
    const status = await session.write({ nodeId: id.value, attributeId: AttributeIds.Value, value: { value: variant.value } });
    const after = await readValue(session, id.value);
    return ok({
      before: decodeSample(before, undefined, 0),
      after: decodeSample(after, undefined, 0),
      status: nameStatus(status.name),
      isDone: status.isGoodish(),
    });
  });
}

async function prepareWrite(session: ClientSession, id: NodeId, nodeId: string, input: Input): Promise<Result<Variant>> {
  const [access, dataType, rank] = await session.read(
    [AttributeIds.UserAccessLevel, AttributeIds.DataType, AttributeIds.ValueRank].map((attributeId) => ({ nodeId: id, attributeId })),
  );
  if ((Number(access?.value.value ?? 0) & CURRENT_WRITE) === 0) return fail(problem("endpoint.not-writable", { node: nodeId }));
  if (Number(rank?.value.value ?? -1) >= 0) return fail(problem("endpoint.array", { node: nodeId }));
  const encoded = encodeInput(input, await session.getBuiltInDataType(id), "the value");
  if (!encoded.ok || !dataType) return encoded;
  const [properties] = await readProperties(session, [id], ["EURange"]);
  const range = toRange(properties?.get("EURange"));
  const value: unknown = encoded.value.value;
  if (range && typeof value === "number" && (value < range.low || value > range.high)) {
    return fail(problem("endpoint.beyond-range", { value, low: range.low, high: range.high }));
  }
  return encoded;
}

function readValue(session: ClientSession, nodeId: NodeId): Promise<DataValue> {
  return session.read({ nodeId, attributeId: AttributeIds.Value });
}

/** Calls a Method of an object. Problems: `endpoint.arguments`, `endpoint.input`, `endpoint.input-type`, `endpoint.namespace-unknown`. */
export async function callMethod(client: EndpointClient, objectId: string, methodId: string, inputs: readonly Input[]): Promise<Result<CallAnswer>> {
  return client.use(async (session, namespaces) => {
    const object = toWireNodeId(objectId, namespaces);
    const method = toWireNodeId(methodId, namespaces);
    if (!object.ok) return object;
    if (!method.ok) return method;
    const declared = await readArguments(session, method.value);
    if (declared.inputs.length !== inputs.length) return fail(problem("endpoint.arguments", { expected: declared.inputs.length, given: inputs.length }));
    const encoded: Variant[] = [];
    for (const [index, argument] of declared.inputs.entries()) {
      const one = encodeInput(inputs[index] ?? "", toDataType(argument), argument.name);
      if (!one.ok) return one;
      encoded.push(one.value);
    }
    const answer = await session.call({ objectId: object.value, methodId: method.value, inputArguments: encoded });
    return ok({
      status: nameStatus(answer.statusCode.name),
      isDone: answer.statusCode.isGoodish(),
      outputs: (answer.outputArguments ?? []).map((value, index) => ({
        name: declared.outputs[index]?.name ?? `output ${index + 1}`,
        text: formatValue(decodeVariant(value), undefined),
      })),
    });
  });
}

function toDataType(argument: MethodArgument): DataType {
  return DataType[argument.builtInType as keyof typeof DataType] ?? DataType.Null;
}

type ArgumentLike = { name?: string | null; dataType: NodeId; valueRank?: number; description?: { text?: string | null } };

/** Input and output arguments of a Method (OPC 10000-3 §8.6), with the type that each is encoded as. */
export async function readArguments(session: ClientSession, method: NodeId): Promise<{ inputs: MethodArgument[]; outputs: MethodArgument[] }> {
  const [properties] = await readProperties(session, [method], ["InputArguments", "OutputArguments"]);
  const describe = async (variant: Variant | undefined): Promise<MethodArgument[]> => {
    const list = (Array.isArray(variant?.value) ? variant.value : []) as ArgumentLike[];
    return Promise.all(list.map((argument) => describeArgument(session, argument)));
  };
  return { inputs: await describe(properties?.get("InputArguments")), outputs: await describe(properties?.get("OutputArguments")) };
}

async function describeArgument(session: ClientSession, { name, dataType, valueRank, description }: ArgumentLike): Promise<MethodArgument> {
  const isArray = (valueRank ?? -1) >= 0;
  return {
    name: name ?? "",
    builtInType: isArray ? "array" : (DataType[await findBasicType(session, dataType)] ?? "Variant"),
    description: description?.text || null,
  };
}

/** Walks up the DataType's supertypes until a built-in type is met; Null when none is. */
async function findBasicType(session: ClientSession, dataType: NodeId): Promise<DataType> {
  let at: NodeId | undefined = dataType;
  for (let step = 0; at && step < 20; step++) {
    if (at.namespace === 0 && typeof at.value === "number") {
      if (at.value === 29) return DataType.Int32;
      if (at.value <= 25 && at.value !== 24) return at.value;
    }
    const up: NodeId | undefined = await findSupertype(session, at);
    at = up;
  }
  return DataType.Null;
}

async function findSupertype(session: ClientSession, nodeId: NodeId): Promise<NodeId | undefined> {
  const answer = await session.browse({ nodeId, browseDirection: 1, referenceTypeId: "i=45", includeSubtypes: false, nodeClassMask: 0, resultMask: 0 });
  return answer.references?.[0]?.nodeId;
}
