/** Asking for a review: the working state is frozen, and the reviewers get a mail and a line in their list. */
import { z } from "zod";
import { can } from "../auth/permissions";
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import { findModel, listRevisions, type ModelRow } from "../db/repositories/models.server";
import { listPeople, type Person } from "../db/repositories/people.server";
import {
  addReviewerStatement,
  addReviewStatement,
  findLastReviewNumber,
  listReviewers,
  listRunningReviews,
  setReviewStateStatement,
  updateReviewStatement,
  voidAllStatement,
  type ReviewRow,
} from "../db/repositories/reviews.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";
import { publish } from "./event-hub.server";
import { freezeRevision } from "./freeze-revision.server";
import { listMailStatements } from "./queue-mail.server";
import { findBaseRevision } from "./review-rules.server";
import { wakeOutbox } from "./run-outbox.server";

export const askReviewSchema = z.strictObject({
  title: z.string().trim().min(1).max(200),
  /** Ids of people. */
  reviewers: z.array(z.string().min(1).max(100)).min(1).max(20),
});
export type AskReviewIntent = z.infer<typeof askReviewSchema>;

/** Problems: `review.running`, `review.no-reviewer`, those of freezing. */
export async function askReview(author: Caller, model: ModelRow, intent: AskReviewIntent): Promise<Result<ReviewRow>> {
  const [running] = await listRunningReviews(model.id);
  if (running) return fail(problem("review.running", { number: running.number, title: running.title }));
  const people = (await listPeople(model.organizationId)).filter((person) => intent.reviewers.includes(person.id));
  const reviewers = people.filter((person) => person.id !== author.userId && can(person.roles, "review.decide"));
  if (reviewers.length === 0 || reviewers.length < new Set(intent.reviewers).size) return fail(problem("review.no-reviewer"));
  const frozen = await freezeNewest(author, model, intent.title);
  if (!frozen.ok) return frozen;
  const review: ReviewRow = {
    id: newId(),
    organizationId: model.organizationId,
    modelId: model.id,
    number: (await findLastReviewNumber(model.organizationId)) + 1,
    title: intent.title,
    revision: frozen.value,
    baseRevision: await findBaseRevision(model.id),
    state: "open",
    authorId: author.userId,
    author: author.name,
    askedAt: new Date(),
    closedAt: null,
  };
  const statements: [Statement, ...Statement[]] = [addReviewStatement(review)];
  for (const { id, name } of reviewers) statements.push(addReviewerStatement({ reviewId: review.id, userId: id, name }));
  statements.push(auditOf(author, review, "review.ask", { revision: review.revision, reviewers: reviewers.map((person) => person.name) }));
  statements.push(...(await listAskingMail(author, model, review, reviewers, "asks you to review")));
  await writeBatch(statements);
  tell(model);
  return ok(review);
}

/** The number of the revision that holds the working state, frozen now where it was not. */
async function freezeNewest(author: Caller, model: ModelRow, message: string): Promise<Result<number>> {
  const frozen = await freezeRevision(author, model, message);
  if (frozen.ok) return ok(frozen.value.number);
  const [newest] = frozen.problems[0]?.code === "revision.unchanged" ? await listRevisions(model.id) : [];
  return newest ? ok(newest.number) : frozen;
}

/** Brings the review to what the model is now; earlier decisions were about something else and are void. */
export async function followReview(author: Caller, model: ModelRow, review: ReviewRow): Promise<Result<number>> {
  if (review.state === "released" || review.state === "closed") return fail(problem("review.closed"));
  const frozen = await freezeNewest(author, (await findModel(model.id)) ?? model, review.title);
  if (!frozen.ok) return frozen;
  if (frozen.value === review.revision) return fail(problem("revision.unchanged", { number: frozen.value }));
  const people = await listPeople(model.organizationId);
  const reviewers = await listReviewers([review.id]);
  const told = people.filter((person) => person.id !== author.userId && reviewers.some((row) => row.userId === person.id));
  await writeBatch([
    updateReviewStatement(review.id, { revision: frozen.value, state: "open" }),
    voidAllStatement(review.id, author.name, new Date()),
    auditOf(author, review, "review.follow", { from: review.revision, to: frozen.value }),
    ...(await listAskingMail(author, model, { ...review, revision: frozen.value }, told, "brought a new revision to the review of")),
  ]);
  tell(model);
  return ok(frozen.value);
}

/** Ends a review without a release. */
export async function closeReview(author: Caller, model: ModelRow, review: ReviewRow): Promise<Result<null>> {
  if (review.state === "released" || review.state === "closed") return fail(problem("review.closed"));
  await writeBatch([setReviewStateStatement(review.id, "closed", new Date()), auditOf(author, review, "review.close", {})]);
  tell(model);
  return ok(null);
}

function listAskingMail(author: Caller, model: ModelRow, review: ReviewRow, people: readonly Person[], verb: string): Promise<Statement[]> {
  return listMailStatements(model.organizationId, "review-asked", people, {
    subject: `Review ${review.number}: ${review.title}`,
    paragraphs: [`${author.name} ${verb} ${model.name}, revision ${review.revision}, compared with revision ${review.baseRevision}.`],
    link: { text: "Open the review", path: `/reviews/${review.id}` },
  });
}

export function auditOf(author: Caller, review: ReviewRow, action: `review.${string}`, details: Readonly<Record<string, unknown>>): Statement {
  return addAuditStatement({
    organizationId: review.organizationId,
    userId: author.userId,
    userName: author.name,
    action,
    subject: { kind: "review", id: review.id, name: `${review.number} ${review.title}` },
    details,
  });
}

export function tell(model: Pick<ModelRow, "id" | "organizationId">): void {
  publish(`models:${model.organizationId}`, { id: model.id, change: "review" });
  wakeOutbox();
}
