/** Mends findings by their rules' fixes, all of them in one undo step; what cannot be mended is told and left as it is. */
import { describe } from "~/components/model/edit-steps";
import type { OpenModel } from "~/components/model/use-model";
import { showToast } from "~/components/ui/toast";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Finding } from "~/domain/checks/finding";
import { listChanges, listHeaderChanges, type ChangeDetail, type NodeChange } from "~/domain/checks/list-changes";
import { mendAll } from "~/domain/checks/mend";
import { CountingAllocator } from "~/domain/editing/allocate-node-id";

export function mendFindings({ editor }: OpenModel, findings: readonly Finding[]): void {
  const { space } = editor.getState();
  const { operations, mended, problems } = mendAll(space, findings, editor.allocator);
  const rules = new Set(findings.map((finding) => finding.rule));
  const saved = operations.length === 0 ? undefined : editor.dispatch(`mend-${[...rules].join("-")}`, operations);
  const reasons = describe(space, saved && !saved.ok ? saved.problems : problems);
  if (reasons.length > 0)
    showToast({
      tone: "error",
      title: `${findings.length - mended.length} could not be mended`,
      detail: reasons.join(" "),
      seconds: 12,
    });
  if (saved?.ok)
    showToast({
      tone: "good",
      title: mended.length === 1 ? "One finding mended" : `${mended.length} findings mended`,
      detail: "Undo takes it back in one step.",
    });
}

export type MendPreview = {
  readonly changes: readonly NodeChange[];
  readonly header: readonly ChangeDetail[];
  /** How many of the findings can be mended, and why the others cannot. */
  readonly count: number;
  readonly reasons: readonly string[];
};

/** What mending would change. New nodes get their real NodeIds only when it is done. */
export function previewMend(space: AddressSpace, findings: readonly Finding[]): MendPreview {
  const { space: after, mended, problems } = mendAll(space, findings, new CountingAllocator(space));
  return {
    changes: listChanges(space, after),
    header: listHeaderChanges(space, after),
    count: mended.length,
    reasons: describe(space, problems),
  };
}
