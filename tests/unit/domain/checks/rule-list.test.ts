import { expect, test } from "vitest";
import { listRules } from "~/domain/checks/rule-list";

const rules = listRules();

test("lists the catalogue R001 to R204 once each, in order", () => {
  const standard = rules.map((r) => r.id).filter((id) => id < "R300");
  expect(standard).toEqual(Array.from({ length: 204 }, (_, i) => `R${String(i + 1).padStart(3, "0")}`));
});

test("says why a rule does not run, and only then", () => {
  for (const { implemented, reason } of rules) expect(reason === undefined).toBe(implemented);
});

test("runs at least 180 rules and mends at least 60 kinds of findings", () => {
  const [running, fixes] = [
    rules.filter((r) => r.implemented && r.id < "R300").length,
    rules.filter((r) => r.hasFix).length,
  ];
  console.log(`${running} rules run, ${fixes} can be mended`);
  expect(running).toBeGreaterThanOrEqual(180);
  expect(fixes).toBeGreaterThanOrEqual(60);
});
