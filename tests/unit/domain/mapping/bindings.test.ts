import { describe, expect, it } from "vitest";
import { getValue } from "~/domain/core/result";
import { applyOperations } from "~/domain/editing/apply-operation";
import type { Operation } from "~/domain/editing/operation";
import { listMachines } from "~/domain/instantiation/list-machines";
import { listBoundRoles, toMachineMapping } from "~/domain/mapping/bindings";
import { renameRole } from "~/domain/mapping/commands";
import type { PlannedSource } from "~/domain/mapping/make-wiring";
import { findTargetByPath } from "~/domain/mapping/list-targets";
import { previewReplacement, replaceDevice } from "~/domain/mapping/replace-device";
import { planBindings } from "~/domain/mapping/roll-out-bindings";
import { toMapping } from "~/domain/mapping/type-mapping";
import { braiderType, makeHallSpace, makeMappedBraiderSpace } from "../../../support/demo-mapping";
import { readDemoDevice } from "../../../support/demo-models/braider-mapping";

const hall = makeHallSpace();
const machines = listMachines(hall);
const keyOf = (name: string) => {
  const machine = machines.find((m) => m.name === name);
  if (!machine) throw new RangeError(name);
  return machine.key;
};

const sources: PlannedSource[] = ["M1", "M2", "M3"].map((name) => ({
  id: name.toLowerCase(),
  name,
  kind: "rest-master",
  address: { url: "http://127.0.0.1", portCount: 8, timeoutMs: 2_000, periodMs: 500 },
  ports: [],
}));

const patterns = { "creel sensor": "M{ceil(n / 2)}:{(n - 1) % 2 * 3 + 1}", "carriage sensor": "M{ceil(n / 2)}:{(n - 1) % 2 * 3 + 2}" };
const all = machines.map((m) => m.key);

describe("a roll-out of bindings", () => {
  // Scenario: M1 ports 1–3 are B1's, 4–6 B2's, M2 the same for B3 and B4.
  it("follows the pattern for every machine", () => {
    const plan = planBindings(hall, sources, { machines: all, patterns });
    expect(plan.cells.filter((c) => c.role === "creel sensor").map((c) => `${c.machineName} ${c.text}`)).toEqual([
      "B1 M1, port 1",
      "B2 M1, port 4",
      "B3 M2, port 1",
      "B4 M2, port 4",
      "B5 M3, port 1",
      "B6 M3, port 4",
    ]);
    expect(plan.cells.flatMap((c) => c.conflicts)).toEqual([]);
    const bound = getValue(applyOperations(hall, plan.operations));
    expect(listBoundRoles(bound, keyOf("B2")).find((r) => r.role === "creel sensor")?.binding).toEqual({ sourceId: "m1", port: 4 });
    expect(planBindings(bound, sources, { machines: all, patterns }).operations).toEqual([]);
  });

  it("shows what cannot be: a port twice, a port that is not there, a source that is not there, a formula that is none", () => {
    const codes = (pattern: string) =>
      planBindings(hall, sources, { machines: all, patterns: { "creel sensor": pattern } }).cells.map((c) => c.conflicts.map((p) => p.code).join());
    expect(codes("M1:1")).toEqual(["", ...Array.from({ length: 5 }, () => "roll-out.port-taken")]);
    expect(codes("M1:{n + 5}").at(-1)).toBe("roll-out.no-port");
    expect(codes("M9:1")[0]).toBe("roll-out.no-source");
    expect(codes("M1:{n / 2}")[0]).toBe("roll-out.pattern");
    expect(codes("M1:{while(1)}")[0]).toBe("roll-out.pattern");
  });
});

describe("the mapping of one machine", () => {
  it("leaves out members that the machine lacks and applies its exceptions", () => {
    const target = findTargetByPath(hall, braiderType, "Process/SpindleSpeed")?.target ?? "";
    const row = { source: { kind: "register" as const, role: "controller", table: "holding-register" as const, address: 10, type: "Float32" as const, order: "CDAB" as const } };
    const operation: Operation = { kind: "setMapping", part: "exception", owner: keyOf("B1"), id: target, value: { reason: "older controller", row } };
    const space = getValue(applyOperations(hall, [operation]));
    const b1 = toMachineMapping(space, keyOf("B1"));
    // Scenario: the optional member PicksCounter is missing on B1 and B2.
    expect(b1?.rows.some((r) => r.target === "Process/PicksCounter")).toBe(false);
    expect(b1?.rows.find((r) => r.target === "Process/SpindleSpeed")?.source).toMatchObject({ order: "CDAB" });
    const b3 = toMachineMapping(space, keyOf("B3"));
    expect(b3?.rows.some((r) => r.target === "Process/PicksCounter")).toBe(true);
    expect(b3?.rows.find((r) => r.target === "Process/SpindleSpeed")?.source).toMatchObject({ order: "ABCD" });
  });
});

describe("renaming a role", () => {
  it("takes its rows along and keeps the machines bound", () => {
    const space = makeMappedBraiderSpace();
    const renamed = getValue(applyOperations(space, getValue(renameRole(space, braiderType, "creel sensor", "creel eye"))));
    const mapping = toMapping(renamed, braiderType);
    expect(JSON.stringify(mapping)).not.toContain('"creel sensor"');
    expect(mapping.rows).toHaveLength(toMapping(space, braiderType).rows.length);
    expect(mapping.rows.find((r) => r.target === "Status/SensorHealth")?.source).toMatchObject({ roles: ["creel eye", "carriage sensor", "condition monitor"] });
  });
});

describe("replacing a device", () => {
  const bound = getValue(applyOperations(hall, planBindings(hall, sources, { machines: all, patterns }).operations));

  it("by the same one changes the serial number only, and asks for new point checks", () => {
    const found = getValue(previewReplacement(bound, keyOf("B1"), "creel sensor", readDemoDevice("QS-U30"), "u30"));
    expect(found.kind).toBe("same");
    expect(found.pointChecks).toEqual(["Process/CreelDistance", "Process/CreelFill", "Configuration/SensorTag", "Status/SensorHealth"]);
    const { machine, type } = getValue(replaceDevice(bound, keyOf("B1"), found, "U30-27-1"));
    expect(type).toEqual([]);
    expect(machine).toMatchObject([{ part: "binding", id: "creel sensor", value: { serialNumber: "U30-27-1", port: 1 } }]);
  });

  it("by another one tells which rows change and proposes the field", () => {
    const found = getValue(previewReplacement(bound, keyOf("B1"), "creel sensor", readDemoDevice("QS-P12"), "p12"));
    expect(found.kind).toBe("other");
    const distance = found.rows.find((r) => r.path === "Process/CreelDistance");
    expect(distance).toMatchObject({ effect: "changes", proposal: { source: { subindex: 1 } } });
    expect(found.fields.some((f) => f.change === "scaling" || f.change === "gone")).toBe(true);
  });

  it("by one that measures something else tells what is lost", () => {
    const found = getValue(previewReplacement(bound, keyOf("B1"), "creel sensor", readDemoDevice("QS-L5"), "l5"));
    expect(found.rows.filter((r) => r.effect === "loses").map((r) => r.path)).toEqual(["Process/CreelDistance", "Process/CreelFill"]);
  });
});

