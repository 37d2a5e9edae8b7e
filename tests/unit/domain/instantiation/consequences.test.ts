import { describe, expect, it } from "vitest";
import { standardKey } from "~/domain/address-space/node-id";
import { StandardDataType, StandardModellingRule, StandardType } from "~/domain/address-space/standard-ids";
import { addObject, addVariable } from "~/domain/editing/commands/add-member";
import { addType } from "~/domain/editing/commands/add-type";
import { deleteNodes } from "~/domain/editing/commands/delete-nodes";
import { overrideMember } from "~/domain/editing/commands/override-member";
import { renameNode } from "~/domain/editing/commands/rename-node";
import { setDataType } from "~/domain/editing/commands/set-data-type";
import { setRange } from "~/domain/editing/commands/set-unit";
import { applyConsequences, listConsequences } from "~/domain/instantiation/consequences";
import { instantiate } from "~/domain/instantiation/instantiate";
import { listMissingMembers } from "~/domain/instantiation/missing-members";
import { Workbench } from "../../../support/command-harness";

const OBJECTS = standardKey(85);

function makeModel() {
  const bench = new Workbench();
  const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "MachineType" });
  const process = bench.do(addObject, { parent: type, name: "Process" });
  const speed = bench.do(addVariable, {
    parent: process,
    name: "Speed",
    typeDefinition: StandardType.AnalogUnitRangeType,
    dataType: StandardDataType.Float,
    range: { low: 0, high: 100 },
  });
  const load = bench.do(addVariable, { parent: process, name: "Load", dataType: StandardDataType.Float });
  const first = bench.do(instantiate, { type, parent: OBJECTS, name: "B1" });
  const second = bench.do(instantiate, { type, parent: OBJECTS, name: "B2" });
  return { bench, type, process, speed, load, first, second };
}

describe("listConsequences", () => {
  it("offers new, renamed and removed members and changed attributes to every instance, and makes them", () => {
    const { bench, type, process, speed, load, first, second } = makeModel();
    const before = bench.space;
    bench.do(addVariable, { parent: process, name: "Torque", dataType: StandardDataType.Float });
    bench.do(renameNode, { node: process, name: "ProcessData" });
    bench.do(setDataType, { node: speed, dataType: StandardDataType.Double });
    bench.do(setRange, { variable: speed, range: { low: 0, high: 180 } });
    bench.do(deleteNodes, { nodes: [load] });
    const consequences = listConsequences(before, bench.space);
    const kinds = consequences.map((c) => (c.kind === "changed-attribute" ? c.attribute : c.kind)).sort();
    const eachOnce = ["dataType", "displayName", "missing-member", "removed-member", "renamed-member", "value"];
    expect(kinds).toEqual(eachOnce.flatMap((kind) => [kind, kind]));
    bench.do(applyConsequences, { consequences });
    for (const instance of [first, second]) {
      expect(bench.at(instance, "ProcessData/Speed")).toMatchObject({ dataType: "i=11" });
      expect(bench.at(instance, "ProcessData/Speed/EURange")).toMatchObject({
        value: (bench.at(type, "ProcessData/Speed/EURange") as { value: unknown }).value,
      });
      expect(bench.has(instance, "ProcessData/Load")).toBe(false);
      expect(bench.has(instance, "ProcessData/Torque")).toBe(true);
      expect(listMissingMembers(bench.space, instance)).toEqual([]);
    }
    expect(listConsequences(bench.space, bench.space)).toEqual([]);
  });

  it("leaves alone what was changed on purpose and what was missing before", () => {
    const { bench, speed, first, second } = makeModel();
    bench.do(setRange, { variable: bench.at(first, "Process/Speed").key, range: { low: 0, high: 90 } });
    bench.do(deleteNodes, { nodes: [bench.at(second, "Process/Load").key] });
    const before = bench.space;
    bench.do(setRange, { variable: speed, range: { low: 0, high: 180 } });
    expect(listConsequences(before, bench.space)).toMatchObject([
      { kind: "changed-attribute", node: bench.at(second, "Process/Speed/EURange").key },
    ]);
  });

  it("reaches overriding declarations of subtypes", () => {
    const { bench, type, speed } = makeModel();
    const subtype = bench.do(addType, { supertype: type, name: "FastMachineType" });
    bench.do(overrideMember, { type: subtype, path: "Process/Speed" });
    const before = bench.space;
    bench.do(setDataType, { node: speed, dataType: StandardDataType.Double });
    const found = listConsequences(before, bench.space).filter(
      (c) => c.kind === "changed-attribute" && c.node === bench.at(subtype, "Process/Speed").key,
    );
    expect(found).toMatchObject([{ attribute: "dataType", to: "i=11" }]);
  });
});

describe("overrideMember", () => {
  it("copies the declaration with those on the way (OPC 10000-3 §6.3.3.3)", () => {
    const { bench, type } = makeModel();
    const subtype = bench.do(addType, { supertype: type, name: "FastMachineType" });
    bench.do(overrideMember, { type: subtype, path: "Process/Speed" });
    const own = bench.at(subtype, "Process/Speed");
    expect(own).toMatchObject({ dataType: "i=10", parent: bench.at(subtype, "Process").key });
    expect(own.references).toContainEqual({ type: "i=37", target: StandardModellingRule.Mandatory, isForward: true });
    expect(bench.has(bench.at(subtype, "Process").key, "Load")).toBe(false);
    expect(bench.refuse(overrideMember, { type: subtype, path: "Process/Speed" })).toEqual(["override.exists"]);
    expect(bench.refuse(overrideMember, { type: subtype, path: "Process/Nothing" })).toEqual([
      "override.no-such-member",
    ]);
    const instance = bench.do(instantiate, { type: subtype, parent: OBJECTS, name: "F1" });
    for (const path of ["Process/Speed/EURange", "Process/Load"]) expect(bench.has(instance, path)).toBe(true);
  });
});
