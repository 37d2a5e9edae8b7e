import { describe, expect, it } from "vitest";
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { NodeKey } from "~/domain/address-space/node-id";
import { getValue } from "~/domain/core/result";
import { BlockAllocator } from "~/domain/editing/allocate-node-id";
import { applyOperations } from "~/domain/editing/apply-operation";
import { listMachines } from "~/domain/instantiation/list-machines";
import { MACHINES, proposeNextName, rollOutMachines, type RollOutRow } from "~/domain/instantiation/roll-out-machines";
import { buildModel } from "../../../support/model-builder";
import { getPublishedLayer, getStandardLayer } from "../../../support/published-layers";

const required = [
  getStandardLayer(),
  getPublishedLayer("Opc.Ua.Di.NodeSet2.xml"),
  getPublishedLayer("Opc.Ua.IA.NodeSet2.xml"),
  getPublishedLayer("Opc.Ua.Machinery.NodeSet2.xml"),
];

function build(): { space: AddressSpace; type: NodeKey; ids: BlockAllocator } {
  const { space, made, model } = buildModel((m) => {
    const type = m.objectType("PressType");
    const process = m.object("Process", { parent: type, rule: "Mandatory" });
    m.variable("Speed", { parent: process, rule: "Mandatory" });
    m.variable("Counter", { parent: process, rule: "Optional" });
    return type;
  }, required);
  return { space, type: made, ids: new BlockAllocator(model.uri, [{ from: 10_000, to: 19_999 }]) };
}

const rows: readonly RollOutRow[] = [
  { name: "P1", serialNumber: "A-1", location: "Bay 1" },
  { name: "P2", serialNumber: "A-2", location: "" },
];

describe("rollOutMachines", () => {
  it("makes each machine below the Machines object with its members and its identification", () => {
    const { space, type, ids } = build();
    const edit = getValue(
      rollOutMachines(space, ids, {
        type,
        parent: MACHINES,
        optional: ["Process/Counter"],
        manufacturer: "Quillon",
        rows,
        nodeIds: { kind: "numbers" },
      }),
    );
    const machines = listMachines(getValue(applyOperations(space, edit.operations)));
    expect(machines.map(({ name, identification }) => ({ name, ...identification }))).toMatchObject([
      { name: "P1", SerialNumber: "A-1", Manufacturer: "Quillon", Location: "Bay 1" },
      { name: "P2", SerialNumber: "A-2", Manufacturer: "Quillon" },
    ]);
    expect(machines[1]?.identification.Location).toBeUndefined();
    expect(machines[0]?.groups[0]?.members).toEqual([
      { name: "Speed", path: "Process/Speed", isPresent: true },
      { name: "Counter", path: "Process/Counter", isPresent: true },
    ]);
  });

  it("leaves the type as it was", () => {
    const { space, type, ids } = build();
    const edit = getValue(
      rollOutMachines(space, ids, { type, parent: MACHINES, optional: [], manufacturer: "", rows, nodeIds: { kind: "numbers" } }),
    );
    const after = getValue(applyOperations(space, edit.operations));
    expect(after.edgesFrom(type)).toEqual(space.edgesFrom(type));
    expect(after.requireNode(type)).toBe(space.requireNode(type));
  });

  it("makes nothing when one name is taken", () => {
    const { space, type, ids } = build();
    const twice = rows.map((row) => ({ ...row, name: "P1" }));
    const intent = { type, parent: MACHINES, optional: [], manufacturer: "", rows: twice, nodeIds: { kind: "numbers" } } as const;
    const edit = rollOutMachines(space, ids, intent);
    expect(!edit.ok && edit.problems.map((p) => p.code)).toEqual(["name.taken"]);
  });
});

describe("what differs from machine to machine", () => {
  it("gives a machine its own choice of optional members", () => {
    const { space, type, ids } = build();
    const [first, second] = rows as [RollOutRow, RollOutRow];
    const edit = getValue(
      rollOutMachines(space, ids, {
        type,
        parent: MACHINES,
        optional: ["Process/Counter"],
        manufacturer: "",
        rows: [first, { ...second, optional: [] }],
        nodeIds: { kind: "numbers" },
      }),
    );
    const machines = listMachines(getValue(applyOperations(space, edit.operations)));
    expect(machines.map(({ groups }) => groups[0]?.members.map((member) => member.isPresent))).toEqual([
      [true, true],
      [true, false],
    ]);
  });

  it("makes NodeIds of a pattern for the machine, and of the path below it", () => {
    const { space, type, ids } = build();
    const intent = { type, parent: MACHINES, optional: [], manufacturer: "", rows, nodeIds: { kind: "path", pattern: "Hall.{name}", separator: "." } } as const;
    const after = getValue(applyOperations(space, getValue(rollOutMachines(space, ids, intent)).operations));
    const given = after.listOwnNodes().flatMap(({ nodeId }) => (nodeId.type === "s" ? [nodeId.identifier] : []));
    expect(given).toEqual(expect.arrayContaining(["Hall.P1", "Hall.P1.Process", "Hall.P1.Process.Speed", "Hall.P2.Identification.SerialNumber"]));
    // OPC 10000-3 §8.2.4: string identifiers are unique within their namespace.
    expect(new Set(given).size).toBe(given.length);
  });

  it("refuses a pattern that says the same of all machines, and an id that is there", () => {
    const { space, type, ids } = build();
    const plan = (pattern: string, some: readonly RollOutRow[]) =>
      rollOutMachines(space, ids, { type, parent: MACHINES, optional: [], manufacturer: "", rows: some, nodeIds: { kind: "path", pattern, separator: "." } });
    const [same, twice] = [plan("Press", rows), plan("{serial}", rows.map((row) => ({ ...row, serialNumber: "A-1" })))];
    expect(!same.ok && same.problems.map((found) => found.code)).toEqual(["roll-out.pattern"]);
    expect(!twice.ok && twice.problems.map((found) => found.code)).toEqual(["roll-out.node-id-taken"]);
  });
});

describe("proposeNextName", () => {
  it.each([
    ["B6", "B7"],
    ["Press 09", "Press 10"],
    ["Winder", "Winder2"],
    ["", "M1"],
  ])("after %j comes %j", (name, next) => {
    expect(proposeNextName(name)).toBe(next);
  });
});
