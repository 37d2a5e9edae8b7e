/**
 * The working state of each model: revision 0 or a snapshot, plus the transactions since, kept in memory while it is
 * used. `appendTransactions` is the only writer of a model's contents; it and everything else that must see a model at
 * rest takes the model's turn, so that two windows can never both be the next one.
 */
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { addBlobStatement, toBlob } from "../db/repositories/blobs.server";
import {
  addEventStatement,
  addSnapshotStatement,
  addTransactionStatement,
  findAccepted,
  findModel,
  listTransactions,
  pruneSnapshots,
  updateModelStatement,
  type AcceptedTransaction,
  type ModelRow,
} from "../db/repositories/models.server";
import { addRetiredStatements, HIGHEST_LEASED_IDENTIFIER, raiseLedgerStatement } from "../db/repositories/node-ids.server";
import type { PinRow } from "../db/schema/models";
import { AddressSpace } from "../domain/address-space/address-space";
import { getOwnNamespace } from "../domain/address-space/model-header";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { applyWithInverse } from "../domain/editing/invert-operation";
import { listGivenNodeIds } from "../domain/editing/given-node-ids";
import type { Operation, Transaction } from "../domain/editing/operation";
import { toPackContent, writePack } from "../domain/nodeset/pack";
import { logError } from "../utils/log.server";
import { singleton } from "../utils/singleton.server";
import { describeHeader } from "./describe-header.server";
import { publish } from "./event-hub.server";
import { listMovedWaivers } from "./move-waivers.server";
import { forgetNewestLayer, keepNewestLayer, loadNewestLayer } from "./own-layer.server";
import { choosePins } from "./pins.server";
import { findGivenTwice, listRetired } from "./retire-node-ids.server";
import { voidApprovals } from "./void-approvals.server";
import { areLayersCurrent, resolveRequiredModels, type RequiredLayer } from "./required-models.server";

export type WorkingModel = {
  readonly model: ModelRow;
  readonly space: AddressSpace;
  readonly seq: number;
  /** The required models beneath, in order, with where a browser gets each. */
  readonly layers: readonly RequiredLayer[];
  /** Required models that are missing, as errors; the space then stands on what is there. */
  readonly missing: readonly Problem[];
  /** Required models that are there in an older version only. */
  readonly warnings: readonly Problem[];
};

const SNAPSHOT_EVERY = 200;
const MAX_CACHED = 24;

type Cache = { readonly models: Map<string, Promise<WorkingModel | undefined>>; readonly turns: Map<string, Promise<unknown>> };
const getCache = () => singleton<Cache>("working-models", () => ({ models: new Map(), turns: new Map() }));

/** The newest state, or undefined when there is no such model. Who calls has asked for the permission. */
export async function loadWorkingModel(modelId: string): Promise<WorkingModel | undefined> {
  const { models } = getCache();
  for (;;) {
    const cached = models.get(modelId);
    if (!cached) return startLoading(modelId, loadFromStore(modelId));
    const working = await cached;
    const head = (await findModel(modelId))?.headSeq;
    const isOnCurrentLayers = working !== undefined && (await areLayersCurrent(working.layers));
    // A writer may have put a newer state there while we waited; only what we judged may be kept or replaced.
    if (models.get(modelId) !== cached) continue;
    // Another process on the same database may have moved the head.
    if (!working || head !== working.seq) return startLoading(modelId, loadFromStore(modelId));
    if (!isOnCurrentLayers) return startLoading(modelId, withFreshLayers(working));
    touch(modelId, cached);
    return working;
  }
}

async function startLoading(modelId: string, loading: Promise<WorkingModel | undefined>): Promise<WorkingModel | undefined> {
  const { models } = getCache();
  const forget = () => {
    if (models.get(modelId) === loading) models.delete(modelId);
  };
  touch(modelId, loading);
  loading.then((loaded) => loaded ?? forget(), forget);
  return loading;
}

function touch(modelId: string, loading: Promise<WorkingModel | undefined>): void {
  const { models } = getCache();
  models.delete(modelId);
  models.set(modelId, loading);
  for (const oldest of models.keys()) {
    if (models.size <= MAX_CACHED) break;
    models.delete(oldest);
  }
}

/** Forgets a model that was deleted or replaced. */
export function forgetWorkingModel(modelId: string): void {
  getCache().models.delete(modelId);
  forgetNewestLayer(modelId);
}

/** Runs the work when all earlier work on this model is done. */
export function inModelTurn<T>(modelId: string, work: () => Promise<T>): Promise<T> {
  const { turns } = getCache();
  const turn = (turns.get(modelId) ?? Promise.resolve()).then(work, work);
  const settled = turn.catch(() => undefined);
  turns.set(modelId, settled);
  void settled.then(() => {
    if (turns.get(modelId) === settled) turns.delete(modelId);
  });
  return turn;
}

async function loadFromStore(modelId: string): Promise<WorkingModel | undefined> {
  const model = await findModel(modelId);
  if (!model) return undefined;
  const own = await loadNewestLayer(model);
  const required = await resolveRequiredModels(model.organizationId, own.header, model.pins);
  return {
    model,
    seq: model.headSeq,
    ...required,
    space: AddressSpace.of(required.layers.map((l) => l.layer), own),
  };
}

async function withFreshLayers(working: WorkingModel): Promise<WorkingModel> {
  const { organizationId, pins } = working.model;
  const required = await resolveRequiredModels(organizationId, working.space.own.header, pins);
  return { ...working, ...required, space: working.space.withRequired(required.layers.map((l) => l.layer)) };
}

export type NewTransaction = { readonly clientSeq: number; readonly label: string; readonly operations: readonly Operation[] };
export type AppendIntent = {
  readonly clientId: string;
  readonly base: number;
  readonly transactions: readonly NewTransaction[];
  /** Frozen revisions that the model stands on from now; the operations are meant for them. */
  readonly pins?: readonly PinRow[];
  /** The window that asked for it, which loads anew by itself. */
  readonly window?: string;
  /** Approvals of a running review stay: only the version of a release is written in. */
  readonly keepsApprovals?: true;
};
export type AppendOutcome =
  | { readonly kind: "accepted"; readonly head: number; readonly accepted: readonly AcceptedTransaction[] }
  | { readonly kind: "stale"; readonly head: number; readonly between: readonly Transaction[]; readonly accepted: readonly AcceptedTransaction[] }
  | { readonly kind: "refused"; readonly head: number; readonly problems: readonly Problem[]; readonly accepted: readonly AcceptedTransaction[] }
  | { readonly kind: "gone" };

/**
 * Accepts all transactions or none. What was accepted before (same client and number) is answered as it was then. When
 * others were quicker than `base`, answers what came between; the window rebases and sends again.
 */
export function appendTransactions(modelId: string, author: Caller, intent: AppendIntent): Promise<AppendOutcome> {
  return inModelTurn(modelId, () => append(modelId, author, intent));
}

async function append(modelId: string, author: Caller, intent: AppendIntent): Promise<AppendOutcome> {
  const working = await loadWorkingModel(modelId);
  if (!working) return { kind: "gone" };
  const { clientId, transactions } = intent;
  const accepted = await findAccepted(modelId, clientId, transactions.map((t) => t.clientSeq));
  const known = new Set(accepted.map((a) => a.clientSeq));
  const fresh = transactions.filter((t) => !known.has(t.clientSeq));
  if (fresh.length === 0) return { kind: "accepted", head: working.seq, accepted };
  const seen = new Set(accepted.map((a) => a.seq));
  const between = await listBetween(modelId, intent.base, working.seq);
  if (between.some((t) => !seen.has(t.seq))) return { kind: "stale", head: working.seq, between, accepted };
  if (intent.base > working.seq) {
    return { kind: "refused", head: working.seq, accepted, problems: [problem("transactions.ahead", { base: intent.base, head: working.seq })] };
  }
  const start = intent.pins ? await withPins(working, intent.pins) : working;
  const applied = await applyAll(start, author, clientId, fresh);
  if (!applied.ok) return { kind: "refused", head: working.seq, problems: applied.problems, accepted };
  const givenTwice = await findGivenTwice(working.model.organizationId, applied.value.added);
  if (givenTwice.length > 0) return { kind: "refused", head: working.seq, problems: givenTwice, accepted };
  try {
    if (intent.pins) publish(`model:${modelId}`, { pinned: true, by: intent.window ?? clientId });
    await save(start.space, applied.value.working, author, applied.value.added);
  } catch (error) {
    // The database refuses a number that another process has given meanwhile; then we were too late like any other window.
    if ((await findModel(modelId))?.headSeq === working.seq) throw error;
    forgetWorkingModel(modelId);
    return append(modelId, author, intent);
  }
  if (!intent.keepsApprovals) await voidApprovals(working.model, author);
  const added = applied.value.added.map(({ clientSeq, seq, at }) => ({ clientSeq, seq, at }));
  return { kind: "accepted", head: applied.value.working.seq, accepted: [...accepted, ...added] };
}

async function listBetween(modelId: string, base: number, head: number): Promise<Transaction[]> {
  return base >= head ? [] : listTransactions(modelId, base, head - base);
}

type Applied = { readonly working: WorkingModel; readonly added: readonly Transaction[] };

async function applyAll(start: WorkingModel, author: Caller, clientId: string, fresh: readonly NewTransaction[]): Promise<Result<Applied>> {
  let working = start;
  const added: Transaction[] = [];
  const at = new Date().toISOString();
  for (const { clientSeq, label, operations } of fresh) {
    const applied = applyWithInverse(working.space, operations);
    if (!applied.ok) return fail(...applied.problems.map((p) => ({ ...p, data: { ...p.data, clientSeq } })));
    const { space, inverse } = applied.value;
    const seq = working.seq + 1;
    added.push({ seq, base: working.seq, clientId, clientSeq, author: author.name, at, label, operations, inverse });
    working = { ...working, seq, space };
    if (operations.some((o) => o.kind === "setHeader" && o.field === "models")) {
      const changed = await withChangedModels(start, working);
      if (!changed.ok) return changed;
      working = changed.value;
    }
  }
  return ok({ working, added });
}

async function withPins(working: WorkingModel, pins: readonly PinRow[]): Promise<WorkingModel> {
  return withFreshLayers({ ...working, model: { ...working.model, pins } });
}

/** The models table changed: other required models may lie beneath now, and the own namespace must stay what it is. */
async function withChangedModels(before: WorkingModel, after: WorkingModel): Promise<Result<WorkingModel>> {
  const { header } = after.space.own;
  if (getOwnNamespace(header) !== before.model.namespaceUri) {
    return fail(problem("model.namespace-fixed", { namespaceUri: before.model.namespaceUri }));
  }
  const { organizationId, kind } = after.model;
  const known = after.model.pins;
  const pins = kind === "machines" && known ? await choosePins(organizationId, header, known) : known;
  const required = await resolveRequiredModels(organizationId, header, pins);
  const missingBefore = new Set(before.missing.map((p) => String(p.data?.modelUri)));
  const newlyMissing = required.missing.filter((p) => !missingBefore.has(String(p.data?.modelUri)));
  if (newlyMissing.length > 0) return fail(...newlyMissing);
  const space = after.space.withRequired(required.layers.map((l) => l.layer));
  return ok({ ...after, ...required, space, model: { ...after.model, pins } });
}

async function save(before: AddressSpace, working: WorkingModel, author: Caller, added: readonly Transaction[]): Promise<void> {
  const { model, space, seq } = working;
  const now = new Date();
  const topic = `model:${model.id}`;
  const change = { headSeq: seq, nodeCount: space.own.nodes.size, updatedAt: now, updatedBy: author.name, pins: model.pins, ...describeHeader(space.own.header) };
  const statements: Statement[] = [updateModelStatement(model.id, change)];
  for (const entry of added) statements.push(addTransactionStatement(model.id, author.userId, entry));
  const highest = findHighestGiven(model.namespaceUri, added);
  if (highest > 0) statements.push(raiseLedgerStatement(model.organizationId, model.namespaceUri, highest));
  statements.push(...addRetiredStatements(model.organizationId, listRetired(added)));
  statements.push(...(await listMovedWaivers(model.id, before, space, added.flatMap((entry) => entry.operations))));
  const firstEvent = statements.length;
  for (const entry of added) statements.push(addEventStatement(topic, entry.seq, now));
  const results = await writeBatch(statements as [Statement, ...Statement[]]);
  touch(model.id, Promise.resolve({ ...working, model: { ...model, ...change } }));
  keepNewestLayer(model.id, seq, space.own);
  added.forEach((entry, i) => publish(topic, entry, (results[firstEvent + i] as { seq: number }[])[0]?.seq));
  const isDue = Math.floor(seq / SNAPSHOT_EVERY) > Math.floor((seq - added.length) / SNAPSHOT_EVERY);
  if (isDue) void saveSnapshot(model.id, space, seq).catch((error: unknown) => logError(error, "snapshot"));
}

/** The highest numeric identifier of the namespace that these transactions give, within the range that is leased. */
function findHighestGiven(namespaceUri: string, added: readonly Transaction[]): number {
  let highest = 0;
  for (const { operations } of added) {
    for (const operation of operations) {
      for (const { nodeId } of listGivenNodeIds(operation)) {
        if (nodeId.namespaceUri !== namespaceUri || typeof nodeId.identifier !== "number") continue;
        if (nodeId.identifier <= HIGHEST_LEASED_IDENTIFIER) highest = Math.max(highest, nodeId.identifier);
      }
    }
  }
  return highest;
}

/** Stores the own layer as it is now, so that the next load replays little. */
async function saveSnapshot(modelId: string, space: AddressSpace, seq: number): Promise<void> {
  const blob = await toBlob(writePack(toPackContent(space.own)));
  await writeBatch([addBlobStatement(blob, new Date()), addSnapshotStatement(modelId, seq, blob.hash)]);
  await pruneSnapshots(modelId);
}
