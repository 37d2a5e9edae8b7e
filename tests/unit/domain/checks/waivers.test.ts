import { describe, expect, test } from "vitest";
import { runChecks } from "~/domain/checks/run-checks";
import { waiverFileSchema } from "~/domain/checks/waiver-file";
import { applyWaivers, makeWaiver } from "~/domain/checks/waivers";
import { buildModel } from "../../../support/model-builder";

const decision = { reason: "The controller has no name for it.", person: "Ines Okafor", date: "2026-05-04" };

describe("waivers", () => {
  const { space, made } = buildModel((m) => m.objectType("PumpType", { set: { displayName: [] } }));
  const findings = runChecks(space);
  const finding = findings.find((f) => f.rule === "R016");
  if (!finding) throw new Error("no finding");
  const waiver = makeWaiver(space, finding, decision);

  test("take their finding out, and no other", () => {
    const result = applyWaivers(space, findings, [waiver]);
    expect(result.waived).toEqual([{ finding, waiver }]);
    expect(result.open).toEqual(findings.filter((f) => f !== finding));
    expect(result.expired).toEqual([]);
  });

  test("expire when the node changes", () => {
    const changed = space.withNode({ ...space.requireNode(made), symbolicName: "Pump" });
    const result = applyWaivers(changed, runChecks(changed), [waiver]);
    expect(result.waived).toEqual([]);
    expect(result.expired).toEqual([waiver]);
  });

  test("hold when only the node's place in the file changes", () => {
    const moved = space.withNode({ ...space.requireNode(made), order: 500 });
    expect(applyWaivers(moved, runChecks(moved), [waiver]).waived).toHaveLength(1);
  });

  test("pass JSON unchanged", () => {
    expect(waiverFileSchema.parse(JSON.parse(JSON.stringify({ waivers: [waiver] })))).toEqual({ waivers: [waiver] });
  });
});
