import { describe, expect, it } from "vitest";
import { findModellingRule, findProperty, findTypeDefinition } from "~/domain/address-space/browse";
import { standardKey } from "~/domain/address-space/node-id";
import { StandardDataType, StandardModellingRule, StandardType } from "~/domain/address-space/standard-ids";
import { addEnumeration, setEnumerationFields } from "~/domain/editing/commands/add-enumeration";
import { addMethod, addObject, addProperty, addVariable } from "~/domain/editing/commands/add-member";
import {
  addOptionSet,
  addStructure,
  setOptionSetBits,
  setStructureFields,
} from "~/domain/editing/commands/add-structure";
import { addType } from "~/domain/editing/commands/add-type";
import { addNamespaceMetadata, createModel, findNamespaceMetadata } from "~/domain/editing/commands/create-model";
import { setAttribute } from "~/domain/editing/commands/set-attribute";
import { setDataType } from "~/domain/editing/commands/set-data-type";
import { setMethodArguments } from "~/domain/editing/commands/set-method-arguments";
import { setModelInfo, setRequiredModels } from "~/domain/editing/commands/set-model-info";
import { setModellingRule } from "~/domain/editing/commands/set-modelling-rule";
import { setText } from "~/domain/editing/commands/set-text";
import { setRange, setUnit } from "~/domain/editing/commands/set-unit";
import { setValue } from "~/domain/editing/commands/set-value";
import { setValueRank } from "~/domain/editing/commands/set-value-rank";
import { SpaceDataTypes } from "~/domain/nodeset/values/data-type-shapes";
import { readValue } from "~/domain/nodeset/values/read-value";
import { findArguments, findEnumValues, findEuInformation, findRange } from "~/domain/nodeset/values/standard-values";
import { array, scalar, type Variant } from "~/domain/nodeset/values/variant";
import { Workbench } from "../../../../support/command-harness";
import { getStandardLayer } from "../../../../support/published-layers";
import { TEST_NAMESPACE } from "../../../../support/small-standard";

/** CEL: OPC 10000-8 §5.6.3 and UNECE Rec. 20. */
const CELSIUS = {
  namespaceUri: "http://www.opcfoundation.org/UA/units/un/cefact",
  unitId: 4408652,
  displayName: { text: "°C" },
  description: { text: "degree Celsius" },
};

function valueOf(bench: Workbench, key: Parameters<Workbench["node"]>[0]): Variant | undefined {
  const node = bench.node(key);
  if (node.nodeClass !== "Variable" || !node.value) return undefined;
  const result = readValue(node.value, new SpaceDataTypes(bench.space));
  return result.ok ? result.value : undefined;
}

describe("createModel", () => {
  it("makes header, namespace table and the metadata Object with its seven Properties", () => {
    const bench = new Workbench("Opc.Ua.Di.NodeSet2.xml");
    const { header } = bench.space.own;
    expect(header.namespaceUris).toEqual([TEST_NAMESPACE, "http://opcfoundation.org/UA/DI/"]);
    expect(header.models[0]).toMatchObject({ modelUri: TEST_NAMESPACE, version: "1.0.0" });
    expect(header.models[0]?.requiredModels.map((m) => m.modelUri)).toEqual([
      "http://opcfoundation.org/UA/",
      "http://opcfoundation.org/UA/DI/",
    ]);
    const object = findNamespaceMetadata(bench.space);
    if (object === undefined) throw new Error("no metadata");
    // Names and DataTypes: OPC 10000-5 §6.3.13, Table 22.
    const properties = bench.space
      .edgesFrom(object)
      .map((e) => bench.node(e.target))
      .filter((n) => n.nodeClass === "Variable" && n.parent === object);
    expect(properties.map((n) => n.browseName.name)).toEqual([
      "NamespaceUri",
      "NamespaceVersion",
      "NamespacePublicationDate",
      "IsNamespaceSubset",
      "StaticNodeIdTypes",
      "StaticNumericNodeIdRange",
      "StaticStringNodeIdPattern",
    ]);
    const published = bench.space.edgesFrom(StandardType.NamespaceMetadataType).map((e) => bench.node(e.target));
    for (const property of properties) {
      const declared = published.find((n) => n.browseName.name === property.browseName.name);
      expect(declared).toMatchObject({ dataType: property.nodeClass === "Variable" ? property.dataType : "" });
    }
    expect(bench.refuse(addNamespaceMetadata, {} as never)).toEqual(["model.metadata-exists"]);
  });

  it("refuses what is no URI, a URI that is taken and a date without zone", () => {
    const bench = new Workbench();
    const make = (change: object): string[] =>
      createModel([getStandardLayer()], bench.context, {
        namespaceUri: "urn:a:b",
        version: "1",
        publicationDate: "2024-05-01T00:00:00Z",
        requiredModels: [],
        ...change,
      }).problems.map((p) => p.code);
    expect(make({})).toEqual([]);
    expect(make({ namespaceUri: "no uri" })).toEqual(["model.uri"]);
    expect(make({ namespaceUri: "http://opcfoundation.org/UA/" })).toEqual(["model.uri-taken"]);
    expect(make({ publicationDate: "2024-05-01" })).toEqual(["model.date"]);
  });

  it("keeps the metadata in step with version and date, and required models with the namespace table", () => {
    const bench = new Workbench();
    bench.do(setModelInfo, { version: "1.1.0", publicationDate: "2025-01-01T00:00:00Z" });
    const object = findNamespaceMetadata(bench.space);
    expect(valueOf(bench, bench.at(object ?? standardKey(0), "NamespaceVersion").key)).toEqual(
      scalar("String", "1.1.0"),
    );
    const di = { modelUri: "http://opcfoundation.org/UA/DI/", version: "1.04", requiredModels: [] };
    const base = bench.space.own.header.models[0]?.requiredModels ?? [];
    bench.do(setRequiredModels, { requiredModels: [...base, di] });
    expect(bench.space.own.header.namespaceUris).toEqual([TEST_NAMESPACE, di.modelUri]);
    bench.do(setRequiredModels, { requiredModels: base });
    expect(bench.space.own.header.namespaceUris).toEqual([TEST_NAMESPACE]);
    expect(bench.refuse(setRequiredModels, { requiredModels: [] })).toEqual(["model.required-in-use"]);
  });
});

describe("addType", () => {
  it("derives each class from its supertype with the inverse HasSubtype at the subtype", () => {
    const bench = new Workbench();
    const machine = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "PressType" });
    expect(bench.node(machine)).toMatchObject({
      nodeClass: "ObjectType",
      references: [{ type: "i=45", target: "i=58", isForward: false }],
      displayName: [{ text: "PressType" }],
    });
    const variable = bench.do(addType, {
      supertype: StandardType.AnalogUnitType,
      name: "ForceType",
      dataType: StandardDataType.Double,
    });
    expect(bench.node(variable)).toMatchObject({ nodeClass: "VariableType", dataType: "i=11", valueRank: -2 });
    const feeds = bench.do(addType, { supertype: standardKey(32), name: "Feeds", inverseName: [{ text: "FedBy" }] });
    expect(bench.node(feeds)).toMatchObject({ nodeClass: "ReferenceType", inverseName: [{ text: "FedBy" }] });
    expect(bench.refuse(addType, { supertype: standardKey(32), name: "Nameless" })).toEqual([
      "type.inverse-name-missing",
    ]);
    expect(bench.refuse(addType, { supertype: StandardType.BaseObjectType, name: "PressType" })).toEqual([
      "name.taken",
    ]);
    expect(bench.refuse(addType, { supertype: standardKey(85), name: "X" })).toEqual(["type.no-supertype"]);
    expect(bench.refuse(addType, { supertype: StandardType.BaseObjectType, name: " " })).toEqual(["name.empty"]);
  });
});

describe("members", () => {
  const bench = new Workbench();
  const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "OvenType" });

  it("adds an analog Variable with unit and range in one go", () => {
    const temperature = bench.do(addVariable, {
      parent: type,
      name: "Temperature",
      typeDefinition: StandardType.AnalogUnitRangeType,
      dataType: StandardDataType.Float,
      unit: CELSIUS,
      range: { low: 0, high: 400 },
    });
    expect(bench.node(temperature)).toMatchObject({
      nodeClass: "Variable",
      parent: type,
      dataType: "i=10",
      references: [
        { type: "i=47", target: type, isForward: false },
        { type: "i=40", target: "i=17570", isForward: true },
        { type: "i=37", target: "i=78", isForward: true },
      ],
    });
    const unit = findProperty(bench.space, temperature, "EngineeringUnits");
    const range = findProperty(bench.space, temperature, "EURange");
    if (!unit || !range) throw new Error("Properties are missing");
    expect(findTypeDefinition(bench.space, unit.key)).toBe(StandardType.PropertyType);
    expect(findModellingRule(bench.space, unit.key)).toBe(StandardModellingRule.Mandatory);
    expect(findEuInformation(valueOf(bench, unit.key))).toEqual(CELSIUS);
    expect(findRange(valueOf(bench, range.key))).toEqual({ low: 0, high: 400 });
    expect(bench.space.edgesFrom(temperature).filter((e) => e.type === standardKey(46))).toHaveLength(2);
    bench.do(setRange, { variable: temperature, range: { low: -10, high: 500 } });
    expect(findRange(valueOf(bench, range.key))).toEqual({ low: -10, high: 500 });
    bench.do(setUnit, { variable: temperature });
    expect(findProperty(bench.space, temperature, "EngineeringUnits")).toBeUndefined();
    expect(bench.refuse(setRange, { variable: temperature, range: { low: 5, high: 4 } })).toEqual(["range.order"]);
    expect(bench.refuse(setRange, { variable: temperature, range: { low: NaN, high: 4 } })).toEqual([
      "range.not-finite",
    ]);
  });

  it("makes a unit where a plain Variable has none, and refuses it on text", () => {
    const speed = bench.do(addVariable, { parent: type, name: "Speed", dataType: StandardDataType.Double });
    bench.do(setUnit, { variable: speed, unit: CELSIUS });
    expect(findProperty(bench.space, speed, "EngineeringUnits")).toMatchObject({
      dataType: "i=887",
      browseName: { name: "EngineeringUnits" },
    });
    const label = bench.do(addVariable, { parent: type, name: "Label", dataType: StandardDataType.String });
    expect(bench.refuse(setUnit, { variable: label, unit: CELSIUS })).toEqual(["unit.not-numeric"]);
    expect(bench.refuse(setUnit, { variable: type, unit: CELSIUS })).toEqual(["unit.no-variable"]);
  });

  it("adds Objects, Properties and Methods with arguments, and refuses equal names and wrong places", () => {
    const group = bench.do(addObject, { parent: type, name: "Process" });
    expect(bench.node(group)).toMatchObject({ nodeClass: "Object", parent: type });
    const serial = bench.do(addProperty, { parent: type, name: "SerialNumber", value: scalar("String", "A-1") });
    expect(bench.node(serial).references).toContainEqual({ type: "i=46", target: type, isForward: false });
    const reset = bench.do(addMethod, {
      parent: type,
      name: "SelectRecipe",
      rule: StandardModellingRule.Optional,
      inputArguments: [{ name: "RecipeNumber", dataType: StandardDataType.UInt16 }],
      outputArguments: [{ name: "Accepted", dataType: StandardDataType.Boolean }],
    });
    const input = findProperty(bench.space, reset, "InputArguments");
    expect(input).toMatchObject({
      dataType: "i=296",
      valueRank: 1,
      browseName: { namespaceUri: "http://opcfoundation.org/UA/" },
    });
    expect(findArguments(input && valueOf(bench, input.key))).toMatchObject([
      { name: "RecipeNumber", valueRank: -1, dataType: { identifier: 5 } },
    ]);
    bench.do(setMethodArguments, {
      method: reset,
      input: [],
      output: [{ name: "Done", dataType: StandardDataType.Boolean }],
    });
    expect(findProperty(bench.space, reset, "InputArguments")).toBeUndefined();
    expect(
      bench.refuse(setMethodArguments, {
        method: reset,
        input: [{ name: "A", dataType: standardKey(1) }],
        output: [{ name: "A", dataType: standardKey(1) }],
      }),
    ).toEqual(["argument.name-taken"]);
    expect(bench.refuse(addObject, { parent: type, name: "Process" })).toEqual(["name.taken"]);
    expect(bench.refuse(addObject, { parent: serial, name: "X" })).toEqual(["reference.component-object-source"]);
    expect(bench.refuse(addVariable, { parent: serial, name: "X" })).toEqual(["reference.property-is-leaf"]);
    expect(bench.refuse(addMethod, { parent: group, name: "x".repeat(513) })).toEqual(["name.too-long"]);
  });

  it("has no rule below an instance and an inverse Organizes in a folder", () => {
    const folder = bench.do(addObject, {
      parent: standardKey(85),
      name: "Hall",
      typeDefinition: StandardType.FolderType,
    });
    expect(bench.node(folder).references).toEqual([
      { type: "i=35", target: "i=85", isForward: false },
      { type: "i=40", target: "i=61", isForward: true },
    ]);
  });
});

describe("settings", () => {
  const bench = new Workbench();
  const type = bench.do(addType, { supertype: StandardType.BaseObjectType, name: "T" });
  const member = bench.do(addVariable, {
    parent: type,
    name: "V",
    dataType: StandardDataType.Double,
    value: scalar("Double", 1.5),
  });

  it("drops a value that no longer fits and says so", () => {
    const result = setDataType(bench.space, bench.context, { node: member, dataType: StandardDataType.String });
    expect(result.problems).toMatchObject([{ code: "value.dropped", severity: "hint" }]);
    bench.do(setDataType, { node: member, dataType: StandardDataType.String });
    expect(valueOf(bench, member)).toBeUndefined();
    bench.do(setDataType, { node: member, dataType: StandardDataType.UInt16 });
    expect(bench.refuse(setValue, { node: member, value: scalar("Double", 2) })).toEqual(["value.type"]);
    expect(bench.refuse(setValue, { node: member, value: scalar("UInt16", 70_000) })).toEqual(["value.range"]);
    expect(bench.refuse(setValue, { node: member, value: array("UInt16", [1]) })).toEqual(["value.rank"]);
    bench.do(setValueRank, { node: member, valueRank: 2, arrayDimensions: [0, 3] });
    expect(bench.node(member)).toMatchObject({ valueRank: 2, arrayDimensions: "0,3" });
    bench.do(setValueRank, { node: member, valueRank: -1 });
    expect(bench.node(member)).not.toHaveProperty("arrayDimensions");
    expect(bench.refuse(setValueRank, { node: member, valueRank: 2, arrayDimensions: [1] })).toEqual([
      "value.dimension-count",
    ]);
  });

  it("sets rules, texts by locale and plain attributes", () => {
    bench.do(setModellingRule, { node: member, rule: StandardModellingRule.Optional });
    expect(findModellingRule(bench.space, member)).toBe("i=80");
    bench.do(setModellingRule, { node: member });
    expect(findModellingRule(bench.space, member)).toBeUndefined();
    expect(bench.refuse(setModellingRule, { node: member, rule: standardKey(85) })).toEqual([
      "reference.modelling-rule-ends",
    ]);
    bench.do(setText, { node: member, attribute: "displayName", locale: "de", text: "Wert" });
    bench.do(setText, { node: member, attribute: "description", text: "What it is" });
    expect(bench.node(member)).toMatchObject({
      displayName: [{ text: "V" }, { locale: "de", text: "Wert" }],
      description: [{ text: "What it is" }],
    });
    bench.do(setText, { node: member, attribute: "displayName", locale: "de", text: "" });
    expect(bench.refuse(setText, { node: member, attribute: "displayName", text: "" })).toEqual([
      "text.last-display-name",
    ]);
    expect(bench.refuse(setText, { node: member, attribute: "description", locale: "??", text: "x" })).toEqual([
      "text.locale",
    ]);
    bench.do(setAttribute, { node: member, attribute: "accessLevel", value: 3 });
    expect(bench.node(member)).toMatchObject({ accessLevel: 3 });
    expect(bench.refuse(setAttribute, { node: member, attribute: "accessLevel", value: 128 })).toEqual([
      "attribute.reserved-bits",
    ]);
    expect(bench.refuse(setAttribute, { node: type, attribute: "accessLevel", value: 3 })).toEqual([
      "operation.attribute-class",
    ]);
    expect(bench.refuse(setAttribute, { node: member, attribute: "historizing", value: "yes" })).toEqual([
      "attribute.value",
    ]);
  });
});

describe("data types", () => {
  const bench = new Workbench();

  it("keeps EnumStrings or EnumValues in step with the Definition", () => {
    const state = bench.do(addEnumeration, {
      name: "StateEnum",
      fields: [
        { name: "Off", value: 0 },
        { name: "On", value: 1 },
      ],
    });
    expect(bench.node(state)).toMatchObject({
      nodeClass: "DataType",
      definition: {
        name: { namespaceUri: TEST_NAMESPACE, name: "StateEnum" },
        fields: [
          { name: "Off", value: 0 },
          { name: "On", value: 1 },
        ],
      },
    });
    const strings = findProperty(bench.space, state, "EnumStrings");
    expect(strings && valueOf(bench, strings.key)).toEqual(array("LocalizedText", [{ text: "Off" }, { text: "On" }]));
    expect(strings && findModellingRule(bench.space, strings.key)).toBeUndefined();
    bench.do(setEnumerationFields, {
      dataType: state,
      fields: [
        { name: "Off", value: 0 },
        { name: "Fault", value: 10 },
      ],
    });
    expect(findProperty(bench.space, state, "EnumStrings")).toBeUndefined();
    const values = findProperty(bench.space, state, "EnumValues");
    expect(findEnumValues(values && valueOf(bench, values.key))?.map((v) => v.value)).toEqual([0, 10]);
    const bad = (fields: { name: string; value: number }[]): string[] =>
      bench.refuse(setEnumerationFields, { dataType: state, fields });
    expect(bad([])).toEqual(["enumeration.no-fields"]);
    expect(
      bad([
        { name: "A", value: 1 },
        { name: "A", value: 1 },
      ]),
    ).toEqual(["enumeration.name-taken", "enumeration.value-taken"]);
    expect(bad([{ name: "A", value: 1.5 }])).toEqual(["enumeration.value-range"]);
    expect(
      bench.refuse(setEnumerationFields, { dataType: StandardDataType.Double, fields: [{ name: "A", value: 1 }] }),
    ).toEqual(["enumeration.no-enumeration"]);
  });

  it("makes a structure with its three encodings, a union and an option set", () => {
    const point = bench.do(addStructure, {
      name: "PointType",
      fields: [
        { name: "X", dataType: StandardDataType.Double },
        { name: "Notes", dataType: StandardDataType.String, valueRank: 1, isOptional: true },
        { name: "Any", dataType: StandardDataType.Number },
      ],
    });
    const encodings = bench.space
      .edgesFrom(point)
      .filter((e) => e.type === standardKey(38))
      .map((e) => bench.node(e.target));
    expect(encodings.map((n) => [n.browseName.name, n.symbolicName, n.references[0]?.isForward])).toEqual([
      ["Default Binary", "DefaultBinary", false],
      ["Default XML", "DefaultXml", false],
      ["Default JSON", "DefaultJson", false],
    ]);
    expect(bench.node(point)).toMatchObject({
      definition: {
        fields: [{ name: "X" }, { valueRank: 1, arrayDimensions: "0", isOptional: true }, { name: "Any" }],
      },
    });
    bench.do(setStructureFields, { dataType: point, fields: [{ name: "Y", dataType: StandardDataType.Float }] });
    const union = bench.do(addStructure, {
      name: "EitherType",
      isUnion: true,
      fields: [{ name: "A", dataType: point }],
    });
    expect(bench.node(union)).toMatchObject({ definition: { isUnion: true }, references: [{ target: "i=12756" }] });
    expect(
      bench.refuse(addStructure, {
        name: "U",
        isUnion: true,
        fields: [{ name: "A", dataType: point, isOptional: true }],
      }),
    ).toEqual(["structure.optional-in-union"]);
    const flags = bench.do(addOptionSet, {
      name: "Flags",
      size: 8,
      bits: [
        { name: "Ready", bit: 0 },
        { name: "Hot", bit: 2 },
      ],
    });
    const values = findProperty(bench.space, flags, "OptionSetValues");
    expect(values && valueOf(bench, values.key)).toEqual(
      array("LocalizedText", [{ text: "Ready" }, { text: "" }, { text: "Hot" }]),
    );
    bench.do(setOptionSetBits, { dataType: flags, bits: [{ name: "Cold", bit: 1 }] });
    expect(bench.refuse(addOptionSet, { name: "More", size: 8, bits: [{ name: "Far", bit: 8 }] })).toEqual([
      "option-set.bit-range",
    ]);
  });
});
