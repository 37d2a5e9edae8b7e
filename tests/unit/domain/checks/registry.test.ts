import { readdirSync } from "node:fs";
import { describe, expect, test } from "vitest";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { Finding } from "~/domain/checks/finding";
import { RULES } from "~/domain/checks/registry";
import { runChecks } from "~/domain/checks/run-checks";
import { buildModel, type ExampleModel } from "../../../support/model-builder";
import { getPublishedLayer, getStandardLayer } from "../../../support/published-layers";

const files = readdirSync(new URL("../../../../app/domain/checks/rules/", import.meta.url)).filter((f) =>
  f.endsWith(".ts"),
);

/** The rules about machines speak of nodes of OPC 40001-1. */
const required = [
  getStandardLayer(),
  ...["Di", "Machinery"].map((name) => getPublishedLayer(`Opc.Ua.${name}.NodeSet2.xml`)),
];

function check(space: AddressSpace, { wiring }: ExampleModel): readonly Finding[] {
  return runChecks(space, wiring ? { wiring } : {});
}

describe("registry of rules", () => {
  test("holds every rule file once, in the order of numbers", () => {
    expect(RULES.map((r) => r.id.toLowerCase())).toEqual(files.map((f) => f.slice(0, 4)).sort());
  });

  test.each(RULES)("$id has its texts", (rule) => {
    expect(rule.title.length).toBeGreaterThan(8);
    expect(rule.condition.length).toBeGreaterThan(20);
    expect(rule.why.length).toBeGreaterThan(20);
    expect(rule.clause).toMatch(/OPC \d+|UANodeSet\.xsd|common practice/);
    expect(rule.examples.good.text).not.toBe("");
    expect(rule.examples.bad.text).not.toBe("");
  });
});

describe.each(RULES)("$id $title", (rule) => {
  test(`good: ${rule.examples.good.text}`, () => {
    const { space, model } = buildModel((m) => rule.examples.good.build(m), required);
    const findings = check(space, model);
    expect(findings.filter((f) => f.rule === rule.id)).toEqual([]);
    expect(findings.filter((f) => f.severity === "error")).toEqual([]);
  });

  test(`bad: ${rule.examples.bad.text}`, () => {
    const { space, made, model } = buildModel((m) => rule.examples.bad.build(m), required);
    const found = check(space, model).filter((f) => f.rule === rule.id);
    expect(found.map((f) => f.key ?? (f.place ? `place ${f.place.name}` : "model"))).toContain(made);
    expect(found.some((f) => f.severity === rule.severity)).toBe(true);
    for (const finding of found) {
      expect(finding.message).toMatch(/\.$/);
      expect(finding.facts.length).toBeGreaterThan(0);
      expect(finding.message + finding.facts.join("")).not.toMatch(/undefined|\[object/);
    }
  });
});
