import { describe, expect, it } from "vitest";
import { findModellingRule, findTypeDefinition } from "~/domain/address-space/browse";
import { listInstanceDeclarations, toPathKey } from "~/domain/address-space/instance-declarations";
import { numericNodeId, standardKey, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import {
  StandardDataType,
  StandardModellingRule,
  StandardReferenceType,
  StandardType,
} from "~/domain/address-space/standard-ids";
import { addEnumeration } from "~/domain/editing/commands/add-enumeration";
import { addMethod, addObject, addVariable } from "~/domain/editing/commands/add-member";
import { addStructure } from "~/domain/editing/commands/add-structure";
import { addType } from "~/domain/editing/commands/add-type";
import { connectNodes } from "~/domain/editing/commands/connect-nodes";
import { deleteNodes } from "~/domain/editing/commands/delete-nodes";
import { addDeclaredMembers, instantiate } from "~/domain/instantiation/instantiate";
import { listMissingMembers, listOfferedMembers } from "~/domain/instantiation/missing-members";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { Workbench } from "../../../support/command-harness";
import { TEST_NAMESPACE } from "../../../support/small-standard";

const { Optional, OptionalPlaceholder, MandatoryPlaceholder } = StandardModellingRule;
const OBJECTS = standardKey(85);
const DI = "http://opcfoundation.org/UA/DI/";
const di = (id: number): NodeKey => toNodeKey(numericNodeId(DI, id));

/** A type with a group, an optional member in it, an optional group with a mandatory member, a method and a placeholder. */
function makeMachineType(bench: Workbench): NodeKey {
  const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "MachineType" });
  const process = bench.do(addObject, { parent: type, name: "Process" });
  bench.do(addVariable, {
    parent: process,
    name: "Speed",
    typeDefinition: StandardType.AnalogUnitRangeType,
    dataType: StandardDataType.Float,
    range: { low: 0, high: 180 },
  });
  bench.do(addVariable, { parent: process, name: "Counter", dataType: StandardDataType.UInt32, rule: Optional });
  const light = bench.do(addObject, { parent: type, name: "Light", rule: Optional });
  bench.do(addVariable, { parent: light, name: "Color", dataType: StandardDataType.Byte });
  bench.do(addMethod, {
    parent: type,
    name: "Reset",
    outputArguments: [{ name: "Done", dataType: StandardDataType.Boolean }],
  });
  bench.do(addObject, { parent: type, name: "<Sensor>", rule: OptionalPlaceholder });
  return type;
}

describe("instantiate", () => {
  const bench = new Workbench();
  const type = makeMachineType(bench);
  const instance = bench.do(instantiate, { type, parent: OBJECTS, name: "B1" });

  it("makes mandatory members to the whole depth, with values and without rules", () => {
    const speed = bench.at(instance, "Process/Speed");
    expect(speed).toMatchObject({
      nodeClass: "Variable",
      dataType: "i=10",
      browseName: { namespaceUri: TEST_NAMESPACE },
    });
    expect(bench.at(speed.key, "EURange")).toMatchObject({
      value: (bench.at(type, "Process/Speed/EURange") as { value: unknown }).value,
    });
    expect(bench.has(speed.key, "EngineeringUnits")).toBe(true);
    for (const path of ["Process", "Process/Speed", "Process/Speed/EURange", "Reset"]) {
      const node = bench.at(instance, path);
      expect(findModellingRule(bench.space, node.key)).toBeUndefined();
      expect("parent" in node && node.parent).toBe(
        path.includes("/") ? bench.at(instance, path.slice(0, path.lastIndexOf("/"))).key : instance,
      );
    }
    expect(bench.has(instance, "Process/Counter")).toBe(false);
    expect(bench.has(instance, "Light")).toBe(false);
    expect(bench.has(instance, "<Sensor>")).toBe(false);
    expect(listMissingMembers(bench.space, instance)).toEqual([]);
  });

  it("copies Methods with MethodDeclarationId and arguments, or refers to the type's", () => {
    const copied = bench.at(instance, "Reset");
    expect(copied).toMatchObject({ methodDeclaration: bench.at(type, "Reset").key });
    expect(bench.has(copied.key, "OutputArguments")).toBe(true);
    const sharing = bench.do(instantiate, { type, parent: OBJECTS, name: "B2", methods: "share" });
    expect(bench.at(sharing, "Reset").key).toBe(bench.at(type, "Reset").key);
  });

  it("makes the optional members that were chosen, with those above them, and named placeholders", () => {
    const chosen = bench.do(instantiate, {
      type,
      parent: OBJECTS,
      name: "B3",
      optional: ["Process/Counter", toPathKey([{ namespaceUri: TEST_NAMESPACE, name: "Light" }])],
      named: [
        { path: "<Sensor>", name: "Left" },
        { path: "<Sensor>", name: "Right" },
      ],
    });
    for (const path of ["Process/Counter", "Light/Color", "Left", "Right"]) expect(bench.has(chosen, path)).toBe(true);
    expect(bench.refuse(instantiate, { type, parent: OBJECTS, name: "B4", optional: ["Process/Cuonter"] })).toEqual([
      "instantiate.no-such-member",
    ]);
    expect(bench.refuse(instantiate, { type, parent: OBJECTS, name: "B3" })).toEqual(["name.taken"]);
  });

  it("refuses abstract types, Interfaces and what is no type", () => {
    const abstract = bench.do(addType, { supertype: type, name: "AbstractType", isAbstract: true });
    expect(bench.refuse(instantiate, { type: abstract, parent: OBJECTS, name: "X" })).toEqual(["instantiate.abstract"]);
    expect(bench.refuse(instantiate, { type: StandardDataType.Double, parent: OBJECTS, name: "X" })).toEqual([
      "instantiate.no-type",
    ]);
    expect(bench.refuse(instantiate, { type: StandardType.BaseInterfaceType, parent: OBJECTS, name: "X" })).toEqual([
      "instantiate.interface",
    ]);
  });

  it("tells what an instance lacks after the type grew, and completes it", () => {
    const rich = bench.do(instantiate, { type, parent: OBJECTS, name: "B5" });
    bench.do(addVariable, { parent: bench.at(type, "Process").key, name: "Torque", dataType: StandardDataType.Float });
    bench.do(deleteNodes, { nodes: [bench.at(rich, "Process/Speed/EURange").key] });
    expect(listMissingMembers(bench.space, rich).map((m) => m.path.map((n) => n.name).join("/"))).toEqual([
      "Process/Torque",
      "Process/Speed/EURange",
    ]);
    bench.do(addDeclaredMembers, { instance: rich, includeMissing: true });
    expect(listMissingMembers(bench.space, rich)).toEqual([]);
    const offered = listOfferedMembers(bench.space, rich).map((m) => m.path.map((n) => n.name).join("/"));
    // The last five: optional Properties of AnalogUnitRangeType and its supertypes (OPC 10000-8 §5.3.2).
    expect(offered).toEqual([
      "Light",
      "<Sensor>",
      "Process/Counter",
      ...["InstrumentRange", "InstrumentNumberRange", "EUNumberRange", "Definition", "ValuePrecision"].map(
        (n) => `Process/Speed/${n}`,
      ),
    ]);
    bench.do(addDeclaredMembers, { instance: rich, optional: ["Light"] });
    expect(bench.has(rich, "Light/Color")).toBe(true);
  });
});

describe("inheritance", () => {
  it("merges supertypes by browse path; the nearer declaration holds (OPC 10000-3 §6.3.3.2)", () => {
    const bench = new Workbench();
    const base = makeMachineType(bench);
    const derived = bench.do(addType, { supertype: base, name: "BigMachineType" });
    const process = bench.do(addObject, { parent: derived, name: "Process" });
    bench.do(addVariable, { parent: process, name: "Counter", dataType: StandardDataType.UInt32 });
    bench.do(addVariable, { parent: process, name: "Load", dataType: StandardDataType.Double });
    const table = listInstanceDeclarations(bench.space, derived);
    const rows = [...table.values()].map((row) => [
      row.path.map((n) => n.name).join("/"),
      row.rule,
      row.declaredBy === derived,
    ]);
    expect(rows).toContainEqual(["Process/Counter", "i=78", true]);
    expect(rows).toContainEqual(["Process/Speed", "i=78", false]);
    expect(rows).toContainEqual(["Process/Load", "i=78", true]);
    expect(rows).toContainEqual(["Light/Color", "i=78", false]);
    const instance = bench.do(instantiate, { type: derived, parent: OBJECTS, name: "Big" });
    for (const path of ["Process/Counter", "Process/Speed/EURange", "Process/Load"])
      expect(bench.has(instance, path)).toBe(true);
    expect(bench.at(instance, "Process/Counter")).toMatchObject({ dataType: "i=7" });
  });

  it("gives the members of Interfaces, of the type and of the instance", () => {
    const bench = new Workbench("Opc.Ua.Di.NodeSet2.xml");
    // IVendorNameplateType i=15035: all members optional; ITagNameplateType i=15048 (published DI 1.04 NodeSet).
    const vendor = di(15035);
    expect(bench.node(vendor).browseName.name).toBe("IVendorNameplateType");
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "PumpType" });
    bench.do(connectNodes, { source: type, type: StandardReferenceType.HasInterface, target: vendor });
    const pump = bench.do(instantiate, {
      type,
      parent: OBJECTS,
      name: "P1",
      optional: ["SerialNumber", "Manufacturer"],
      interfaces: [di(15048)],
    });
    expect(bench.at(pump, "SerialNumber")).toMatchObject({ browseName: { namespaceUri: DI }, dataType: "i=12" });
    expect(listOfferedMembers(bench.space, pump).map((m) => m.path[0]?.name)).toContain("AssetId");
  });
});

describe("what stands for many nodes", () => {
  it("is the entry of an exposed array: none is made unasked, each that was named is (OPC 10000-3 §6.4.4.4.3)", () => {
    const bench = new Workbench();
    const type = bench.do(addType, {
      supertype: StandardType.BaseDataVariableType,
      name: "LevelsType",
      dataType: StandardDataType.Double,
      valueRank: 1,
      arrayDimensions: "0",
    });
    const { ExposesItsArray } = StandardModellingRule;
    bench.do(addVariable, { parent: type, name: "Level", dataType: StandardDataType.Double, rule: ExposesItsArray });
    const named = ["Level1", "Level2"].map((name) => ({ path: "Level", name }));
    const bare = bench.do(addVariable, { parent: OBJECTS, name: "Bare", typeDefinition: type });
    expect(bench.has(bare, "Level")).toBe(false);
    expect(listMissingMembers(bench.space, bare)).toEqual([]);
    expect(listOfferedMembers(bench.space, bare)).toMatchObject([{ rule: ExposesItsArray, isPlaceholder: true }]);
    const filled = bench.do(addVariable, { parent: OBJECTS, name: "Filled", typeDefinition: type, named });
    for (const name of ["Level1", "Level2"]) {
      expect(bench.at(filled, name)).toMatchObject({ nodeClass: "Variable", dataType: "i=11" });
      expect(bench.at(filled, name).displayName).toEqual([{ text: name }]);
    }
  });

  it("is a mandatory placeholder too, which is missing until a node of its type is there (§6.4.4.4.5)", () => {
    const bench = new Workbench();
    const sensor = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "SensorType" });
    const special = bench.do(addType, { supertype: sensor, name: "EyeType" });
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "StationType" });
    bench.do(addObject, { parent: type, name: "<Sensor>", typeDefinition: sensor, rule: MandatoryPlaceholder });
    const station = bench.do(instantiate, { type, parent: OBJECTS, name: "S1" });
    expect(listMissingMembers(bench.space, station).map((member) => member.pathKey)).toHaveLength(1);
    bench.do(addObject, { parent: station, name: "Door" });
    expect(listMissingMembers(bench.space, station)).toHaveLength(1);
    bench.do(addObject, { parent: station, name: "Eye", typeDefinition: special });
    expect(listMissingMembers(bench.space, station)).toEqual([]);
  });
});

describe("add-ins", () => {
  it("are members like any other: mandatory ones are made, by the reference that the type has (§4.10.3)", () => {
    const bench = new Workbench("Opc.Ua.Di.NodeSet2.xml");
    // LockingServicesType i=6388 with the mandatory Property Locked (published DI 1.04 NodeSet).
    const addIn = di(6388);
    expect(bench.node(addIn).browseName.name).toBe("LockingServicesType");
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "GateType" });
    const { HasAddIn } = StandardReferenceType;
    bench.do(addObject, { parent: type, name: "Lock", typeDefinition: addIn, referenceType: HasAddIn });
    const gate = bench.do(instantiate, { type, parent: OBJECTS, name: "G1" });
    const lock = bench.at(gate, "Lock");
    expect(bench.space.hasEdge({ source: gate, type: HasAddIn, target: lock.key })).toBe(true);
    expect(bench.has(gate, "Lock/Locked")).toBe(true);
  });

  it("and Interfaces reach the instances of subtypes", () => {
    const bench = new Workbench("Opc.Ua.Di.NodeSet2.xml");
    const base = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "PumpType" });
    bench.do(connectNodes, { source: base, type: StandardReferenceType.HasInterface, target: di(15035) });
    const derived = bench.do(addType, { supertype: base, name: "BigPumpType" });
    const pump = bench.do(instantiate, { type: derived, parent: OBJECTS, name: "P1", optional: ["Manufacturer"] });
    expect(bench.has(pump, "Manufacturer")).toBe(true);
  });
});

describe("what is written here", () => {
  it("carries the inverse reference at each child, subtype and encoding, since some stacks lose nodes without", () => {
    const bench = new Workbench();
    const type = makeMachineType(bench);
    bench.do(addType, { supertype: type, name: "BigMachineType" });
    bench.do(addStructure, { name: "PointType", fields: [{ name: "X", dataType: StandardDataType.Double }] });
    bench.do(addEnumeration, { name: "StateEnum", fields: [{ name: "Off", value: 0 }] });
    bench.do(instantiate, { type, parent: OBJECTS, name: "B1", optional: ["Light"] });
    const { xml } = writeNodeSet({ header: bench.space.own.header, nodes: bench.space.listOwnNodes() });
    const nodes = [...xml.matchAll(/<UA(\w+) NodeId="([^"]+)" BrowseName="([^"]+)"[^>]*>([^]*?)<\/UA\1>/g)];
    expect(nodes.length).toBe(bench.space.own.nodes.size);
    const inverse = /ReferenceType="(?:HasSubtype|HasProperty|HasComponent|HasOrderedComponent|HasAddIn|Organizes|HasEncoding)" IsForward="false"/;
    for (const [, , id, name, body] of nodes) expect(inverse.test(body ?? ""), `${id ?? ""} ${name ?? ""}`).toBe(true);
    const children = [...xml.matchAll(/<UA(?:Object|Variable|Method) [^>]*>/g)].map(([tag]) => tag);
    const isOwned = (tag: string): boolean => tag.includes("ParentNodeId=") || tag.includes('BrowseName="Default ');
    expect(children.filter((tag) => !isOwned(tag))).toEqual([]);
  });
});

describe("shared declarations", () => {
  it("make one node in the instance: a group that organises a parameter refers to it (OPC 10000-3 §6.4.3)", () => {
    const bench = new Workbench();
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "T" });
    const group = bench.do(addObject, { parent: type, name: "Group" });
    const set = bench.do(addObject, { parent: type, name: "ParameterSet" });
    const parameter = bench.do(addVariable, { parent: set, name: "Level", dataType: StandardDataType.Double });
    bench.do(connectNodes, { source: group, type: StandardReferenceType.Organizes, target: parameter });
    const instance = bench.do(instantiate, { type, parent: OBJECTS, name: "I" });
    expect(bench.at(instance, "Group/Level").key).toBe(bench.at(instance, "ParameterSet/Level").key);
    expect(bench.at(instance, "Group/Level").key).not.toBe(parameter);
    expect(listMissingMembers(bench.space, instance)).toEqual([]);
  });

  it("are made anew for each member of one type", () => {
    const bench = new Workbench();
    const type = makeMachineType(bench);
    const line = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "LineType" });
    bench.do(addObject, { parent: line, name: "First", typeDefinition: type });
    bench.do(addObject, { parent: line, name: "Second", typeDefinition: type });
    const instance = bench.do(instantiate, { type: line, parent: OBJECTS, name: "L" });
    const first = bench.at(instance, "First/Process/Speed/EURange");
    expect(first.key).not.toBe(bench.at(instance, "Second/Process/Speed/EURange").key);
  });

  it("mirror references between declarations", () => {
    const bench = new Workbench();
    const feeds = bench.do(addType, { supertype: standardKey(32), name: "Feeds", inverseName: [{ text: "FedBy" }] });
    const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "T" });
    const a = bench.do(addObject, { parent: type, name: "A" });
    const b = bench.do(addObject, { parent: type, name: "B" });
    bench.do(connectNodes, { source: a, type: feeds, target: b });
    const instance = bench.do(instantiate, { type, parent: OBJECTS, name: "I" });
    expect(
      bench.space.hasEdge({ source: bench.at(instance, "A").key, type: feeds, target: bench.at(instance, "B").key }),
    ).toBe(true);
  });
});

describe("published types", () => {
  it("are instantiated complete: each concrete ObjectType of DI and Machinery", () => {
    const bench = new Workbench("Opc.Ua.Di.NodeSet2.xml", "Opc.Ua.IA.NodeSet2.xml", "Opc.Ua.Machinery.NodeSet2.xml");
    let count = 0;
    for (const layer of bench.space.layers.slice(1, -1)) {
      for (const node of layer.nodes.values()) {
        if (node.nodeClass !== "ObjectType" || node.isAbstract) continue;
        const result = instantiate(bench.space, bench.context, {
          type: node.key,
          parent: OBJECTS,
          name: `I${++count}`,
        });
        if (!result.ok) throw new Error(`${node.browseName.name}: ${JSON.stringify(result.problems)}`);
        const space = bench.space;
        bench.space = result.value.operations.reduce(
          (s, op) => (op.kind === "addNode" ? s.withNode(op.node) : s),
          space,
        );
        const instance = result.value.made[0] as NodeKey;
        const missing = listMissingMembers(bench.space, instance).filter((m) => m.rule !== MandatoryPlaceholder);
        expect([node.browseName.name, missing]).toEqual([node.browseName.name, []]);
        expect(findTypeDefinition(bench.space, instance)).toBe(node.key);
        bench.space = space;
      }
    }
    expect(count).toBeGreaterThan(30);
  });
});
