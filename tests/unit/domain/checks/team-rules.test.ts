import { describe, expect, test } from "vitest";
import { conventionsSchema, makeConventionRules } from "~/domain/checks/conventions";
import { runChecks } from "~/domain/checks/run-checks";
import { buildModel } from "../../../support/model-builder";

const conventions = makeConventionRules(
  conventionsSchema.parse({ names: { ObjectType: "[A-Z][A-Za-z0-9]*Type" }, language: "en", unitInDescription: true }),
);

describe.each(conventions)("$id $title", (rule) => {
  test(`good: ${rule.examples.good.text}`, () => {
    const { space } = buildModel((m) => rule.examples.good.build(m));
    expect(runChecks(space, { rules: [rule] }).filter((f) => !f.path.startsWith("http"))).toEqual([]);
  });

  test(`bad: ${rule.examples.bad.text}`, () => {
    const { space, made } = buildModel((m) => rule.examples.bad.build(m));
    const found = runChecks(space, { rules: [rule] });
    expect(found.filter((f) => f.severity === rule.severity).map((f) => f.key)).toContain(made);
  });
});

describe("conventions", () => {
  test("refuse patterns that are none, or that could take for ever", () => {
    for (const text of ["[", "(a+)+", "(a*)*b", "x".repeat(201)]) {
      expect(conventionsSchema.safeParse({ names: { Object: text } }).success).toBe(false);
    }
  });

  test("ask nothing where nothing is set", () => {
    expect(makeConventionRules({})).toEqual([]);
  });

  test("leave names alone that another model gave", () => {
    const { space } = buildModel((m) =>
      m.property("0:eURange", { parent: m.variable("Level", { parent: m.object("Tank1") }) }),
    );
    const rules = makeConventionRules({ names: { Variable: "[A-Z]\\w*", Object: "[A-Z]\\w*" } });
    expect(runChecks(space, { rules }).filter((f) => !f.path.startsWith("http"))).toEqual([]);
  });
});
