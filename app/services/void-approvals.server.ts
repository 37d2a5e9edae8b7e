/** An edit after an approval makes it void: what was approved is not what would be released. */
import type { Caller } from "../auth/caller.server";
import { writeBatch, type Statement } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import type { ModelRow } from "../db/repositories/models.server";
import { listPeople } from "../db/repositories/people.server";
import { listReviewers, listRunningReviews, setReviewStateStatement, voidApprovalsStatement } from "../db/repositories/reviews.server";
import { publish } from "./event-hub.server";
import { listMailStatements } from "./queue-mail.server";
import { wakeOutbox } from "./run-outbox.server";

/** Called by whoever changed a model's contents, after that was stored. */
export async function voidApprovals(model: ModelRow, editor: Caller): Promise<void> {
  for (const review of await listRunningReviews(model.id)) {
    const reviewers = await listReviewers([review.id]);
    const approved = reviewers.filter((row) => row.decision === "approved" && row.voidedAt === null);
    if (approved.length === 0) continue;
    const now = new Date();
    const people = await listPeople(model.organizationId);
    const told = people.filter((person) => person.id !== editor.userId && (person.id === review.authorId || approved.some((row) => row.userId === person.id)));
    const statements: [Statement, ...Statement[]] = [
      voidApprovalsStatement(review.id, editor.name, now),
      setReviewStateStatement(review.id, "open"),
      addAuditStatement({
        organizationId: model.organizationId,
        userId: editor.userId,
        userName: editor.name,
        action: "review.void",
        subject: { kind: "review", id: review.id, name: `${review.number} ${review.title}` },
        details: { approvals: approved.map((row) => row.name) },
      }),
      ...(await listMailStatements(model.organizationId, "review-decided", told, {
        subject: `Review ${review.number}: approval void, ${model.name} was edited`,
        paragraphs: [
          `${editor.name} edited ${model.name} after it had been approved in the review “${review.title}”. The approval of ${approved.map((row) => row.name).join(", ")} is void.`,
        ],
        link: { text: "Open the review", path: `/reviews/${review.id}` },
      })),
    ];
    await writeBatch(statements);
    publish(`models:${model.organizationId}`, { id: model.id, change: "review" });
    wakeOutbox();
  }
}
