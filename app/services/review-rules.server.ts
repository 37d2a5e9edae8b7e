/** What the rules of reviews ask of the database: who made the work, and whether it may be released. */
import { findRevisionByNumber, listRevisions, type ModelRow } from "../db/repositories/models.server";
import { findNeededApprovals, listReleases } from "../db/repositories/releases.server";
import { listEditorIds, listReviewers, type ReviewerRow, type ReviewRow } from "../db/repositories/reviews.server";
import type { ReviewState } from "../db/schema/reviews";

/** Everybody who edited between the two revisions, and who asked: none of them may approve. */
export async function listAuthorIds(review: Pick<ReviewRow, "modelId" | "authorId" | "baseRevision" | "revision">): Promise<Set<string>> {
  const base = await findRevisionByNumber(review.modelId, review.baseRevision);
  const revision = await findRevisionByNumber(review.modelId, review.revision);
  const editors = await listEditorIds(review.modelId, base?.seq ?? 0, revision?.seq ?? 0);
  return editors.add(review.authorId);
}

export function holds(row: Pick<ReviewerRow, "decision" | "voidedAt">): boolean {
  return row.decision !== null && row.voidedAt === null;
}

/** Changes that somebody wants come first; then it counts how many approve. */
export function decideState(reviewers: readonly Pick<ReviewerRow, "decision" | "voidedAt">[], needed: number): ReviewState {
  const held = reviewers.filter(holds);
  if (held.some((row) => row.decision === "changes-wanted")) return "changes-wanted";
  return held.filter((row) => row.decision === "approved").length >= needed ? "approved" : "open";
}

export type ReleaseObstacle =
  | "variant"
  | "edited"
  | "approvals"
  | "changes-wanted"
  | "errors"
  | "closed";

/** Why the revision of a review cannot be released now; empty when it can. */
export async function listObstacles(model: ModelRow, review: ReviewRow): Promise<ReleaseObstacle[]> {
  const obstacles: ReleaseObstacle[] = [];
  if (model.variantOf !== null) obstacles.push("variant");
  if (review.state === "released" || review.state === "closed") return [...obstacles, "closed"];
  const [newest] = await listRevisions(model.id);
  const revision = await findRevisionByNumber(model.id, review.revision);
  if (!revision || newest?.number !== revision.number || revision.seq !== model.headSeq) obstacles.push("edited");
  const reviewers = await listReviewers([review.id]);
  const needed = await findNeededApprovals(model.organizationId);
  const state = decideState(reviewers, needed);
  if (state === "changes-wanted") obstacles.push("changes-wanted");
  else if (state !== "approved") obstacles.push("approvals");
  if ((revision?.counts?.error ?? 0) > 0) obstacles.push("errors");
  return obstacles;
}

/** The revision that a new review compares with: that of the newest release that holds, else the beginning. */
export async function findBaseRevision(modelId: string): Promise<number> {
  return (await listReleases(modelId)).find((release) => release.withdrawnAt === null)?.revision ?? 0;
}
