/**
 * As-built reports: a live server is read whole, watched for a while and compared with a state of a model. It takes its
 * time, so it runs behind the request; whoever asked follows the run by its id.
 */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAsBuiltStatement, findHighestReportNumber, listPointChecks } from "../db/repositories/as-built.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addBlobStatement, toBlob } from "../db/repositories/blobs.server";
import type { ModelRow } from "../db/repositories/models.server";
import { AddressSpace, type Layer } from "../domain/address-space/address-space";
import { getPath } from "../domain/address-space/browse";
import { getAccessLevel } from "../domain/address-space/node";
import { formatNodeId } from "../domain/address-space/node-id";
import type { AsBuiltComparison, AsBuiltDifference, AsBuiltVerdict, Observation, ServedModel } from "../domain/as-built/as-built";
import { AS_BUILT_FORMAT, toleranceSchema, type AsBuiltReport } from "../domain/as-built/as-built-report";
import { compareAsBuilt } from "../domain/as-built/compare-as-built";
import { formatProblem } from "../domain/core/problem-texts";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import type { LiveTarget } from "../domain/live/live-target";
import { isInstance } from "../domain/simulation/is-instance";
import { getLibrary } from "../library/library.server";
import type { EndpointClient } from "../opcua/client/endpoint-client.server";
import type { ObserveTarget } from "../opcua/client/observe.server";
import type { LiveAddressSpace } from "../opcua/client/read-address-space.server";
import { newId } from "../utils/ids.server";
import { logError } from "../utils/log.server";
import { singleton } from "../utils/singleton.server";
import { openEndpoint } from "./live-endpoint.server";
import { loadState } from "./load-revision.server";
import { requireSigningKey, signManifest } from "./signing-keys.server";

export const asBuiltIntentSchema = z.strictObject({
  targetId: z.string().min(1).max(100),
  state: z.union([z.literal("working"), z.coerce.number().int().min(0).max(999_999_999)]),
  watchSeconds: z.coerce.number().int().min(0).max(600).default(10),
  tolerance: toleranceSchema.default({ ignored: [], range: 0, areTextsChecked: false }),
  /** The release and its delivery that the report is to prove. */
  releaseId: z.string().max(100).optional(),
  deliveryId: z.string().max(100).optional(),
});
export type AsBuiltIntent = z.infer<typeof asBuiltIntentSchema>;

export type AsBuiltRun = {
  readonly id: string;
  readonly organizationId: string;
  readonly modelId: string;
  readonly state: "running" | "done" | "failed";
  readonly stage: "connect" | "browse" | "watch" | "compare" | "done";
  readonly done: number;
  readonly of: number;
  readonly reportId: string | null;
  readonly verdict: AsBuiltVerdict | null;
  readonly problems: readonly Problem[];
};

const MAX_RUNS = 200;
/** Variables watched in one run; a hall has fewer. */
const MAX_WATCHED = 5_000;
const MAX_KEPT_OBSERVATIONS = 2_000;

const getRuns = () => singleton<Map<string, AsBuiltRun>>("as-built-runs", () => new Map());

export function findAsBuiltRun(id: string): AsBuiltRun | undefined {
  return getRuns().get(id);
}

/** Starts a run. Problems: `revision.unknown`, those of openEndpoint. */
export async function startAsBuilt(author: Caller, model: ModelRow, target: LiveTarget, intent: AsBuiltIntent): Promise<Result<AsBuiltRun>> {
  const space = await loadState(model, intent.state);
  if (!space) return fail(problem("as-built.state", { state: String(intent.state) }));
  const client = await openEndpoint(target.id);
  if (!client.ok) return client;
  const run: AsBuiltRun = { id: newId(), organizationId: model.organizationId, modelId: model.id, state: "running", stage: "connect", done: 0, of: 0, reportId: null, verdict: null, problems: [] };
  keep(run);
  void work(author, model, target, intent, space, client.value, run.id);
  return ok(run);
}

function keep(run: AsBuiltRun): void {
  const runs = getRuns();
  runs.set(run.id, run);
  for (const [id, old] of runs) {
    if (runs.size <= MAX_RUNS) break;
    if (old.state !== "running") runs.delete(id);
  }
}

async function work(author: Caller, model: ModelRow, target: LiveTarget, intent: AsBuiltIntent, space: AddressSpace, client: EndpointClient, runId: string): Promise<void> {
  const change = (now: Partial<AsBuiltRun>): void => {
    const run = getRuns().get(runId);
    if (run) keep({ ...run, ...now });
  };
  try {
    const report = await makeReport(author, model, target, intent, space, client, change);
    const id = await saveReport(author, model, target, intent, report);
    change({ state: "done", stage: "done", reportId: id, verdict: report.verdict });
  } catch (error) {
    logError(error, "as-built");
    const detail = error instanceof Error ? (error.message.split("\n")[0] ?? "") : "no reason given";
    change({ state: "failed", problems: [problem("endpoint.unreachable", { endpointUrl: target.endpointUrl ?? "", detail })] });
  }
}

async function makeReport(
  author: Caller,
  model: ModelRow,
  target: LiveTarget,
  intent: AsBuiltIntent,
  space: AddressSpace,
  client: EndpointClient,
  change: (now: Partial<AsBuiltRun>) => void,
): Promise<AsBuiltReport> {
  const startedAt = new Date().toISOString();
  const [{ readAddressSpace }, { observeVariables }, { readServedModels }] = await Promise.all([
    import("../opcua/client/read-address-space.server"),
    import("../opcua/client/observe.server"),
    import("../opcua/client/read-served-models.server"),
  ]);
  const teamLayers = listTeamLayers(space);
  const models = await readServedModels(client);
  const read = await readAddressSpace(client, {
    namespaceUris: teamLayers.flatMap((layer) => layer.header.models.map((m) => m.modelUri)),
    layers: space.layers.slice(0, -1),
    onProgress: ({ done, found }) => change({ stage: "browse", done, of: found }),
  });
  if (!read.ok) throw new Error(read.problems.map(formatProblem).join(" "));
  const targets = listWatched(space);
  const watchedFor = intent.watchSeconds * 1000;
  const observations = watchedFor > 0 ? await observeVariables(client, targets, { milliseconds: watchedFor, onProgress: (done, of) => change({ stage: "watch", done, of }) }) : [];
  change({ stage: "compare", done: 0, of: 1 });
  const comparison = compareLayers(space, teamLayers, read.value, models, observations, intent);
  const pointChecks = await listPointChecks(model.id);
  return {
    format: AS_BUILT_FORMAT,
    model: { id: model.id, name: model.name, namespaceUri: model.namespaceUri, version: space.own.header.models[0]?.version ?? null, revision: intent.state === "working" ? null : intent.state },
    target: { id: target.id, name: target.name, endpointUrl: target.endpointUrl ?? "", securityMode: target.securityMode },
    madeBy: author.name,
    startedAt,
    endedAt: new Date().toISOString(),
    tolerance: intent.tolerance,
    watchedFor,
    verdict: comparison.verdict,
    counts: { ...comparison.counts, servedNodes: read.value.nodes.length, watched: observations.length },
    differences: comparison.differences,
    observations: observations.filter((seen) => seen.samples === 0 || seen.badFor > 0 || seen.uncertainFor > 0).slice(0, MAX_KEPT_OBSERVATIONS),
    pointChecks: pointChecks.map(({ path, nodeId, stimulus, localReading, shownValue, unit, tolerance, isWithin, checkedBy, at }) => ({ path, nodeId, stimulus, localReading, shownValue, unit, tolerance, isWithin, checkedBy, at: at.toISOString() })),
    remarks: read.problems.map(formatProblem),
  };
}

/** The layers that the team wrote itself, the own one last: what is published elsewhere is compared by its version alone. */
function listTeamLayers(space: AddressSpace): Layer[] {
  const published = new Set(getLibrary().list().map((entry) => entry.modelUri));
  return space.layers.filter((layer) => layer.header.models[0] !== undefined && !published.has(layer.header.models[0].modelUri));
}

function listWatched(space: AddressSpace): ObserveTarget[] {
  const known = new Map();
  return space
    .listOwnNodes()
    .filter((node) => node.nodeClass === "Variable" && (getAccessLevel(node) & 1) === 1 && isInstance(space, node.key, known) && !isPropertyOf(space, node.key))
    .slice(0, MAX_WATCHED)
    .map((node) => ({ nodeId: formatNodeId(node.nodeId), path: getPath(space, node.key) }));
}

function isPropertyOf(space: AddressSpace, key: Parameters<typeof getPath>[1]): boolean {
  return space.edgesTo(key).some((edge) => edge.type === "i=46");
}

function compareLayers(space: AddressSpace, teamLayers: readonly Layer[], served: LiveAddressSpace, models: readonly ServedModel[], observations: readonly Observation[], { tolerance }: AsBuiltIntent): AsBuiltComparison {
  const parts = teamLayers.map((layer, i) => {
    const isLast = i === teamLayers.length - 1;
    return compareAsBuilt({
      released: AddressSpace.of(space.layers.slice(0, space.layers.indexOf(layer)), layer),
      releasedModels: isLast ? space.layers.flatMap((l) => l.header.models.slice(0, 1)) : [],
      served: { nodes: served.nodes, models, isComplete: served.isComplete },
      observations: isLast ? observations : [],
      tolerance,
    });
  });
  const differences: AsBuiltDifference[] = parts.flatMap((part) => part.differences);
  const sum = (name: keyof AsBuiltComparison["counts"]): number => parts.reduce((total, part) => total + part.counts[name], 0);
  const counts = { nodes: sum("nodes"), counted: sum("counted"), ignored: sum("ignored") };
  return { verdict: counts.counted > 0 ? "differs" : served.isComplete ? "as released" : "not shown", differences, counts };
}

async function saveReport(author: Caller, model: ModelRow, target: LiveTarget, intent: AsBuiltIntent, report: AsBuiltReport): Promise<string> {
  const id = newId();
  const now = new Date();
  const body = await toBlob(`${JSON.stringify(report, null, 2)}\n`);
  const key = await requireSigningKey(author, model.organizationId);
  const { signature } = await signManifest(key.id, body.hash);
  const number = (await findHighestReportNumber(model.id)) + 1;
  await writeBatch([
    addBlobStatement(body, now),
    addAsBuiltStatement({
      id,
      organizationId: model.organizationId,
      modelId: model.id,
      number,
      revisionNumber: intent.state === "working" ? -1 : intent.state,
      releaseId: intent.releaseId ?? null,
      deliveryId: intent.deliveryId ?? null,
      targetId: target.id,
      targetName: target.name,
      endpointUrl: report.target.endpointUrl,
      verdict: report.verdict,
      counted: report.counts.counted,
      ignored: report.counts.ignored,
      bodyHash: body.hash,
      signature: `${key.id}.${signature}`,
      madeBy: author.name,
      at: now,
    }),
    addAuditStatement({
      organizationId: model.organizationId,
      userId: author.userId,
      userName: author.name,
      action: "as-built.report",
      subject: { kind: "model", id: model.id, name: model.name },
      details: { number, target: target.name, verdict: report.verdict, differences: report.counts.counted, hash: body.hash },
    }),
  ]);
  return id;
}
