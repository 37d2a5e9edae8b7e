/** Each fix on the rule's own bad example: it removes the finding and raises no other error. */
import { expect, test } from "vitest";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Finding } from "~/domain/checks/finding";
import { RULES } from "~/domain/checks/registry";
import { runChecks } from "~/domain/checks/run-checks";
import { getValue } from "~/domain/core/result";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { applyWithInverse } from "~/domain/editing/invert-operation";
import { buildModel } from "../../../support/model-builder";

const FIXABLE = RULES.flatMap((rule) => (rule.fix ? [{ id: rule.id, rule, fix: rule.fix }] : []));

function nameErrors(space: AddressSpace): string[] {
  return runChecks(space)
    .filter((f) => f.severity === "error")
    .map((f) => `${f.rule} ${f.path}: ${f.message}`);
}

function isSame(a: Finding, b: Finding): boolean {
  return a.rule === b.rule && a.key === b.key && a.message === b.message;
}

test.each(FIXABLE)("the fix of $id removes its finding and raises no other error", ({ rule, fix }) => {
  const { space } = buildModel((m) => rule.examples.bad.build(m));
  const before = nameErrors(space);
  const findings = runChecks(space, { rules: [rule] });
  const [finding] = findings.filter((f) => f.severity === rule.severity);
  if (!finding) throw new Error(`${rule.id} finds nothing in its bad example`);
  const ids = BlockAllocator.forModel(() => space, [{ from: 50_000, to: 50_999 }]);
  const operations = getValue(fix.apply(space, finding, ids));
  const mended = getValue(applyOperations(space, operations));
  expect(runChecks(mended, { rules: [rule] }).filter((f) => isSame(f, finding))).toEqual([]);
  expect(nameErrors(mended).filter((error) => !before.includes(error))).toEqual([]);
  const { inverse } = getValue(applyWithInverse(space, operations));
  const undone = applyOperations(mended, inverse);
  // A file may hold two nodes of one NodeId; nobody may make them, so that this one undo is refused.
  if (rule.id === "R002") expect(undone.problems.map((p) => p.code)).toEqual(["operation.node-id-taken"]);
  else expect(getValue(undone).listOwnNodes()).toEqual(space.listOwnNodes());
});

test("fixes answer a problem when their finding is gone", () => {
  const { space } = buildModel((m) => m.objectType("PumpType"));
  const ids = BlockAllocator.forModel(() => space, [{ from: 50_000, to: 50_999 }]);
  for (const { rule, fix } of FIXABLE) {
    const stale = {
      rule: rule.id,
      severity: rule.severity,
      nodeId: "",
      browseName: "",
      path: "",
      message: "",
      clause: "",
      facts: [],
    };
    const result = fix.apply(space, stale, ids);
    expect(result.ok ? rule.id : result.problems[0]?.code).toBe("fix.not-possible");
  }
});
