/** Approving, or asking for changes. Nobody approves work that is partly their own. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { findRevisionByNumber, type ModelRow } from "../db/repositories/models.server";
import { listPeople } from "../db/repositories/people.server";
import { findNeededApprovals } from "../db/repositories/releases.server";
import { addReviewCommentStatement, listReviewers, saveDecisionStatement, setReviewStateStatement, type ReviewRow } from "../db/repositories/reviews.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";
import { auditOf, tell } from "./ask-review.server";
import { listMailStatements } from "./queue-mail.server";
import { decideState, listAuthorIds } from "./review-rules.server";

export const decisionSchema = z.strictObject({
  decision: z.enum(["approved", "changes-wanted"]),
  note: z.string().trim().max(4000).default(""),
});
export type DecisionIntent = z.infer<typeof decisionSchema>;

/** Problems: `review.closed`, `review.own-work`, `review.edited` where the model is no longer what would be approved. */
export async function decideReview(author: Caller, model: ModelRow, review: ReviewRow, intent: DecisionIntent): Promise<Result<null>> {
  if (review.state === "released" || review.state === "closed") return fail(problem("review.closed"));
  if (intent.decision === "approved") {
    if ((await listAuthorIds(review)).has(author.userId)) return fail(problem("review.own-work"));
    const revision = await findRevisionByNumber(model.id, review.revision);
    if (revision?.seq !== model.headSeq) return fail(problem("review.edited"));
  }
  const now = new Date();
  const row = {
    reviewId: review.id,
    userId: author.userId,
    name: author.name,
    decision: intent.decision,
    decidedAt: now,
    decidedRevision: review.revision,
    voidedAt: null,
    voidedBy: null,
  };
  const others = (await listReviewers([review.id])).filter((other) => other.userId !== author.userId);
  const state = decideState([...others, row], await findNeededApprovals(model.organizationId));
  const people = (await listPeople(model.organizationId)).filter(
    (person) => person.id !== author.userId && (person.id === review.authorId || others.some((other) => other.userId === person.id)),
  );
  const word = intent.decision === "approved" ? "approves" : "asks for changes";
  const statements: [Statement, ...Statement[]] = [
    saveDecisionStatement(row),
    setReviewStateStatement(review.id, state),
    auditOf(author, review, intent.decision === "approved" ? "review.approve" : "review.want-changes", { revision: review.revision, note: intent.note }),
    ...(await listMailStatements(model.organizationId, "review-decided", people, {
      subject: `Review ${review.number}: ${author.name} ${word}`,
      paragraphs: [`${author.name} ${word} in the review “${review.title}” of ${model.name}, revision ${review.revision}.`, ...(intent.note === "" ? [] : [intent.note])],
      link: { text: "Open the review", path: `/reviews/${review.id}` },
    })),
  ];
  if (intent.note !== "") {
    statements.push(
      addReviewCommentStatement({ id: newId(), reviewId: review.id, modelId: model.id, authorId: author.userId, author: author.name, at: now, text: intent.note }),
    );
  }
  await writeBatch(statements);
  tell(model);
  return ok(null);
}
