import type { ReviewChange, ReviewLine, ReviewPage } from "~/services/read-review.server";

export const stateWords: Readonly<Record<ReviewLine["state"], string>> = {
  open: "open",
  approved: "approved",
  "changes-wanted": "changes wanted",
  released: "released",
  closed: "closed",
};

/** Why a release has to wait, each with the next thing to do. */
export const obstacleWords: Readonly<Record<string, string>> = {
  variant: "a variant is not released; merge it first",
  edited: "the model was edited since; bring the review up to date",
  approvals: "approvals are missing",
  "changes-wanted": "a reviewer wants changes",
  errors: "open errors; mend or waive them",
  closed: "this review is over",
};

export const effectWords = { stops: "stops working", look: "reads it, must look", "may-use": "may use it" } as const;

/** A change in the words of an engineer: `DataType Float becomes Double`. */
export function describeChange({
  kind,
  detail,
  before,
  after,
}: Pick<ReviewChange, "kind" | "detail" | "before" | "after">): string {
  const what = kind.replace(/-changed$/, "").replaceAll("-", " ");
  if (kind.endsWith("-added"))
    return [`new ${kind.slice(0, -6).replaceAll("-", " ")}`, after === null ? "" : shorten(after)]
      .filter(Boolean)
      .join(", ");
  if (kind.endsWith("-removed"))
    return [`${kind.slice(0, -8).replaceAll("-", " ")} removed`, before === null ? "" : shorten(before)]
      .filter(Boolean)
      .join(", ");
  const subject = detail === null ? what : detail;
  if (before === null) return `${subject}: ${shorten(after ?? "")}`;
  return after === null
    ? `${subject} ${shorten(before)} is gone`
    : `${subject} ${shorten(before)} becomes ${shorten(after)}`;
}

function shorten(text: string): string {
  return text.length > 60 ? `${text.slice(0, 59)}…` : text;
}

/** The threads that belong to a change: on its node, and where they name a change, on this one. */
export function listThreads(
  page: Pick<ReviewPage, "comments" | "changes">,
  change: ReviewChange,
): ReviewPage["comments"] {
  const isElsewhere = (what: string): boolean =>
    what !== change.what && page.changes.some((other) => other.nodeKey === change.nodeKey && other.what === what);
  return page.comments.filter(
    (comment) =>
      comment.parentId === null &&
      comment.nodeKey !== null &&
      comment.nodeKey === change.nodeKey &&
      (comment.change === null || !isElsewhere(comment.change)),
  );
}

/** Threads on the review as a whole, and those whose node none of the changes is about. */
export function listLooseThreads(page: Pick<ReviewPage, "comments" | "changes">): ReviewPage["comments"] {
  const keys = new Set(page.changes.map((change) => change.nodeKey));
  return page.comments.filter(
    (comment) => comment.parentId === null && (comment.nodeKey === null || !keys.has(comment.nodeKey)),
  );
}
