/** Reviews as the API tells them. */
import type { z } from "zod";
import type { ModelRow } from "../db/repositories/models.server";
import { findReview, listReviewComments, listReviewers, listReviews, type ReviewRow } from "../db/repositories/reviews.server";
import type { reviewCommentSchema, reviewSchema } from "../utils/release-schemas";
import { holds, listObstacles } from "./review-rules.server";

export type ReviewJson = z.infer<typeof reviewSchema>;

export async function describeReview(model: ModelRow, review: ReviewRow): Promise<ReviewJson> {
  const reviewers = await listReviewers([review.id]);
  return {
    id: review.id,
    number: review.number,
    title: review.title,
    modelId: review.modelId,
    revision: review.revision,
    baseRevision: review.baseRevision,
    state: review.state,
    author: review.author,
    askedAt: review.askedAt.toISOString(),
    reviewers: reviewers.map((row) => ({
      userId: row.userId,
      name: row.name,
      decision: row.decision,
      decidedRevision: row.decidedRevision,
      holds: holds(row),
    })),
    obstacles: await listObstacles(model, review),
  };
}

export async function listModelReviews(model: ModelRow): Promise<ReviewJson[]> {
  const rows = (await listReviews(model.organizationId)).filter(({ review }) => review.modelId === model.id);
  return Promise.all(rows.map(({ review }) => describeReview(model, review)));
}

/** The review as it is after an act. */
export async function findReviewAgain(review: ReviewRow): Promise<ReviewRow> {
  return (await findReview(review.id)) ?? review;
}

export async function describeComments(review: ReviewRow): Promise<z.infer<typeof reviewCommentSchema>[]> {
  return (await listReviewComments(review)).map((row) => ({
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
  }));
}
