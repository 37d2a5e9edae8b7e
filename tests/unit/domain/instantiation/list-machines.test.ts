import { describe, expect, it } from "vitest";
import { OPC_UA_NAMESPACE, type NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType, StandardReferenceType, StandardType } from "~/domain/address-space/standard-ids";
import { listMachines } from "~/domain/instantiation/list-machines";
import { buildModel, type ExampleModel } from "../../../support/model-builder";

type Group = Readonly<Record<string, readonly string[]>>;

function addType(m: ExampleModel, name: string, groups: Group, supertype?: NodeKey): NodeKey {
  const type = m.objectType(name, supertype === undefined ? {} : { supertype });
  for (const [group, members] of Object.entries(groups)) addGroup(m, type, group, members);
  return type;
}

function addGroup(m: ExampleModel, parent: NodeKey, name: string, members: readonly string[]): NodeKey {
  const group = m.object(name, { parent });
  for (const member of members) m.variable(member, { parent: group, type: StandardType.AnalogUnitRangeType });
  return group;
}

function addStandardProperty(m: ExampleModel, parent: NodeKey, name: string, xml: string): void {
  m.property(name, { parent, value: { xml }, set: { browseName: { namespaceUri: OPC_UA_NAMESPACE, name } } });
}

const process: Group = { Process: ["Speed", "Counter"], Energy: ["Power"] };

describe("listMachines", () => {
  it("tells which of the declared members a machine has, group by group in the order of the type", () => {
    const { space } = buildModel((m) => {
      const type = addType(m, "PressType", process);
      const press = m.object("P1", { type });
      addGroup(m, press, "Process", ["Speed"]);
      addGroup(m, press, "Energy", ["Power"]);
    });
    expect(listMachines(space).map((machine) => [machine.name, machine.typeName, machine.groups])).toEqual([
      [
        "P1",
        "PressType",
        [
          {
            name: "Process",
            members: [
              { name: "Speed", path: "Process/Speed", isPresent: true },
              { name: "Counter", path: "Process/Counter", isPresent: false },
            ],
          },
          { name: "Energy", members: [{ name: "Power", path: "Energy/Power", isPresent: true }] },
        ],
      ],
    ]);
  });

  it("counts groups that the supertype declares, the supertype's first", () => {
    const { space } = buildModel((m) => {
      const base = addType(m, "MachineBaseType", { Process: ["Speed"] });
      const type = addType(m, "PressType", { Energy: ["Power"] }, base);
      m.object("P1", { type });
    });
    expect(listMachines(space)[0]?.groups.map((group) => group.name)).toEqual(["Process", "Energy"]);
  });

  it("finds machines below folders of the own model, and neither folders nor parts nor the namespace metadata", () => {
    const { space } = buildModel((m) => {
      const type = addType(m, "PressType", process);
      const folder = m.object("Hall", { type: StandardType.FolderType });
      const press = m.object("P1", { type, parent: folder, reference: StandardReferenceType.Organizes });
      m.object("Part", { type, parent: press });
      m.object("Plain");
    });
    expect(listMachines(space).map((machine) => machine.name)).toEqual(["P1"]);
  });

  it("takes the first enumeration as state and the first analog value as figure, a speed before others", () => {
    const { space, made } = buildModel((m) => {
      const states = m.dataType("StateEnum", { supertype: StandardDataType.Enumeration });
      const press = m.object("P1", { type: addType(m, "PressType", {}) });
      const analog = (name: string) => m.variable(name, { parent: press, type: StandardType.AnalogUnitRangeType });
      const first = analog("Pressure");
      const speed = analog("Speed");
      // UNECE Rec. 20: r/min is RPM, unit id 5394509 by the formula of OPC 10000-8 §5.6.3.4.
      const unit =
        "<EUInformation><UnitId>5394509</UnitId><DisplayName><Text>r/min</Text></DisplayName></EUInformation>";
      addStandardProperty(m, speed, "EngineeringUnits", unit);
      addStandardProperty(m, speed, "EURange", "<Range><Low>0</Low><High>180</High></Range>");
      return { state: m.variable("State", { parent: press, dataType: states }), speed, first };
    });
    const [machine] = listMachines(space);
    expect(machine?.state).toBe(made.state);
    expect(machine?.figure).toEqual({ key: made.speed, name: "Speed", unit: "r/min", range: { low: 0, high: 180 } });
  });
});
