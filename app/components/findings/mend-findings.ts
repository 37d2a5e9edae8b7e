/** Mends findings by their rules' fixes, all of them in one undo step; what cannot be mended is told and left as it is. */
import { describe } from "~/components/model/edit-steps";
import type { OpenModel } from "~/components/model/use-model";
import { showToast } from "~/components/ui/toast";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Finding } from "~/domain/checks/finding";
import { findRule } from "~/domain/checks/registry";
import type { NodeIdAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import type { Operation } from "~/domain/editing/operation";

type Mended = {
  readonly operations: readonly Operation[];
  readonly count: number;
  readonly reasons: readonly string[];
};

export function mendFindings({ editor }: OpenModel, findings: readonly Finding[]): void {
  const { space } = editor.getState();
  const mended = applyFixes(space, findings, editor.allocator);
  const rules = new Set(findings.map((finding) => finding.rule));
  const saved =
    mended.operations.length === 0 ? undefined : editor.dispatch(`mend-${[...rules].join("-")}`, mended.operations);
  const reasons = saved && !saved.ok ? describe(space, saved.problems) : mended.reasons;
  if (reasons.length > 0)
    showToast({
      tone: "error",
      title: `${findings.length - mended.count} could not be mended`,
      detail: reasons.join(" "),
      seconds: 12,
    });
  if (saved?.ok)
    showToast({
      tone: "good",
      title: `${mended.count === 1 ? "One finding" : `${mended.count} findings`} mended`,
      detail: "Undo takes it back in one step.",
    });
}

function applyFixes(space: AddressSpace, findings: readonly Finding[], context: NodeIdAllocator): Mended {
  const operations: Operation[] = [];
  const reasons: string[] = [];
  let current = space;
  let count = 0;
  for (const finding of findings) {
    const fix = findRule(finding.rule)?.fix;
    if (!fix) continue;
    const steps = fix.apply(current, finding, context);
    const applied = steps.ok ? applyOperations(current, steps.value) : steps;
    if (!steps.ok || !applied.ok) {
      reasons.push(...describe(current, applied.problems));
      continue;
    }
    current = applied.value;
    operations.push(...steps.value);
    count++;
  }
  return { operations, count, reasons: [...new Set(reasons)] };
}
