/** Mends findings by the fixes of their rules: one batch of operations, which is one undo step. */
import type { AddressSpace } from "../address-space/address-space";
import type { Problem } from "../core/result";
import type { NodeIdAllocator } from "../editing/allocate-node-id";
import { applyOperations } from "../editing/apply-operation";
import type { Operation } from "../editing/operation";
import type { Finding } from "./finding";
import { findRule } from "./registry";
import { runChecks } from "./run-checks";

export type Mended = {
  readonly operations: readonly Operation[];
  /** The model with all that could be mended. */
  readonly space: AddressSpace;
  readonly mended: readonly Finding[];
  /** Why the others could not. */
  readonly problems: readonly Problem[];
};

/**
 * Each fix sees what those before it did. A finding that cannot be mended is left as it is and does not keep the others; one
 * that was mended along with another counts as mended.
 */
export function mendAll(space: AddressSpace, findings: readonly Finding[], ids: NodeIdAllocator): Mended {
  const operations: Operation[] = [];
  const failed = new Map<Finding, readonly Problem[]>();
  let current = space;
  for (const finding of findings) {
    const steps = findRule(finding.rule)?.fix?.apply(current, finding, ids);
    if (!steps) continue;
    const applied = steps.ok ? applyOperations(current, steps.value) : steps;
    if (!steps.ok || !applied.ok) {
      failed.set(finding, applied.problems);
      continue;
    }
    current = applied.value;
    operations.push(...steps.value);
  }
  const left = operations.length > 0 ? listLeft(current, [...failed.keys()]) : [...failed.keys()];
  const mended = findings.filter((f) => findRule(f.rule)?.fix && !left.includes(f));
  return { operations, space: current, mended, problems: left.flatMap((f) => failed.get(f) ?? []) };
}

/** Those of the findings that are still there. */
function listLeft(space: AddressSpace, findings: readonly Finding[]): Finding[] {
  if (findings.length === 0) return [];
  const rules = [...new Set(findings.map((f) => f.rule))].flatMap((id) => findRule(id) ?? []);
  const identify = ({ rule, key, attribute, message }: Finding): string => [rule, key, attribute, message].join("\n");
  const present = new Set(runChecks(space, { rules }).map(identify));
  return findings.filter((f) => present.has(identify(f)));
}
