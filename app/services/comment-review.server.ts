/** Comments on nodes and changes, replies, what settles them, and suggestions that the author applies as they are. */
import { z } from "zod";
import { mayDo, type Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import type { ModelRow } from "../db/repositories/models.server";
import { listPeople } from "../db/repositories/people.server";
import {
  addReviewCommentStatement,
  findReviewComment,
  listReviewComments,
  listReviewers,
  updateReviewCommentStatement,
  type ReviewCommentRow,
  type ReviewRow,
} from "../db/repositories/reviews.server";
import type { Suggestion } from "../db/schema/reviews";
import type { NodeKey } from "../domain/address-space/node-id";
import type { Change } from "../domain/compare/change";
import { takeBackChange } from "../domain/compare/take-back-change";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { isMappingEdit } from "../domain/editing/operation";
import { newId } from "../utils/ids.server";
import { applyEdit } from "./apply-edit.server";
import { auditOf, tell } from "./ask-review.server";
import { loadState } from "./load-revision.server";
import { listMailStatements } from "./queue-mail.server";
import { loadWorkingModel } from "./working-model.server";

export const commentSchema = z.strictObject({
  text: z.string().trim().min(1).max(4000),
  nodeKey: z.string().min(1).max(5000).optional(),
  /** The change's kind and detail, as the comparison names them. */
  change: z.string().max(500).optional(),
  parentId: z.string().max(100).optional(),
  /** Suggests to take the change back; the author applies it with one key. */
  takesBack: z.boolean().optional(),
  /** Settles the thread that it replies to. */
  settles: z.boolean().optional(),
});
export type CommentIntent = z.infer<typeof commentSchema>;

/** Problems: `review.comment-gone` for a reply to nothing, `review.no-way-back` where the change cannot be taken back. */
export async function addReviewComment(author: Caller, model: ModelRow, review: ReviewRow, intent: CommentIntent): Promise<Result<ReviewCommentRow>> {
  const parent = intent.parentId === undefined ? undefined : await findReviewComment(intent.parentId);
  if (intent.parentId !== undefined && parent?.modelId !== model.id) return fail(problem("review.comment-gone"));
  const suggestion = intent.takesBack ? await suggestTakingBack(model, review, intent) : undefined;
  if (intent.takesBack && !suggestion) return fail(problem("review.no-way-back"));
  const now = new Date();
  const comment: ReviewCommentRow = {
    id: newId(),
    reviewId: parent?.reviewId ?? review.id,
    modelId: model.id,
    nodeKey: parent?.nodeKey ?? intent.nodeKey ?? null,
    change: parent?.change ?? intent.change ?? null,
    parentId: parent?.parentId ?? parent?.id ?? null,
    authorId: author.userId,
    author: author.name,
    at: now,
    text: intent.text,
    suggestion: suggestion ?? null,
    appliedAt: null,
    appliedBy: null,
    resolvedAt: null,
    resolvedBy: null,
  };
  const statements: [Statement, ...Statement[]] = [addReviewCommentStatement(comment)];
  if (parent && intent.settles) {
    statements.push(updateReviewCommentStatement(comment.parentId ?? parent.id, { resolvedAt: now, resolvedBy: author.name }));
  }
  statements.push(...(await listCommentMail(author, model, review, comment)));
  await writeBatch(statements);
  tell(model);
  return ok(comment);
}

async function suggestTakingBack(model: ModelRow, review: ReviewRow, { nodeKey, change = "" }: CommentIntent): Promise<Suggestion | undefined> {
  if (nodeKey === undefined) return undefined;
  const before = await loadState(model, review.baseRevision);
  const working = await loadWorkingModel(model.id);
  if (!before || !working) return undefined;
  const kind = change.split(" ")[0] as Change["kind"];
  const operations = takeBackChange(before, working.space, { key: nodeKey as NodeKey, kind });
  return operations.length === 0 ? undefined : { label: "take-back", text: `take back: ${change.replaceAll("-", " ")}`, operations };
}

/** Everybody in the review but the writer. */
async function listCommentMail(author: Caller, model: ModelRow, review: ReviewRow, comment: ReviewCommentRow): Promise<Statement[]> {
  const involved = new Set([review.authorId, ...(await listReviewers([review.id])).map((row) => row.userId)]);
  for (const { authorId } of await listReviewComments(review)) involved.add(authorId);
  involved.delete(author.userId);
  const people = (await listPeople(model.organizationId)).filter((person) => involved.has(person.id));
  return listMailStatements(model.organizationId, "review-comment", people, {
    subject: `Review ${review.number}: ${author.name} comments`,
    paragraphs: [`${author.name} in the review “${review.title}” of ${model.name}:`, comment.text],
    link: { text: "Open the review", path: `/reviews/${review.id}` },
  });
}

/** Settles a thread, or opens it again. Problem: `review.comment-gone`. */
export async function settleComment(author: Caller, model: ModelRow, commentId: string, isSettled: boolean): Promise<Result<null>> {
  const comment = await findReviewComment(commentId);
  if (comment?.modelId !== model.id || comment.parentId !== null) return fail(problem("review.comment-gone"));
  await writeBatch([
    updateReviewCommentStatement(comment.id, isSettled ? { resolvedAt: new Date(), resolvedBy: author.name } : { resolvedAt: null, resolvedBy: null }),
  ]);
  tell(model);
  return ok(null);
}

/**
 * Applies a suggestion as one edit of the model and settles its thread. Who may edit what the suggestion touches may apply
 * it. Problems: `review.comment-gone`, `auth.not-allowed`, those of the operations where the model has moved on.
 */
export async function applySuggestion(author: Caller, model: ModelRow, review: ReviewRow, commentId: string): Promise<Result<null>> {
  const comment = await findReviewComment(commentId);
  if (comment?.modelId !== model.id || !comment.suggestion || comment.appliedAt !== null) return fail(problem("review.comment-gone"));
  const { operations, text } = comment.suggestion;
  const action = isMappingEdit(operations) ? "mapping.edit" : "model.edit";
  if (!mayDo(author, action, model.organizationId)) return fail(problem("auth.not-allowed", { action }));
  const edited = await applyEdit(author, model.id, { base: model.headSeq, label: "suggestion", operations });
  if (!edited.ok) return edited;
  const now = new Date();
  await writeBatch([
    updateReviewCommentStatement(comment.id, { appliedAt: now, appliedBy: author.name, resolvedAt: now, resolvedBy: author.name }),
    auditOf(author, review, "review.apply-suggestion", { by: comment.author, text }),
  ]);
  tell(model);
  return ok(null);
}
