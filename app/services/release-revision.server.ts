/**
 * Releasing: the version is written into the approved state, that state is frozen, the bundle is built once, signed and
 * kept. Only what was approved goes out: an edit in between ends the attempt.
 */
import { strFromU8, unzipSync } from "fflate";
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { addBlobStatement, findBlob, toBlob } from "../db/repositories/blobs.server";
import { findModel, findRevisionByNumber, type ModelRow, type RevisionRow } from "../db/repositories/models.server";
import { listPeople } from "../db/repositories/people.server";
import { addReleaseStatement, listOrganizationReleases, listReleases, updateReleaseStatement, type ReleaseRow } from "../db/repositories/releases.server";
import { setReviewStateStatement, type ReviewRow } from "../db/repositories/reviews.server";
import type { ReleasedRequirement } from "../db/schema/reviews";
import type { AddressSpace } from "../domain/address-space/address-space";
import { getOwnNamespace, type ModelEntry } from "../domain/address-space/model-header";
import { compareModels } from "../domain/compare/compare-models";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { BlockAllocator } from "../domain/editing/allocate-node-id";
import { applyOperations } from "../domain/editing/apply-operation";
import { toRequiredRow } from "../domain/editing/commands/create-model";
import { setModelInfo } from "../domain/editing/commands/set-model-info";
import type { Operation } from "../domain/editing/operation";

import type { KnownSource } from "../domain/deliver/make-mapping-document";
import { planRelease, type ReleasedVersion } from "../domain/release/release-rules";
import { newId } from "../utils/ids.server";
import { applyEdit } from "./apply-edit.server";
import { auditOf, tell } from "./ask-review.server";
import { buildBundle, rebuildBundle, SOURCES_FILE } from "./build-bundle.server";
import { listWebhookStatements } from "./call-webhooks.server";
import { freezeRevision } from "./freeze-revision.server";
import { loadPlannedSources } from "./load-planned-sources.server";
import { loadState } from "./load-revision.server";
import { listMailStatements, toUrl } from "./queue-mail.server";
import { listObstacles, type ReleaseObstacle } from "./review-rules.server";
import { requireSigningKey } from "./signing-keys.server";
import { loadWorkingModel } from "./working-model.server";

export const releaseSchema = z.strictObject({
  version: z.string().trim().min(1).max(50),
  notes: z.string().trim().max(4000).default(""),
});
export type ReleaseIntent = z.infer<typeof releaseSchema>;

const OBSTACLE_CODES: Readonly<Record<ReleaseObstacle, string>> = {
  variant: "release.blocked-variant",
  edited: "release.blocked-edited",
  approvals: "release.blocked-approvals",
  "changes-wanted": "release.blocked-changes-wanted",
  errors: "release.blocked-errors",
  closed: "release.blocked-closed",
};

/** Problems: `release.blocked-…`, those of `planRelease`, `release.requirement-unreleased`, `review.edited`. */
export async function releaseRevision(author: Caller, model: ModelRow, review: ReviewRow, intent: ReleaseIntent): Promise<Result<ReleaseRow>> {
  const obstacles = await listObstacles(model, review);
  if (obstacles.length > 0) return fail(...obstacles.map((obstacle) => problem(OBSTACLE_CODES[obstacle])));
  const revision = await findRevisionByNumber(model.id, review.revision);
  const space = await loadState(model, review.revision);
  if (!revision || !space) return fail(problem("request.not-found"));
  const previous = await findPrevious(model.id);
  const before = await loadState(model, previous?.revision ?? 0);
  const { rating } = compareModels(before ?? space, space);
  const required = await pinRequired(model, space, revision);
  if (!required.ok) return required;
  const plan = planRelease({
    version: intent.version,
    publicationDate: `${new Date().toISOString().slice(0, 19)}Z`,
    rating,
    last: previous,
    required: required.value.entries,
  });
  if (!plan.ok) return plan;
  const frozen = await freezeReleased(author, model, plan.value, required.value.entries);
  if (!frozen.ok) return frozen;
  return store(author, model, review, { ...intent, plan: plan.value, rating: rating ?? null, previous, required: required.value.rows, revision: frozen.value });
}

async function findPrevious(modelId: string): Promise<ReleaseRow | undefined> {
  return (await listReleases(modelId)).find((release) => release.withdrawnAt === null);
}

type Pinned = { readonly entries: readonly ModelEntry[]; readonly rows: readonly ReleasedRequirement[] };

/** Exact releases of the required models: those beneath the frozen revision, models of the team by their own releases. */
async function pinRequired(model: ModelRow, space: AddressSpace, revision: RevisionRow): Promise<Result<Pinned>> {
  const releases = (await listOrganizationReleases(model.organizationId)).filter(({ release }) => release.withdrawnAt === null);
  const problems: Problem[] = [];
  const rows: ReleasedRequirement[] = [];
  const entries: ModelEntry[] = [];
  const wanted = new Set((space.own.header.models[0]?.requiredModels ?? []).map((row) => row.modelUri));
  for (const layer of space.layers.slice(0, -1)) {
    const uri = getOwnNamespace(layer.header);
    const entry = layer.header.models.find((row) => row.modelUri === uri) ?? { modelUri: uri, requiredModels: [] };
    const kept = revision.pinned?.find((row) => row.modelUri === uri);
    const released = kept?.kept === "blob" ? releases.find(({ release }) => release.packHash === kept.hash) : undefined;
    const isOfTeam = kept?.kept === "blob" && (model.pins ?? []).some((pin) => pin.modelUri === uri);
    if (isOfTeam && !released) problems.push(problem("release.requirement-unreleased", { name: uri, revision: (model.pins ?? []).find((pin) => pin.modelUri === uri)?.number ?? 0 }));
    if (wanted.has(uri)) entries.push(toRequiredRow(entry));
    const { version, modelVersion, publicationDate } = entry;
    rows.push({
      modelUri: uri,
      ...(version === undefined ? {} : { version }),
      ...(modelVersion === undefined ? {} : { modelVersion }),
      ...(publicationDate === undefined ? {} : { publicationDate }),
      sha256: released?.release.bundleHash ?? kept?.hash ?? "",
    });
  }
  return problems.length > 0 ? fail(...problems) : ok({ entries, rows });
}

/** Writes version, date and required models into the model as one edit and freezes what comes of it. */
async function freezeReleased(author: Caller, model: ModelRow, plan: ReleasedVersion, required: readonly ModelEntry[]): Promise<Result<RevisionRow>> {
  const working = await loadWorkingModel(model.id);
  if (!working || working.seq !== model.headSeq) return fail(problem("review.edited"));
  const operations = listVersionOperations(working.space, plan, required);
  if (!operations.ok) return operations;
  const edited = await applyEdit(author, model.id, { base: working.seq, label: "release", operations: operations.value, keepsApprovals: true });
  if (!edited.ok) return edited;
  const now = await findModel(model.id);
  const frozen = now && (await freezeRevision(author, now, `Release ${plan.version}`));
  if (!frozen?.ok) return frozen ?? fail(problem("request.not-found"));
  if (frozen.value.seq !== edited.value.head) return fail(problem("review.edited"));
  const revision = await findRevisionByNumber(model.id, frozen.value.number);
  return revision ? ok(revision) : fail(problem("request.not-found"));
}

function listVersionOperations(space: AddressSpace, plan: ReleasedVersion, required: readonly ModelEntry[]): Result<readonly Operation[]> {
  const [row, ...others] = space.own.header.models;
  if (!row) return fail(problem("model.no-row"));
  const rows = row.requiredModels.map((old) => required.find((entry) => entry.modelUri === old.modelUri) ?? old);
  const pin: Operation = { kind: "setHeader", field: "models", value: [{ ...row, requiredModels: rows }, ...others] };
  const pinned = applyOperations(space, [pin]);
  if (!pinned.ok) return pinned;
  const named = setModelInfo(pinned.value, new BlockAllocator(row.modelUri, []), plan);
  return named.ok ? ok([pin, ...named.value.operations]) : named;
}

type Released = ReleaseIntent & {
  readonly plan: ReleasedVersion;
  readonly rating: ReleaseRow["rating"];
  readonly previous: ReleaseRow | undefined;
  readonly required: readonly ReleasedRequirement[];
  readonly revision: RevisionRow;
};

async function store(author: Caller, model: ModelRow, review: ReviewRow, released: Released): Promise<Result<ReleaseRow>> {
  const { plan, revision, previous, rating, required } = released;
  const key = await requireSigningKey(author, model.organizationId);
  // Through JSON, as the bundle keeps them: built again from there, the same bytes come out.
  const sources = JSON.parse(JSON.stringify((await loadPlannedSources(model.organizationId)).map(toKnownSource))) as KnownSource[];
  const bundle = await buildBundle({ model, revision, ...plan, rating, previous, required, keyId: key.id, sources });
  const blob = await toBlob(bundle.bytes);
  const now = new Date();
  const release: ReleaseRow = {
    id: newId(),
    organizationId: model.organizationId,
    modelId: model.id,
    reviewId: review.id,
    revision: revision.number,
    ...plan,
    rating,
    previousId: previous?.id ?? null,
    packHash: revision.packHash,
    bundleHash: bundle.hash,
    bundleSize: bundle.bytes.length,
    fileName: bundle.fileName,
    files: bundle.manifest.files,
    required,
    keyId: key.id,
    notes: released.notes,
    releasedBy: author.name,
    at: now,
    withdrawnAt: null,
    withdrawnBy: null,
    withdrawnReason: null,
  };
  const statements: [Statement, ...Statement[]] = [addBlobStatement(blob, now), addReleaseStatement(release), setReviewStateStatement(review.id, "released", now)];
  statements.push(
    auditOf(author, review, "review.release", { version: plan.version }),
    auditRelease(author, release, model, "release.publish", { version: plan.version, revision: revision.number, hash: bundle.hash }),
    ...(await listReleaseMail(author, model, release, `${model.name} ${plan.version} is released`, [`${author.name} released ${model.name} ${plan.version}.`, `SHA-256 of the bundle: ${bundle.hash}`, ...(released.notes === "" ? [] : [released.notes])])),
    ...(await listWebhookStatements(model.organizationId, "release.published", describeForWebhook(model, release))),
  );
  await writeBatch(statements);
  tell(model);
  return ok(release);
}

export function describeForWebhook(model: Pick<ModelRow, "id" | "name" | "namespaceUri">, release: ReleaseRow) {
  return {
    model: { id: model.id, name: model.name, namespaceUri: model.namespaceUri },
    release: {
      id: release.id,
      version: release.version,
      modelVersion: release.modelVersion,
      publicationDate: release.publicationDate,
      revision: release.revision,
      rating: release.rating,
      sha256: release.bundleHash,
      bundle: toUrl(`/api/v1/releases/${release.id}/bundle`),
    },
  };
}

async function listReleaseMail(author: Caller, model: ModelRow, release: ReleaseRow, subject: string, paragraphs: readonly string[]): Promise<Statement[]> {
  const people = (await listPeople(model.organizationId)).filter((person) => person.id !== author.userId);
  return listMailStatements(model.organizationId, "release", people, { subject, paragraphs, link: { text: "Open the release", path: `/releases/${release.id}` } });
}

export function auditRelease(author: Caller, release: ReleaseRow, model: Pick<ModelRow, "name">, action: `release.${string}`, details: Readonly<Record<string, unknown>>): Statement {
  return addAuditStatement({
    organizationId: release.organizationId,
    userId: author.userId,
    userName: author.name,
    action,
    subject: { kind: "release", id: release.id, name: `${model.name} ${release.version}` },
    details,
  });
}

export const withdrawSchema = z.strictObject({ reason: z.string().trim().min(1).max(1000) });

/** The release stays where it is named, as withdrawn. Problem: `release.withdrawn`. */
export async function withdrawRelease(author: Caller, model: ModelRow, release: ReleaseRow, reason: string): Promise<Result<null>> {
  if (release.withdrawnAt !== null) return fail(problem("release.withdrawn", { by: release.withdrawnBy ?? "" }));
  const paragraphs = [`${author.name} withdrew ${model.name} ${release.version}.`, reason, `SHA-256 of its bundle: ${release.bundleHash}`];
  await writeBatch([
    updateReleaseStatement(release.id, { withdrawnAt: new Date(), withdrawnBy: author.name, withdrawnReason: reason }),
    auditRelease(author, release, model, "release.withdraw", { reason }),
    ...(await listReleaseMail(author, model, release, `${model.name} ${release.version} is withdrawn`, paragraphs)),
    ...(await listWebhookStatements(model.organizationId, "release.withdrawn", { ...describeForWebhook(model, release), reason })),
  ]);
  tell(model);
  return ok(null);
}

/** The bundle as it was built. */
export function loadBundle(release: Pick<ReleaseRow, "bundleHash">): Promise<Buffer | undefined> {
  return findBlob(release.bundleHash);
}

/** Builds the bundle again from its revision; the answer is its hash, which must be that of the release. */
export async function proveReproducible(model: ModelRow, release: ReleaseRow): Promise<string> {
  const previous = (await listReleases(model.id)).find((other) => other.id === release.previousId);
  const kept = release.files.some((file) => file.path === SOURCES_FILE) ? await loadBundle(release) : undefined;
  const sources = kept && unzipSync(kept, { filter: (entry) => entry.name === SOURCES_FILE })[SOURCES_FILE];
  return (await rebuildBundle(model, release, sources ? (JSON.parse(strFromU8(sources)) as KnownSource[]) : [], previous)).hash;
}

/** What a mapping document says of a source: not its ports, which are planned anew at any time. */
function toKnownSource({ id, name, kind, address }: KnownSource): KnownSource {
  return { id, name, kind, address };
}
