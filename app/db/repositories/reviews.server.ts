/** Reviews with their reviewers and comments. */
import { and, asc, desc, eq, gt, inArray, isNotNull, isNull, lte, max, ne } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { model, transaction } from "../schema/models";
import { review, reviewComment, reviewer, type ReviewState } from "../schema/reviews";

export type ReviewRow = typeof review.$inferSelect;
export type ReviewerRow = typeof reviewer.$inferSelect;
export type ReviewCommentRow = typeof reviewComment.$inferSelect;

export async function findReview(id: string): Promise<ReviewRow | undefined> {
  const [row] = await getDatabase().select().from(review).where(eq(review.id, id));
  return row;
}

export type ListedReview = { readonly review: ReviewRow; readonly model: string; readonly namespaceUri: string };

/** Newest first. */
export async function listReviews(organizationId: string): Promise<ListedReview[]> {
  return getDatabase()
    .select({ review, model: model.name, namespaceUri: model.namespaceUri })
    .from(review)
    .innerJoin(model, eq(review.modelId, model.id))
    .where(eq(review.organizationId, organizationId))
    .orderBy(desc(review.number));
}

/** Reviews of a model that still wait for something. */
export async function listRunningReviews(modelId: string): Promise<ReviewRow[]> {
  return getDatabase()
    .select()
    .from(review)
    .where(and(eq(review.modelId, modelId), inArray(review.state, ["open", "approved", "changes-wanted"])))
    .orderBy(desc(review.number));
}

export async function findLastReviewNumber(organizationId: string): Promise<number> {
  const [row] = await getDatabase()
    .select({ n: max(review.number) })
    .from(review)
    .where(eq(review.organizationId, organizationId));
  return row?.n ?? 0;
}

export function addReviewStatement(row: typeof review.$inferInsert) {
  return getDatabase().insert(review).values(row);
}

export function updateReviewStatement(id: string, change: Partial<typeof review.$inferInsert>) {
  return getDatabase().update(review).set(change).where(eq(review.id, id));
}

export function setReviewStateStatement(id: string, state: ReviewState, closedAt: Date | null = null) {
  return updateReviewStatement(id, { state, closedAt });
}

export async function listReviewers(reviewIds: readonly string[]): Promise<ReviewerRow[]> {
  if (reviewIds.length === 0) return [];
  return getDatabase()
    .select()
    .from(reviewer)
    .where(inArray(reviewer.reviewId, [...reviewIds]))
    .orderBy(asc(reviewer.name));
}

export function addReviewerStatement(row: typeof reviewer.$inferInsert) {
  return getDatabase().insert(reviewer).values(row).onConflictDoNothing();
}

export function saveDecisionStatement(row: typeof reviewer.$inferInsert) {
  const { decision, decidedAt, decidedRevision } = row;
  return getDatabase()
    .insert(reviewer)
    .values(row)
    .onConflictDoUpdate({
      target: [reviewer.reviewId, reviewer.userId],
      set: { decision, decidedAt, decidedRevision, voidedAt: null, voidedBy: null },
    });
}

/** Approvals that hold become void; a wish for changes stays, since it was about what was there. */
export function voidApprovalsStatement(reviewId: string, by: string, at: Date) {
  return getDatabase()
    .update(reviewer)
    .set({ voidedAt: at, voidedBy: by })
    .where(and(eq(reviewer.reviewId, reviewId), eq(reviewer.decision, "approved"), isNull(reviewer.voidedAt)));
}

/** Every decision becomes void: the review has gone on to another revision. */
export function voidAllStatement(reviewId: string, by: string, at: Date) {
  return getDatabase()
    .update(reviewer)
    .set({ voidedAt: at, voidedBy: by })
    .where(and(eq(reviewer.reviewId, reviewId), isNotNull(reviewer.decision), isNull(reviewer.voidedAt)));
}

/** Comments of the review, and those of earlier reviews of the model that nobody has settled. Oldest first. */
export async function listReviewComments({ id, modelId }: Pick<ReviewRow, "id" | "modelId">): Promise<ReviewCommentRow[]> {
  const db = getDatabase();
  const own = await db.select().from(reviewComment).where(eq(reviewComment.reviewId, id));
  const open = await db
    .select()
    .from(reviewComment)
    .where(
      and(
        eq(reviewComment.modelId, modelId),
        ne(reviewComment.reviewId, id),
        isNotNull(reviewComment.nodeKey),
        isNull(reviewComment.parentId),
        isNull(reviewComment.resolvedAt),
      ),
    );
  const replies =
    open.length === 0
      ? []
      : await db
          .select()
          .from(reviewComment)
          .where(inArray(reviewComment.parentId, open.map((c) => c.id)));
  return [...own, ...open, ...replies].sort((a, b) => a.at.getTime() - b.at.getTime() || (a.id < b.id ? -1 : 1));
}

export async function findReviewComment(id: string): Promise<ReviewCommentRow | undefined> {
  const [row] = await getDatabase().select().from(reviewComment).where(eq(reviewComment.id, id));
  return row;
}

export function addReviewCommentStatement(row: typeof reviewComment.$inferInsert) {
  return getDatabase().insert(reviewComment).values(row);
}

export function updateReviewCommentStatement(id: string, change: Partial<typeof reviewComment.$inferInsert>) {
  return getDatabase().update(reviewComment).set(change).where(eq(reviewComment.id, id));
}

/** Who edited the model between two places of its history. */
export async function listEditorIds(modelId: string, afterSeq: number, throughSeq: number): Promise<Set<string>> {
  const rows = await getDatabase()
    .selectDistinct({ authorId: transaction.authorId })
    .from(transaction)
    .where(and(eq(transaction.modelId, modelId), gt(transaction.seq, afterSeq), lte(transaction.seq, throughSeq)));
  return new Set(rows.map(({ authorId }) => authorId));
}
