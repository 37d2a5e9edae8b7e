/**
 * The demo's models: the committed files are what the builder makes, they hold what the scenario says, and others load
 * them. `npx vitest run --project conformance demo-models -u` writes the files anew.
 */
import { readFileSync } from "node:fs";
import { join } from "node:path";
import { beforeAll, describe, expect, it } from "vitest";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import {
  findModellingRule,
  findProperty,
  findTypeDefinition,
  listEdgesFrom,
  listMembers,
} from "~/domain/address-space/browse";
import { getDataType, hasValueAttributes, type Node } from "~/domain/address-space/node";
import { numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { StandardModellingRule, StandardReferenceType } from "~/domain/address-space/standard-ids";
import { runChecks } from "~/domain/checks/run-checks";
import { getValue } from "~/domain/core/result";
import { readNodeSet } from "~/domain/nodeset/read-nodeset";
import { writeNodeSet } from "~/domain/nodeset/write-nodeset";
import { SpaceDataTypes } from "~/domain/nodeset/values/data-type-shapes";
import { readValue } from "~/domain/nodeset/values/read-value";
import { findEnumValues, findEuInformation, findRange } from "~/domain/nodeset/values/standard-values";
import type { Variant } from "~/domain/nodeset/values/variant";
import { validateXsd } from "~/library/validate-xsd.server";
import { buildBraiderXml, buildHallXml } from "../support/demo-models/build-demo-models";
import { loadInNodeOpcua } from "../support/node-opcua-loading";
import { getPublishedLayer } from "../support/published-layers";
import { projectRoot } from "../support/source-files";

const BRAIDER = "http://merrow.example/UA/RopeBraider/";
const DI = "http://opcfoundation.org/UA/DI/";
const IA = "http://opcfoundation.org/UA/IA/";
const MACHINERY = "http://opcfoundation.org/UA/Machinery/";

const published = [
  "Opc.Ua.NodeSet2.xml",
  "Opc.Ua.Di.NodeSet2.xml",
  "Opc.Ua.IA.NodeSet2.xml",
  "Opc.Ua.Machinery.NodeSet2.xml",
];
const packageFolder = join(projectRoot, "node_modules/node-opcua-nodesets/nodesets");
const files = {
  braider: join(projectRoot, "nodesets/demo/merrow-rope-braider.NodeSet2.xml"),
  hall: join(projectRoot, "nodesets/demo/merrow-hall.NodeSet2.xml"),
};

function toLayer(xml: string): Layer {
  const { header, nodes } = getValue(readNodeSet(xml));
  return buildLayer(header, nodes);
}

let built: { braider: string; hall: string };
let braider: AddressSpace;
let hall: AddressSpace;

beforeAll(() => {
  built = { braider: buildBraiderXml(), hall: buildHallXml() };
  const required = published.map(getPublishedLayer);
  braider = AddressSpace.of(required.slice(0, 3), toLayer(built.braider));
  hall = AddressSpace.of([...required, braider.own], toLayer(built.hall));
}, 120_000);

const foreign = (namespaceUri: string, identifier: number): NodeKey =>
  toNodeKey(numericNodeId(namespaceUri, identifier));

/** The node at a path of plain names below a node. */
function find(space: AddressSpace, from: NodeKey, path: string): Node | undefined {
  return path
    .split("/")
    .reduce<Node | undefined>(
      (at, name) => at && listMembers(space, at.key).find((node) => node.browseName.name === name),
      space.getNode(from),
    );
}

function valueOf(space: AddressSpace, node: Node | undefined): Variant | undefined {
  if (!node || !hasValueAttributes(node) || !node.value) return undefined;
  return getValue(readValue(node.value, new SpaceDataTypes(space)));
}

function scalarOf(space: AddressSpace, node: Node | undefined): unknown {
  const variant = valueOf(space, node);
  return variant?.shape === "scalar" ? variant.value : undefined;
}

function nameOf(space: AddressSpace, key: NodeKey | undefined): string | undefined {
  return key === undefined ? undefined : space.getNode(key)?.browseName.name;
}

describe("the files", () => {
  for (const name of ["braider", "hall"] as const) {
    const file = files[name];

    it(`${name}: are what the builder makes, byte by byte`, async () => {
      await expect(built[name]).toMatchFileSnapshot(file);
    });

    it(`${name}: hold the same bytes after being read and written`, () => {
      const text = readFileSync(file, "utf8");
      expect(writeNodeSet(getValue(readNodeSet(text))).xml).toBe(text);
    });

    it(`${name}: are valid by the schema of OPC 10000-6 Annex F as the npm package ships it`, async () => {
      expect(await validateXsd(readFileSync(file))).toEqual([]);
    });
  }

  it("break no rule that the checker calls an error", () => {
    for (const space of [braider, hall]) {
      expect(runChecks(space).filter((finding) => finding.severity === "error")).toEqual([]);
    }
  });

  it("load in node-opcua, in a fresh process, without a word and with every node", async () => {
    const base = published.map((file) => join(packageFolder, file));
    const nodeIds = [...braider.listOwnNodes(), ...hall.listOwnNodes()].map((node) => node.nodeId);
    const [silent, loaded] = await Promise.all([
      loadInNodeOpcua(base, []),
      loadInNodeOpcua([...base, files.braider, files.hall], nodeIds),
    ]);
    expect(loaded.missing).toEqual([]);
    expect(loaded.output).toBe(silent.output);
  });
});

/** The table of the scenario. Unit codes are those of UN/CEFACT Rec. 20. */
const rows = `
Process/CreelDistance       Float   AnalogUnitRangeType MMT 0 400 M
Process/CreelFill           Float   AnalogUnitRangeType P1 0 100 M
Process/CarriagePosition    Float   AnalogUnitRangeType MMT 0 250 M
Process/CarriageSetpoint    Float   AnalogUnitRangeType MMT 0 250 M
Process/CarriageDeviation   Float   AnalogUnitRangeType MMT -5 5 M
Process/SpindleSpeed        Float   AnalogUnitRangeType RPM 0 180 M
Process/PicksCounter        UInt32  BaseDataVariableType - - - O
Environment/GearboxVibration   Float AnalogUnitRangeType C16 0 20 M
Environment/GearboxTemperature Float AnalogUnitRangeType CEL -20 90 M
Environment/Humidity        Float   AnalogUnitRangeType P1 0 100 M
Environment/AmbientPressure Float   AnalogUnitRangeType A97 900 1100 M
Configuration/RecipeNumber  UInt16  BaseDataVariableType - - - M
Configuration/SensorTag     String  BaseDataVariableType - - - O
Energy/ActivePower          Float   AnalogUnitRangeType KWT 0 15 M
Energy/ActiveEnergy         Double  AnalogUnitRangeType KWH 0 1000000 M
Energy/Voltage              Float   AnalogUnitRangeType VLT 0 250 M
Energy/Current              Float   AnalogUnitRangeType AMP 0 63 M
Energy/PowerFactor          Float   AnalogUnitRangeType C62 -1 1 O
Status/State                BraiderStateEnum BaseDataVariableType - - - M
Status/FaultNumber          UInt16  MultiStateValueDiscreteType - - - M
Status/SensorHealth         DeviceHealthEnumeration BaseDataVariableType - - - M`
  .trim()
  .split("\n")
  .map((line) => line.trim().split(/\s+/))
  .map(([path = "", dataType, type, unit, low, high, rule]) => ({ path, dataType, type, unit, low, high, rule }));

/** OPC 10000-8 §5.6.3: UnitId is the Rec. 20 code read as a number, one octet a character. */
function unitIdOf(code: string): number {
  return [...code].reduce((id, letter) => id * 256 + letter.charCodeAt(0), 0);
}

describe("RopeBraiderType", () => {
  const type = foreign(BRAIDER, 1001);

  it("derives from BaseObjectType and has the five groups", () => {
    const groups = listMembers(braider, type).filter((node) => node.nodeClass === "Object");
    expect(groups.map((node) => node.browseName.name)).toEqual([
      "Process",
      "Environment",
      "Configuration",
      "Energy",
      "Status",
    ]);
    expect(braider.getNode(type)?.browseName).toEqual({ namespaceUri: BRAIDER, name: "RopeBraiderType" });
  });

  it("computes UnitIds as OPC 10000-8 §5.6.3 gives them for °C", () => {
    expect(unitIdOf("CEL")).toBe(4408652);
  });

  for (const row of rows) {
    it(`has ${row.path} as the scenario says`, () => {
      const node = find(braider, type, row.path);
      if (!node || !hasValueAttributes(node)) throw new Error("No such Variable");
      expect(nameOf(braider, getDataType(node))).toBe(row.dataType);
      expect(nameOf(braider, findTypeDefinition(braider, node.key))).toBe(row.type);
      expect(findModellingRule(braider, node.key)).toBe(
        StandardModellingRule[row.rule === "O" ? "Optional" : "Mandatory"],
      );
      const unit = findEuInformation(valueOf(braider, findProperty(braider, node.key, "EngineeringUnits")));
      const range = findRange(valueOf(braider, findProperty(braider, node.key, "EURange")));
      expect(unit?.unitId).toBe(row.unit === "-" ? undefined : unitIdOf(row.unit ?? ""));
      expect(range).toEqual(row.unit === "-" ? undefined : { low: Number(row.low), high: Number(row.high) });
      if (unit) expect(unit.namespaceUri).toBe("http://www.opcfoundation.org/UA/units/un/cefact");
    });
  }

  it("names the faults of FaultNumber", () => {
    const values = findEnumValues(valueOf(braider, find(braider, type, "Status/FaultNumber/EnumValues")));
    expect(values?.map((entry) => [Number(entry.value), entry.displayName.text])).toEqual([
      [0, "None"],
      [11, "Yarn break"],
      [12, "Creel empty"],
      [21, "Guard open"],
      [31, "Drive overload"],
    ]);
  });

  it("has BraiderStateEnum with its five states", () => {
    const node = braider.listOwnNodes().find((own) => own.browseName.name === "BraiderStateEnum");
    const fields = node?.nodeClass === "DataType" ? node.definition?.fields : undefined;
    expect(fields?.map((field) => [field.value, field.name])).toEqual([
      [0, "Off"],
      [1, "Setup"],
      [2, "Running"],
      [3, "Waiting"],
      [4, "Fault"],
    ]);
  });

  it("has an optional stack light of five ordered segments", () => {
    const light = find(braider, type, "Status/StackLight");
    if (!light) throw new Error("No stack light");
    expect(findTypeDefinition(braider, light.key)).toBe(foreign(IA, 1002));
    expect(findModellingRule(braider, light.key)).toBe(StandardModellingRule.Optional);
    const segments = listEdgesFrom(braider, light.key, StandardReferenceType.HasOrderedComponent).map(
      (edge) => edge.target,
    );
    expect(segments.map((key) => findTypeDefinition(braider, key))).toEqual(Array(5).fill(foreign(IA, 1006)));
    const places = segments.map((key) => scalarOf(braider, find(braider, key, "NumberInList")));
    expect(places).toEqual([1, 2, 3, 4, 5]);
  });

  it("has the methods ResetPicks and SelectRecipe, both optional", () => {
    const methods = listMembers(braider, type).filter((node) => node.nodeClass === "Method");
    expect(methods.map((node) => node.browseName.name)).toEqual(["ResetPicks", "SelectRecipe"]);
    for (const method of methods) expect(findModellingRule(braider, method.key)).toBe(StandardModellingRule.Optional);
    expect(methods.map((method) => listMembers(braider, method.key).map((node) => node.browseName.name))).toEqual([
      [],
      ["InputArguments", "OutputArguments"],
    ]);
  });

  it("describes every member in English and names it in English and German", () => {
    const bare = rows.filter(({ path }) => {
      const node = find(braider, type, path);
      const locales = node?.displayName.map((text) => text.locale).join();
      return locales !== "en,de" || !node?.description?.[0]?.text;
    });
    expect(bare).toEqual([]);
  });
});

describe("the hall", () => {
  const machinesObject = foreign(MACHINERY, 1001);

  function listMachines(): Node[] {
    return listEdgesFrom(hall, machinesObject, StandardReferenceType.Organizes).map((edge) =>
      hall.requireNode(edge.target),
    );
  }

  it("references each machine directly from Machines by Organizes (OPC 40001-1 v1.04 §9.2)", () => {
    expect(listMachines().map((node) => node.browseName.name)).toEqual(["B1", "B2", "B3", "B4", "B5", "B6"]);
    for (const machine of listMachines()) {
      expect(findTypeDefinition(hall, machine.key)).toBe(foreign(BRAIDER, 1001));
    }
  });

  it("gives each machine the add-in of MachineIdentificationType under its default name by HasAddIn (§9.2, §8.6)", () => {
    for (const machine of listMachines()) {
      const addIns = listEdgesFrom(hall, machine.key, StandardReferenceType.HasAddIn).map((edge) =>
        hall.requireNode(edge.target),
      );
      // The value of DefaultInstanceBrowseName of MachineIdentificationType (ns=1;i=6030 of the published NodeSet).
      expect(addIns.map((node) => node.browseName)).toEqual([{ namespaceUri: DI, name: "Identification" }]);
      expect(addIns.map((node) => findTypeDefinition(hall, node.key))).toEqual([foreign(MACHINERY, 1012)]);
    }
  });

  it("identifies each machine by the mandatory Properties of §8.6 with a URI and a serial number of its own", () => {
    const seen = new Set<unknown>();
    for (const machine of listMachines()) {
      for (const name of ["ProductInstanceUri", "Manufacturer", "SerialNumber"]) {
        const property = find(hall, machine.key, `Identification/${name}`);
        expect(property?.browseName.namespaceUri).toBe(DI);
        const value = scalarOf(hall, property);
        expect(value).toBeTruthy();
        if (name !== "Manufacturer") seen.add(value);
      }
      const year = find(hall, machine.key, "Identification/YearOfConstruction");
      expect(year?.browseName.namespaceUri).toBe(MACHINERY);
      expect(Number(scalarOf(hall, year))).toSatisfy((at: number) => at >= 1998 && at <= 2011);
    }
    expect(seen.size).toBe(12);
  });

  it("has PicksCounter on all machines but B1 and B2", () => {
    const counting = listMachines().filter((machine) => find(hall, machine.key, "Process/PicksCounter"));
    expect(counting.map((node) => node.browseName.name)).toEqual(["B3", "B4", "B5", "B6"]);
  });

  it("has every other member of the type on every machine, with the same unit and range", () => {
    for (const machine of listMachines()) {
      for (const row of rows.filter(({ path }) => path !== "Process/PicksCounter")) {
        const node = find(hall, machine.key, row.path);
        if (!node) throw new Error(`${machine.browseName.name} has no ${row.path}`);
        const unit = findEuInformation(valueOf(hall, findProperty(hall, node.key, "EngineeringUnits")));
        expect(unit?.unitId).toBe(row.unit === "-" ? undefined : unitIdOf(row.unit ?? ""));
      }
    }
  });
});
