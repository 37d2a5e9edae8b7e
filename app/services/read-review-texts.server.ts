/** Both states of a review as the register and as source text show them. */
import type { ModelRow } from "../db/repositories/models.server";
import type { ReviewRow } from "../db/repositories/reviews.server";
import { alignInterfaces, type AlignedOwner } from "../domain/release/align-interfaces";
import { writeChangeReport } from "../domain/release/change-report-html";
import { makeInterfaceDocument } from "../domain/release/interface-document";
import { compareForReaders } from "./compare-for-readers.server";
import { exportRevision } from "./export-revision.server";
import { loadState, type StateName } from "./load-revision.server";

export async function readSideBySide(model: ModelRow, review: Pick<ReviewRow, "baseRevision" | "revision">): Promise<AlignedOwner[]> {
  const [before, after] = await Promise.all([loadState(model, review.baseRevision), loadState(model, review.revision)]);
  return before && after ? alignInterfaces(makeInterfaceDocument(before), makeInterfaceDocument(after)) : [];
}

export type ReviewTexts = { readonly before: string; readonly after: string };

export async function readReviewTexts(model: ModelRow, review: Pick<ReviewRow, "baseRevision" | "revision">): Promise<ReviewTexts> {
  const [before, after] = await Promise.all([exportRevision(model, review.baseRevision), exportRevision(model, review.revision)]);
  return { before: before?.xml ?? "", after: after?.xml ?? "" };
}

/** The printable report on the change between two states; undefined when the model has not both. */
export async function writeReport(model: ModelRow, from: StateName, to: StateName): Promise<string | undefined> {
  const comparison = await compareForReaders(model, from, to);
  if (!comparison) return undefined;
  const nameOf = (state: StateName): string => (state === "working" ? "working state" : `revision ${state}`);
  return writeChangeReport(
    { rating: comparison.rating, proposedVersion: comparison.proposedVersion, changes: comparison.changes.map(({ change, affected }) => ({ ...change, readers: affected.readers })) },
    { modelName: model.name, namespaceUri: model.namespaceUri, before: nameOf(from), after: nameOf(to), proposedVersion: comparison.proposedVersion },
  );
}
