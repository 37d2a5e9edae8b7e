/** Mends findings by the fixes of their rules: one batch of operations, which is one undo step. */
import type { AddressSpace } from "../address-space/address-space";
import type { Problem } from "../core/result";
import type { NodeIdAllocator } from "../editing/allocate-node-id";
import { applyOperations } from "../editing/apply-operation";
import type { Operation } from "../editing/operation";
import type { Finding } from "./finding";
import { findRule } from "./registry";

export type Mended = {
  readonly operations: readonly Operation[];
  /** The model with all that could be mended. */
  readonly space: AddressSpace;
  readonly mended: readonly Finding[];
  /** Why the others could not. */
  readonly problems: readonly Problem[];
};

/** Each fix sees what those before it did. A finding that cannot be mended is left as it is and does not keep the others. */
export function mendAll(space: AddressSpace, findings: readonly Finding[], ids: NodeIdAllocator): Mended {
  const operations: Operation[] = [];
  const mended: Finding[] = [];
  const problems: Problem[] = [];
  let current = space;
  for (const finding of findings) {
    const steps = findRule(finding.rule)?.fix?.apply(current, finding, ids);
    if (!steps) continue;
    const applied = steps.ok ? applyOperations(current, steps.value) : steps;
    if (!steps.ok || !applied.ok) {
      problems.push(...applied.problems);
      continue;
    }
    current = applied.value;
    operations.push(...steps.value);
    mended.push(finding);
  }
  return { operations, space: current, mended, problems };
}
