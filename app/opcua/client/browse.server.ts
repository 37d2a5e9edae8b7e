/** Children of a node as Live's columns show them, page by page. */
import {
  AttributeIds,
  BrowseDescription,
  BrowseDirection,
  type BrowseResult,
  type ClientSession,
  coerceNodeId,
  NodeClass as WireNodeClass,
  type NodeId,
  type ReferenceDescription,
} from "node-opcua";
import { fail, ok, problem, type Result } from "~/domain/core/result";
import type { NodeClass } from "~/domain/address-space/node";
import type { BrowsedNode, BrowsedPage } from "~/domain/live/live-node";
import { fromWireNodeId, toWireNodeId } from "../node-ids";
import type { EndpointClient } from "./endpoint-client.server";
import { BROWSE_PAGE } from "./endpoint-settings";
import { readProperties, toRange, toUnit } from "./find-properties.server";

const HIERARCHICAL = coerceNodeId("i=33");
const HAS_SUBTYPE = "i=45";
const HAS_PROPERTY = "i=46";
const ALL_CLASSES = 0;
const ALL_FIELDS = 63;

/** The children of a node, or the next page of them. Problems: `endpoint.namespace-unknown`, `endpoint.browse`. */
export async function browseChildren(client: EndpointClient, nodeId: string, continuation: string | null): Promise<Result<BrowsedPage>> {
  return client.use(async (session, namespaces) => {
    const wireId = toWireNodeId(nodeId, namespaces);
    if (!wireId.ok) return wireId;
    const answer = continuation === null ? await browse(session, wireId.value) : await session.browseNext(Buffer.from(continuation, "base64url"), false);
    if (!answer.statusCode.isGoodish()) return fail(problem("endpoint.browse", { node: nodeId, status: answer.statusCode.name }));
    const references = (answer.references ?? []).filter((r) => r.referenceTypeId.toString() !== `ns=0;${HAS_SUBTYPE}` || isTypeClass(r.nodeClass));
    const point = answer.continuationPoint;
    return ok({
      children: await describe(session, namespaces, dropTwins(references)),
      continuation: point && point.length > 0 ? point.toString("base64url") : null,
    });
  });
}

/** The nodes from Objects down to a node, both included; empty when no path of hierarchical references leads there. */
export async function findPathTo(client: EndpointClient, nodeId: string): Promise<Result<string[]>> {
  return client.use(async (session, namespaces) => {
    const start = toWireNodeId(nodeId, namespaces);
    if (!start.ok) return start;
    const path = [start.value];
    const seen = new Set([start.value.toString()]);
    while (path[0]?.toString() !== "ns=0;i=85") {
      const above = path[0] ? await browseUp(session, path[0]) : undefined;
      if (!above || seen.has(above.toString()) || path.length > 60) return ok([]);
      seen.add(above.toString());
      path.unshift(above);
    }
    return ok(path.map((id) => fromWireNodeId(id, namespaces)));
  });
}

async function browse(session: ClientSession, nodeId: NodeId): Promise<BrowseResult> {
  session.requestedMaxReferencesPerNode = BROWSE_PAGE;
  return session.browse(toDescription(nodeId, BrowseDirection.Forward));
}

async function browseUp(session: ClientSession, nodeId: NodeId): Promise<NodeId | undefined> {
  const answer = await session.browse(toDescription(nodeId, BrowseDirection.Inverse));
  const references = answer.references ?? [];
  // A component's owner comes before a folder that merely organizes it.
  const owner = references.find((r) => r.referenceTypeId.toString() !== "ns=0;i=35") ?? references[0];
  return owner?.nodeId;
}

function toDescription(nodeId: NodeId, browseDirection: BrowseDirection): BrowseDescription {
  return new BrowseDescription({
    nodeId,
    browseDirection,
    referenceTypeId: HIERARCHICAL,
    includeSubtypes: true,
    nodeClassMask: ALL_CLASSES,
    resultMask: ALL_FIELDS,
  });
}

function isTypeClass(nodeClass: WireNodeClass): boolean {
  return [WireNodeClass.ObjectType, WireNodeClass.VariableType, WireNodeClass.DataType, WireNodeClass.ReferenceType].includes(nodeClass);
}

/** One row per node, even where several references lead to it. */
function dropTwins(references: readonly ReferenceDescription[]): ReferenceDescription[] {
  return [...new Map(references.map((reference) => [reference.nodeId.toString(), reference] as const).reverse()).values()].reverse();
}

async function describe(session: ClientSession, namespaces: readonly string[], references: readonly ReferenceDescription[]): Promise<BrowsedNode[]> {
  const names = await readNames(session, references.flatMap((r) => [r.typeDefinition, r.referenceTypeId]));
  const variables = references.filter((r) => r.nodeClass === WireNodeClass.Variable);
  const properties = await readProperties(session, variables.map((r) => r.nodeId), ["EngineeringUnits", "EURange"]);
  return references.map((reference) => {
    const own = properties[variables.indexOf(reference)];
    return {
      nodeId: fromWireNodeId(reference.nodeId, namespaces),
      nodeClass: (WireNodeClass[reference.nodeClass] ?? "Object") as NodeClass,
      browseName: reference.browseName.name ?? "",
      displayName: reference.displayName.text || reference.browseName.name || "(without name)",
      referenceType: names.get(reference.referenceTypeId.toString()) ?? "",
      isProperty: reference.referenceTypeId.toString() === `ns=0;${HAS_PROPERTY}`,
      typeName: names.get(reference.typeDefinition.toString()) ?? null,
      unit: toUnit(own?.get("EngineeringUnits")),
      range: toRange(own?.get("EURange")),
    };
  });
}

async function readNames(session: ClientSession, ids: readonly NodeId[]): Promise<Map<string, string>> {
  const unique = [...new Map(ids.filter((id) => !id.isEmpty()).map((id) => [id.toString(), id])).values()];
  if (unique.length === 0) return new Map();
  const values = await session.read(unique.map((nodeId) => ({ nodeId, attributeId: AttributeIds.BrowseName })));
  return new Map(unique.map((id, i) => [id.toString(), (values[i]?.value?.value as { name?: string | null } | null)?.name ?? ""]));
}
