/** Reads for the pages of reviews: exactly what they show. */
import { mayDo, type Caller } from "../auth/caller.server";
import { can } from "../auth/permissions";
import { findRevisionByNumber, listModels, type ModelRow, type RevisionRow } from "../db/repositories/models.server";
import { listPeople } from "../db/repositories/people.server";
import { findNeededApprovals, listReleases } from "../db/repositories/releases.server";
import { listReviewComments, listReviewers, listReviews, type ReviewCommentRow, type ReviewerRow, type ReviewRow } from "../db/repositories/reviews.server";
import type { ReaderEffect } from "../domain/compare/find-affected";
import { proposeVersion } from "../domain/compare/propose-version";
import { proposeFirstVersion } from "../domain/release/release-rules";
import { compareForReaders, type ChangeForReaders } from "./compare-for-readers.server";
import { loadRevisionLayer } from "./load-revision.server";
import { holds, listAuthorIds, listObstacles } from "./review-rules.server";

export type ReviewLine = {
  readonly id: string;
  readonly number: number;
  readonly title: string;
  readonly model: string;
  readonly state: ReviewRow["state"];
  readonly author: string;
  readonly askedAt: string;
  readonly revision: number;
  readonly reviewers: readonly { readonly name: string; readonly decision: string | null }[];
  /** Whether the caller was asked and has not decided. */
  readonly waitsForMe: boolean;
  readonly isMine: boolean;
};

export async function readReviews(caller: Caller, organizationId: string): Promise<ReviewLine[]> {
  const rows = await listReviews(organizationId);
  const reviewers = await listReviewers(rows.map(({ review }) => review.id));
  return rows.map(({ review, model }) => {
    const asked = reviewers.filter((row) => row.reviewId === review.id);
    const mine = asked.find((row) => row.userId === caller.userId);
    const isRunning = review.state !== "released" && review.state !== "closed";
    return {
      id: review.id,
      number: review.number,
      title: review.title,
      model,
      state: review.state,
      author: review.author,
      askedAt: review.askedAt.toISOString(),
      revision: review.revision,
      reviewers: asked.map((row) => ({ name: row.name, decision: holds(row) ? row.decision : null })),
      waitsForMe: isRunning && mine !== undefined && !holds(mine),
      isMine: review.authorId === caller.userId,
    };
  });
}

export type ReviewChoices = {
  readonly models: readonly { readonly id: string; readonly name: string }[];
  readonly reviewers: readonly { readonly id: string; readonly name: string }[];
};

/** What can be asked for a review, and whom. */
export async function readReviewChoices(caller: Caller, organizationId: string): Promise<ReviewChoices> {
  const [models, people] = await Promise.all([listModels(organizationId), listPeople(organizationId)]);
  return {
    models: models.map(({ id, name }) => ({ id, name })),
    reviewers: people.filter((person) => person.id !== caller.userId && can(person.roles, "review.decide")).map(({ id, name }) => ({ id, name })),
  };
}

export type ReviewChange = {
  /** Unique within the comparison. */
  readonly id: string;
  /** Kind and detail: what a comment on it names. */
  readonly what: string;
  readonly kind: string;
  readonly detail: string | null;
  readonly nodeKey: string | null;
  readonly nodeId: string | null;
  readonly name: string;
  readonly owner: string | null;
  readonly path: string;
  readonly nodeClass: ChangeForReaders["nodeClass"];
  readonly isProperty: boolean;
  readonly rating: ChangeForReaders["change"]["rating"];
  readonly reason: string;
  readonly clause: string;
  readonly before: string | null;
  readonly after: string | null;
  readonly readers: readonly { readonly id: string; readonly effect: ReaderEffect; readonly nodes: number }[];
  readonly subtypes: readonly string[];
  readonly instances: readonly { readonly model: string; readonly path: string; readonly nodeId: string }[];
};

export type ReviewComment = {
  readonly id: string;
  readonly nodeKey: string | null;
  readonly change: string | null;
  readonly parentId: string | null;
  readonly author: string;
  readonly at: string;
  readonly text: string;
  readonly suggestion: string | null;
  readonly appliedBy: string | null;
  readonly resolvedBy: string | null;
  /** From an earlier review of the model; it stays with its node until it is settled. */
  readonly isCarriedOver: boolean;
};

export type ReviewState = { readonly number: number; readonly name: string; readonly hash: string; readonly at: string };

export type ReviewPage = {
  readonly review: Pick<ReviewRow, "id" | "number" | "title" | "state" | "author"> & { readonly askedAt: string };
  readonly model: { readonly id: string; readonly name: string; readonly namespaceUri: string };
  readonly base: ReviewState;
  readonly revision: ReviewState & { readonly counts: RevisionRow["counts"] };
  readonly editsSince: number;
  readonly changes: readonly ReviewChange[];
  readonly readers: readonly { readonly id: string; readonly name: string }[];
  readonly dependents: readonly string[];
  readonly proposedVersion: string;
  /** The version that would do if nothing were breaking. */
  readonly gentleVersion: string;
  readonly releases: readonly { readonly id: string; readonly version: string; readonly at: string; readonly isWithdrawn: boolean }[];
  readonly reviewers: readonly (Pick<ReviewerRow, "userId" | "name" | "decision" | "decidedRevision" | "voidedBy"> & { readonly decidedAt: string | null; readonly holds: boolean })[];
  readonly needed: number;
  readonly obstacles: readonly string[];
  readonly comments: readonly ReviewComment[];
  readonly release: { readonly id: string; readonly version: string; readonly by: string; readonly at: string } | null;
  readonly me: { readonly id: string; readonly isAuthor: boolean; readonly mayDecide: boolean; readonly mayEdit: boolean; readonly mayFreeze: boolean; readonly mayRelease: boolean };
};

export async function readReview(caller: Caller, model: ModelRow, review: ReviewRow): Promise<ReviewPage | undefined> {
  const [base, revision] = await Promise.all([findRevisionByNumber(model.id, review.baseRevision), findRevisionByNumber(model.id, review.revision)]);
  const comparison = await compareForReaders(model, review.baseRevision, review.revision);
  if (!base || !revision || !comparison) return undefined;
  const [releases, reviewers, comments, needed, obstacles, authorIds] = await Promise.all([
    listReleases(model.id),
    listReviewers([review.id]),
    listReviewComments(review),
    findNeededApprovals(model.organizationId),
    listObstacles(model, review),
    listAuthorIds(review),
  ]);
  const isRunning = review.state !== "released" && review.state !== "closed";
  const may = (action: Parameters<typeof mayDo>[1]): boolean => mayDo(caller, action, model.organizationId);
  const released = releases.find((release) => release.reviewId === review.id);
  const before = releases.find((release) => release.withdrawnAt === null && release.reviewId !== review.id);
  const entry = (await loadRevisionLayer(model.id, review.revision))?.header.models[0];
  const propose = (rating: ReviewChange["rating"] | undefined): string => (before ? proposeVersion(before.modelVersion, rating) : undefined) ?? proposeFirstVersion(entry);
  const gentle = comparison.changes.some(({ change }) => change.rating === "additive") ? "additive" : "neutral";
  return {
    review: { id: review.id, number: review.number, title: review.title, state: review.state, author: review.author, askedAt: review.askedAt.toISOString() },
    model: { id: model.id, name: model.name, namespaceUri: model.namespaceUri },
    base: toStateJson(base, releases.find((release) => release.revision === base.number)?.version),
    revision: { ...toStateJson(revision, released?.version), counts: revision.counts },
    editsSince: isRunning ? model.headSeq - revision.seq : 0,
    changes: comparison.changes.map(toChangeJson),
    readers: comparison.readers,
    dependents: comparison.dependents.map(({ name }) => name),
    proposedVersion: propose(comparison.rating),
    gentleVersion: propose(comparison.rating === "breaking" ? gentle : comparison.rating),
    releases: releases.map((release) => ({ id: release.id, version: release.version, at: release.at.toISOString(), isWithdrawn: release.withdrawnAt !== null })).reverse(),
    reviewers: reviewers.map((row) => ({
      userId: row.userId,
      name: row.name,
      decision: row.decision,
      decidedAt: row.decidedAt?.toISOString() ?? null,
      decidedRevision: row.decidedRevision,
      voidedBy: row.voidedBy,
      holds: holds(row),
    })),
    needed,
    obstacles,
    comments: comments.map((comment) => toCommentJson(comment, review.id)),
    release: released ? { id: released.id, version: released.version, by: released.releasedBy, at: released.at.toISOString() } : null,
    me: {
      id: caller.userId,
      isAuthor: authorIds.has(caller.userId),
      mayDecide: isRunning && may("review.decide"),
      mayEdit: may("model.edit"),
      mayFreeze: isRunning && may("revision.freeze"),
      mayRelease: isRunning && may("release"),
    },
  };
}

function toStateJson(revision: RevisionRow, version: string | undefined): ReviewState {
  return { number: revision.number, name: version ?? `r${revision.number}`, hash: revision.packHash, at: revision.at.toISOString() };
}

function toChangeJson({ change, affected, nodeClass, isProperty, name, owner }: ChangeForReaders, index: number): ReviewChange {
  const { kind, detail, key, nodeId, path, rating, reason, clause, before, after } = change;
  return {
    id: `c${index}`,
    what: detail === undefined ? kind : `${kind} ${detail}`,
    kind,
    detail: detail ?? null,
    nodeKey: key ?? null,
    nodeId: nodeId ?? null,
    name,
    owner,
    path,
    nodeClass,
    isProperty,
    rating,
    reason,
    clause,
    before,
    after,
    readers: affected.readers.map(({ id, effect, nodeIds }) => ({ id, effect, nodes: nodeIds.length })),
    subtypes: affected.subtypes.map((place) => place.path),
    instances: affected.instances.map(({ model, path: at, nodeId: id }) => ({ model, path: at, nodeId: id })),
  };
}

function toCommentJson(row: ReviewCommentRow, reviewId: string): ReviewComment {
  return {
    id: row.id,
    nodeKey: row.nodeKey,
    change: row.change,
    parentId: row.parentId,
    author: row.author,
    at: row.at.toISOString(),
    text: row.text,
    suggestion: row.suggestion?.text ?? null,
    appliedBy: row.appliedBy,
    resolvedBy: row.resolvedBy,
    isCarriedOver: row.reviewId !== reviewId,
  };
}
