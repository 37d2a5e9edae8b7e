/** Texts of enumerations and multi-state items, read once per data type and session. */
import { AttributeIds, type ClientSession, DataType, type DataValue, type NodeId, type Variant } from "node-opcua";
import { toWireNodeId } from "../node-ids";
import type { StateTexts } from "./decode-value";
import { readProperties } from "./find-properties.server";

const STATE_PROPERTIES = ["EnumStrings", "EnumValues"] as const;
/** Texts by data type, for as long as the session lives. */
const knownTypes = new WeakMap<ClientSession, Map<string, StateTexts | null>>();

type EnumDefinitionLike = {
  fields?: { name?: string | null; displayName?: { text?: string | null }; value?: unknown }[] | null;
};

/** The state texts of each node that has some; nodes without states are not in the map. */
export async function readStateTexts(
  session: ClientSession,
  nodeIds: readonly string[],
  namespaces: readonly string[],
): Promise<Map<string, StateTexts>> {
  const nodes = nodeIds.flatMap((text) => {
    const id = toWireNodeId(text, namespaces);
    return id.ok ? [{ text, id: id.value }] : [];
  });
  const result = new Map<string, StateTexts>();
  if (nodes.length === 0) return result;
  const dataTypes = await session.read(nodes.map(({ id }) => ({ nodeId: id, attributeId: AttributeIds.DataType })));
  const numeric = nodes.flatMap((node, i) => (isStateLike(dataTypes[i]) ? [{ ...node, dataType: dataTypes[i]?.value.value as NodeId }] : []));
  const properties = await readProperties(session, numeric.map(({ id }) => id), STATE_PROPERTIES);
  const types = await readTypes(session, numeric.map(({ dataType }) => dataType));
  numeric.forEach(({ text, dataType }, i) => {
    const texts = toTexts(properties[i]) ?? types.get(dataType.toString());
    if (texts) result.set(text, texts);
  });
  return result;
}

/** Enumerations, and unsigned integers as discrete items have them; Float and String never carry states. */
function isStateLike(value: DataValue | undefined): boolean {
  const id = value?.value.value as NodeId | null | undefined;
  if (!id) return false;
  if (id.namespace !== 0 || typeof id.value !== "number") return true;
  return id.value > 25 || (id.value >= DataType.SByte && id.value <= DataType.UInt64);
}

async function readTypes(session: ClientSession, dataTypes: readonly NodeId[]): Promise<Map<string, StateTexts | null>> {
  let known = knownTypes.get(session);
  if (!known) knownTypes.set(session, (known = new Map()));
  const missing = [...new Map(dataTypes.map((id) => [id.toString(), id])).values()].filter(
    (id) => !known.has(id.toString()) && !(id.namespace === 0 && typeof id.value === "number" && id.value <= 28),
  );
  if (missing.length === 0) return known;
  const definitions = await session.read(missing.map((nodeId) => ({ nodeId, attributeId: AttributeIds.DataTypeDefinition })));
  const properties = await readProperties(session, missing, STATE_PROPERTIES);
  missing.forEach((id, i) => known.set(id.toString(), fromDefinition(definitions[i]) ?? toTexts(properties[i]) ?? null));
  return known;
}

function fromDefinition(value: DataValue | undefined): StateTexts | undefined {
  const definition = value?.value?.value as EnumDefinitionLike | null | undefined;
  // A structure's fields have a data type and no value.
  const fields = (definition?.fields ?? []).filter((field) => field.value !== undefined);
  return fields.length === 0 ? undefined : new Map(fields.map((field) => [toNumber(field.value), field.displayName?.text || field.name || ""]));
}

function toTexts(properties: ReadonlyMap<string, Variant> | undefined): StateTexts | undefined {
  const values: unknown = properties?.get("EnumValues")?.value;
  if (Array.isArray(values) && values.length > 0) {
    return new Map((values as { value: number | number[]; displayName?: { text?: string | null } }[]).map((v) => [toNumber(v.value), v.displayName?.text ?? ""]));
  }
  const strings: unknown = properties?.get("EnumStrings")?.value;
  if (Array.isArray(strings) && strings.length > 0) {
    return new Map((strings as { text?: string | null }[]).map((text, index) => [index, text.text ?? ""]));
  }
  return undefined;
}

/** 64-bit integers travel as two halves. */
function toNumber(value: unknown): number {
  if (Array.isArray(value)) return Number(BigInt.asIntN(64, (BigInt(Number(value[0]) >>> 0) << 32n) | BigInt(Number(value[1]) >>> 0)));
  return Number(value);
}
