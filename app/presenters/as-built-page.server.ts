import { listSchedules } from "../db/repositories/as-built-schedules.server";
import { listPointChecks } from "../db/repositories/as-built.server";
import { listEndpoints } from "../db/repositories/endpoints.server";
import { listRevisions, type ModelRow } from "../db/repositories/models.server";
import { listDeliveries, listReleases } from "../db/repositories/releases.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import { getPath, listEdgesTo } from "../domain/address-space/browse";
import { getDataType } from "../domain/address-space/node";
import { formatNodeId, type NodeKey } from "../domain/address-space/node-id";
import { StandardReferenceType } from "../domain/address-space/standard-ids";
import type { QuotedPointCheck } from "../domain/as-built/as-built-report";
import { findBuiltInType } from "../domain/simulation/find-built-in-type";
import { isInstance } from "../domain/simulation/is-instance";
import type { BuiltInType } from "../domain/simulation/motion";
import { listTestServers } from "./list-test-servers.server";

export type AsBuiltPage = {
  readonly targets: readonly { readonly id: string; readonly name: string; readonly isTestServer: boolean }[];
  readonly revisions: readonly { readonly number: number; readonly message: string }[];
  /** What was delivered and is not proved yet. */
  readonly deliveries: readonly { readonly id: string; readonly text: string }[];
  readonly schedules: readonly { readonly id: string; readonly endpoint: string; readonly everyMinutes: number; readonly lastVerdict: string | null; readonly lastAt: string | null; readonly nextAt: string }[];
  /** Measured Variables of the model's machines, by path; what a point check can be about. */
  readonly signals: readonly Signal[];
  readonly pointChecks: readonly (QuotedPointCheck & { readonly id: string; readonly note: string })[];
};

export type Signal = { readonly nodeId: string; readonly path: string };

const MAX_SIGNALS = 5_000;

/** What an as-built report can be made of, and the point checks so far. */
export async function presentAsBuiltPage(model: ModelRow, space: AddressSpace | undefined): Promise<AsBuiltPage> {
  const [endpoints, revisions, checks, schedules, releases] = await Promise.all([
    listEndpoints(model.organizationId),
    listRevisions(model.id),
    listPointChecks(model.id),
    listSchedules(model.id),
    listReleases(model.id),
  ]);
  const deliveries = await listDeliveries(releases.map((release) => release.id));
  const servers = listTestServers(model.organizationId).filter((server) => server.state === "running");
  return {
    targets: [
      ...endpoints.map(({ id, name }) => ({ id, name, isTestServer: false })),
      ...servers.map(({ id, modelName }) => ({ id, name: `Test server of ${modelName}`, isTestServer: true })),
    ],
    revisions: revisions.map(({ number, message }) => ({ number, message })),
    deliveries: deliveries
      .filter((delivery) => delivery.state !== "proved")
      .map(({ id, releaseId, gatewayName, state }) => ({ id, text: `Version ${releases.find((release) => release.id === releaseId)?.version ?? ""}, delivered to ${gatewayName} (${state})` })),
    schedules: schedules.map(({ id, endpointName, everyMinutes, lastVerdict, lastAt, nextAt }) => ({ id, endpoint: endpointName, everyMinutes, lastVerdict, lastAt: lastAt?.toISOString() ?? null, nextAt: nextAt.toISOString() })),
    signals: space ? listSignals(space) : [],
    pointChecks: checks.map(({ id, path, nodeId, stimulus, localReading, shownValue, unit, tolerance, isWithin, note, checkedBy, at }) => ({
      id,
      path,
      nodeId,
      stimulus,
      localReading,
      shownValue,
      unit,
      tolerance,
      isWithin,
      note,
      checkedBy,
      at: at.toISOString(),
    })),
  };
}

const NUMBERS: ReadonlySet<BuiltInType> = new Set(["SByte", "Byte", "Int16", "UInt16", "Int32", "UInt32", "Int64", "UInt64", "Float", "Double"]);

/** Variables of instances that hold one number; Properties describe and are not measured. */
function listSignals(space: AddressSpace): Signal[] {
  const known = new Map<NodeKey, boolean>();
  const signals: Signal[] = [];
  for (const node of space.listOwnNodes()) {
    if (signals.length >= MAX_SIGNALS) break;
    if (node.nodeClass !== "Variable" || !isInstance(space, node.key, known) || listEdgesTo(space, node.key, StandardReferenceType.HasProperty).length > 0) continue;
    if (NUMBERS.has(findBuiltInType(space, getDataType(node)))) signals.push({ nodeId: formatNodeId(node.nodeId), path: getPath(space, node.key) });
  }
  return signals.sort((a, b) => a.path.localeCompare(b.path));
}
