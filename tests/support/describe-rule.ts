/** Tables of valid and invalid models for one rule. */
import { describe, expect, test } from "vitest";
import type { NodeKey } from "~/domain/address-space/node-id";
import type { Layer } from "~/domain/address-space/address-space";
import { findRule } from "~/domain/checks/registry";
import { runChecks } from "~/domain/checks/run-checks";
import type { Severity } from "~/domain/core/result";
import { buildModel, type ExampleModel } from "./model-builder";

type Write = (m: ExampleModel) => unknown;
/** Answers the node that the finding must name; `undefined` for the model as a whole. */
type WriteBad = (m: ExampleModel) => NodeKey | undefined;

export type RuleCases = {
  /** No finding of the rule at all. */
  readonly valid?: Readonly<Record<string, Write>>;
  /** Exactly one finding, of the rule's own severity unless the name of the case begins with "warning: " or "hint: ". */
  readonly invalid?: Readonly<Record<string, WriteBad>>;
  readonly required?: readonly Layer[];
};

export function describeRule(id: string, { valid = {}, invalid = {}, required }: RuleCases): void {
  const rule = findRule(id);
  if (!rule) throw new RangeError(`No rule ${id}`);
  const check = (write: Write) => {
    const { space, made } = buildModel(write, required);
    return { made, found: runChecks(space, { rules: [rule] }) };
  };
  describe(`${id} ${rule.title}`, () => {
    for (const [name, write] of Object.entries(valid)) {
      test(`accepts ${name}`, () => {
        expect(check(write).found).toEqual([]);
      });
    }
    for (const [name, write] of Object.entries(invalid)) {
      test(`finds ${name}`, () => {
        const { made, found } = check(write);
        const severity = (/^(warning|hint): /.exec(name)?.[1] ?? rule.severity) as Severity;
        expect(found.map((f) => ({ key: f.key, severity: f.severity }))).toEqual([{ key: made, severity }]);
      });
    }
  });
}
