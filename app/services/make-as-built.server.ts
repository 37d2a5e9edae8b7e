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
import { findEndpoint } from "../db/repositories/endpoints.server";
import { findDelivery, findRelease, type DeliveryRow, type ReleaseRow } from "../db/repositories/releases.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import type { AsBuiltVerdict } from "../domain/as-built/as-built";
import { AS_BUILT_FORMAT, listOutside, toleranceSchema, type AsBuiltReport } from "../domain/as-built/as-built-report";
import { listPromisedPeriods } from "../domain/as-built/list-promised-periods";
import { formatProblem } from "../domain/core/problem-texts";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import type { LiveTarget } from "../domain/live/live-target";
import type { EndpointClient } from "../opcua/client/endpoint-client.server";
import { newId } from "../utils/ids.server";
import { logError } from "../utils/log.server";
import { singleton } from "../utils/singleton.server";
import { compareEndpoint } from "./compare-endpoint.server";
import { comparePorts } from "./compare-ports.server";
import { advanceDelivery } from "./deliver-release.server";
import { openEndpoint } from "./live-endpoint.server";
import { loadPlannedSources } from "./load-planned-sources.server";
import { loadState } from "./load-revision.server";
import { requireSigningKey, signManifest } from "./signing-keys.server";

export const asBuiltIntentSchema = z.strictObject({
  targetId: z.string().min(1).max(100),
  state: z.union([z.literal("working"), z.coerce.number().int().min(0).max(999_999_999)]),
  watchSeconds: z.coerce.number().int().min(0).max(600).default(10),
  tolerance: toleranceSchema.default({ ignored: [], range: 0, areTextsChecked: false }),
  deliveryId: z.string().max(100).optional().meta({ description: "Compares with what was delivered, whatever `state` says; as released, it sets the delivery to proved." }),
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
const MAX_KEPT_OBSERVATIONS = 2_000;

const getRuns = () => singleton<Map<string, AsBuiltRun>>("as-built-runs", () => new Map());

export function findAsBuiltRun(id: string): AsBuiltRun | undefined {
  return getRuns().get(id);
}

/** Starts a run and answers at once. Problems: `as-built.state`, those of findProof and openEndpoint. */
export async function startAsBuilt(author: Caller, model: ModelRow, target: LiveTarget, intent: AsBuiltIntent): Promise<Result<AsBuiltRun>> {
  const begun = await begin(author, model, target, intent);
  return begun.ok ? ok(begun.value.run) : begun;
}

/** The same, answered when the run has ended. */
export async function makeAsBuilt(author: Caller, model: ModelRow, target: LiveTarget, intent: AsBuiltIntent): Promise<Result<AsBuiltRun>> {
  const begun = await begin(author, model, target, intent);
  if (!begun.ok) return begun;
  await begun.value.ended;
  return ok(findAsBuiltRun(begun.value.run.id) ?? begun.value.run);
}

async function begin(author: Caller, model: ModelRow, target: LiveTarget, asked: AsBuiltIntent): Promise<Result<{ run: AsBuiltRun; ended: Promise<void> }>> {
  const proof = await findProof(model, target, asked.deliveryId);
  if (!proof.ok) return proof;
  const intent = proof.value ? { ...asked, state: proof.value.release.revision } : asked;
  const space = await loadState(model, intent.state);
  if (!space) return fail(problem("as-built.state", { state: String(intent.state) }));
  const client = await openEndpoint(target.id);
  if (!client.ok) return client;
  const run: AsBuiltRun = { id: newId(), organizationId: model.organizationId, modelId: model.id, state: "running", stage: "connect", done: 0, of: 0, reportId: null, verdict: null, problems: [] };
  keep(run);
  return ok({ run, ended: work({ author, model, target, intent, space, proof: proof.value }, client.value, run.id) });
}

function keep(run: AsBuiltRun): void {
  const runs = getRuns();
  runs.set(run.id, run);
  for (const [id, old] of runs) {
    if (runs.size <= MAX_RUNS) break;
    if (old.state !== "running") runs.delete(id);
  }
}

type Proof = { readonly release: ReleaseRow; readonly delivery: DeliveryRow };

/**
 * The delivery that the report may prove. Problems: `as-built.delivery` when the model has no such delivery,
 * `as-built.delivery-target` for a test server, which is no gateway, and for the endpoint of another gateway.
 */
async function findProof(model: ModelRow, target: LiveTarget, deliveryId: string | undefined): Promise<Result<Proof | undefined>> {
  if (deliveryId === undefined) return ok(undefined);
  const delivery = await findDelivery(deliveryId);
  const release = delivery && (await findRelease(delivery.releaseId));
  if (release?.modelId !== model.id || !delivery) return fail(problem("as-built.delivery"));
  const endpoint = target.kind === "endpoint" ? await findEndpoint(target.id) : undefined;
  const isOfGateway = endpoint !== undefined && (endpoint.gatewayId === null || endpoint.gatewayId === delivery.gatewayId);
  return isOfGateway ? ok({ release, delivery }) : fail(problem("as-built.delivery-target", { target: target.name, gateway: delivery.gatewayName }));
}

/** What a run is about. */
type Work = { readonly author: Caller; readonly model: ModelRow; readonly target: LiveTarget; readonly intent: AsBuiltIntent; readonly space: AddressSpace; readonly proof: Proof | undefined };

async function work(about: Work, client: EndpointClient, runId: string): Promise<void> {
  const change = (now: Partial<AsBuiltRun>): void => {
    const run = getRuns().get(runId);
    if (run) keep({ ...run, ...now });
  };
  try {
    const report = await makeReport(about, client, change);
    const id = await saveReport(about, report);
    if (report.verdict === "as released") await proveDelivery(about, report);
    change({ state: "done", stage: "done", reportId: id, verdict: report.verdict });
  } catch (error) {
    logError(error, "as-built");
    const detail = error instanceof Error ? (error.message.split("\n")[0] ?? "") : "no reason given";
    change({ state: "failed", problems: [problem("endpoint.unreachable", { endpointUrl: about.target.endpointUrl ?? "", detail })] });
  }
}

/** A signal whose newest check is outside its tolerance keeps the delivery from being proved. */
async function proveDelivery({ author, model, proof }: Work, report: AsBuiltReport): Promise<void> {
  if (!proof || proof.delivery.state === "proved" || listOutside(report.pointChecks).length > 0) return;
  const proved = await advanceDelivery(author, model, proof.release, proof.delivery.id, "proved");
  if (!proved.ok) logError(new Error(proved.problems.map(formatProblem).join(" ")), "as-built");
}

async function makeReport({ author, model, target, intent, space, proof }: Work, client: EndpointClient, change: (now: Partial<AsBuiltRun>) => void): Promise<AsBuiltReport> {
  const startedAt = new Date().toISOString();
  const sources = await loadPlannedSources(model.organizationId);
  const { comparison, observations, servedNodes, remarks } = await compareEndpoint(space, client, {
    tolerance: intent.tolerance,
    watchSeconds: intent.watchSeconds,
    promisedPeriods: listPromisedPeriods(space, sources),
    findMore: () => comparePorts(model.organizationId, space, sources),
    onProgress: (stage, done, of) => change({ stage, done, of }),
  });
  const pointChecks = await listPointChecks(model.id);
  return {
    format: AS_BUILT_FORMAT,
    model: { id: model.id, name: model.name, namespaceUri: model.namespaceUri, version: space.own.header.models[0]?.version ?? null, revision: intent.state === "working" ? null : intent.state },
    target: { id: target.id, name: target.name, endpointUrl: target.endpointUrl ?? "", securityMode: target.securityMode },
    ...(proof ? { delivery: { version: proof.release.version, gateway: proof.delivery.gatewayName, sha256: proof.delivery.bundleHash } } : {}),
    madeBy: author.name,
    startedAt,
    endedAt: new Date().toISOString(),
    tolerance: intent.tolerance,
    watchedFor: intent.watchSeconds * 1000,
    verdict: comparison.verdict,
    counts: { ...comparison.counts, servedNodes, watched: observations.length },
    differences: comparison.differences,
    observations: observations.filter((seen) => seen.samples === 0 || seen.badFor > 0 || seen.uncertainFor > 0).slice(0, MAX_KEPT_OBSERVATIONS),
    pointChecks: pointChecks.map(({ path, nodeId, stimulus, localReading, shownValue, unit, tolerance, isWithin, checkedBy, at }) => ({ path, nodeId, stimulus, localReading, shownValue, unit, tolerance, isWithin, checkedBy, at: at.toISOString() })),
    remarks,
  };
}

async function saveReport({ author, model, target, intent, proof }: Work, report: AsBuiltReport): Promise<string> {
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
      releaseId: proof?.release.id ?? null,
      deliveryId: proof?.delivery.id ?? null,
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
