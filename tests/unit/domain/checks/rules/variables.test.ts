/** Conditions from OPC 10000-3, -6 and -8 v1.05.06; unit ids from UN/CEFACT Recommendation 20 by way of OPC 10000-8 §5.6.3. */
import { numericNodeId, standardKey, toNodeKey } from "~/domain/address-space/node-id";
import { StandardDataType as D, StandardType as T } from "~/domain/address-space/standard-ids";
import { CELSIUS, extensionObject, list, matrix, range, scalar, unit, UNECE_URI } from "~/domain/checks/example-values";
import type { ExampleModel, NodeKey } from "../../../../support/model-builder";
import { describeRule } from "../../../../support/describe-rule";

const foreign = toNodeKey(numericNodeId("http://example.org/UA/Other/", 1));

function variable(m: ExampleModel, parts: Parameters<ExampleModel["variable"]>[1] = {}): NodeKey {
  return m.variable("Speed", { parent: m.object("Pump1"), ...parts });
}

function unitProperty(m: ExampleModel, parts: Parameters<typeof unit>[0]): NodeKey {
  return m.property("0:EngineeringUnits", {
    parent: variable(m, { type: T.AnalogUnitType }),
    dataType: D.EUInformation,
    value: unit(parts),
  });
}

describeRule("R095", {
  valid: {
    "an absent attribute": (m) => m.set(variable(m), { dataType: undefined }),
    "an abstract DataType": (m) => variable(m, { dataType: D.Number }),
    "a DataType of a model that is not loaded": (m) => variable(m, { dataType: foreign }),
  },
  invalid: {
    "the null NodeId": (m) => variable(m, { dataType: standardKey(0) }),
    "an ObjectType": (m) => variable(m, { dataType: T.BaseObjectType }),
  },
});

describeRule("R097", {
  valid: {
    "anything below BaseDataType": (m) => variable(m, { type: T.BaseDataVariableType, dataType: D.String }),
    "a subtype of the declaration's": (m) => {
      const pump = m.objectType("PumpType");
      m.variable("Speed", { parent: pump, rule: "Mandatory", dataType: D.Number });
      m.variable("Speed", { parent: m.object("Pump1", { type: pump }), dataType: D.Float });
    },
  },
  invalid: {
    "an absent attribute where a number is asked for": (m) => {
      const key = variable(m, { type: T.BaseAnalogType });
      m.set(key, { dataType: undefined });
      return key;
    },
    "a VariableType wider than its supertype": (m) =>
      m.variableType("LevelType", { supertype: T.BaseAnalogType, dataType: D.BaseDataType }),
    "an override that widens": (m) => {
      const base = m.objectType("PumpType");
      m.variable("Speed", { parent: base, rule: "Mandatory", dataType: D.Float });
      return m.variable("Speed", {
        parent: m.objectType("FastPumpType", { supertype: base }),
        rule: "Mandatory",
        dataType: D.Number,
      });
    },
    "a member against its declaration": (m) => {
      const pump = m.objectType("PumpType");
      m.variable("Speed", { parent: pump, rule: "Mandatory", dataType: D.Float });
      return m.variable("Speed", { parent: m.object("Pump1", { type: pump }), dataType: D.Double });
    },
  },
});

describeRule("R098", {
  valid: {
    "one dimension for scalar or one": (m) =>
      variable(m, { type: m.variableType("A", { valueRank: -3 }), valueRank: 1 }),
    "three dimensions for one or more": (m) =>
      variable(m, { type: m.variableType("A", { valueRank: 0 }), valueRank: 3 }),
  },
  invalid: {
    "a scalar for one or more": (m) => variable(m, { type: m.variableType("A", { valueRank: 0 }) }),
    "two dimensions for scalar or one": (m) =>
      variable(m, { type: m.variableType("A", { valueRank: -3 }), valueRank: 2 }),
    "a rank below −3": (m) => variable(m, { valueRank: -4 }),
  },
});

describeRule("R099", {
  valid: {
    "no dimensions for an array": (m) => variable(m, { valueRank: 1 }),
    "an empty text for a scalar": (m) => variable(m, { arrayDimensions: "" }),
  },
  invalid: {
    "one entry for two dimensions": (m) => variable(m, { valueRank: 2, arrayDimensions: "0" }),
    "dimensions of a VariableType without fixed rank": (m) =>
      m.variableType("A", { valueRank: -2, arrayDimensions: "0" }),
    "warning: dimensions of a Variable with rank −3": (m) =>
      variable(m, { type: m.variableType("A", { valueRank: -3 }), valueRank: -3, arrayDimensions: "0" }),
  },
});

describeRule("R101", {
  valid: {
    "a ByteString as scalar": (m) => variable(m, { dataType: D.ByteString, value: scalar("ByteString", "AAEC") }),
    "an empty list for two dimensions": (m) => variable(m, { valueRank: 2, value: list("Double") }),
    "a list on scalar BaseDataType": (m) => variable(m, { dataType: D.BaseDataType, value: list("Double", 1) }),
    "a Matrix of two dimensions": (m) => variable(m, { valueRank: 2, value: matrix("Double", [1, 2], 1, 2) }),
    "a null value": (m) =>
      variable(m, {
        valueRank: 1,
        value: { xml: '<Double xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance" xsi:nil="true"/>' },
      }),
    "a scalar where either may be": (m) =>
      variable(m, { type: m.variableType("A", { valueRank: -3 }), valueRank: -3, value: scalar("Double", 1) }),
  },
  invalid: {
    "a list for a scalar": (m) => variable(m, { value: list("Double", 1) }),
    "a flat list for two dimensions": (m) => variable(m, { valueRank: 2, value: list("Double", 1, 2) }),
    "a Matrix with too few dimensions": (m) => variable(m, { valueRank: 3, value: matrix("Double", [1, 2], 1, 2) }),
    "a Matrix with an empty dimension": (m) => variable(m, { valueRank: 2, value: matrix("Double", [0, 2]) }),
  },
});

describeRule("R103", {
  valid: {
    "Int32 for an enumeration": (m) =>
      variable(m, { dataType: m.dataType("StateEnum", { supertype: D.Enumeration }), value: scalar("Int32", 1) }),
    "Double for Duration": (m) => variable(m, { dataType: standardKey(290), value: scalar("Double", 1) }),
    "any number for Number": (m) => variable(m, { dataType: D.Number, value: scalar("UInt16", 1) }),
    "a structure by its encoding": (m) => variable(m, { dataType: D.Range, value: range(0, 1) }),
    "a structure by its DataType": (m) =>
      variable(m, { dataType: D.Range, value: extensionObject("i=884", "<Range/>") }),
    "an own DataType of a model that is not loaded": (m) =>
      variable(m, { dataType: foreign, value: scalar("String", "x") }),
    infinity: (m) => variable(m, { value: scalar("Double", "-INF") }),
  },
  invalid: {
    "a text for an enumeration": (m) =>
      variable(m, { dataType: m.dataType("StateEnum", { supertype: D.Enumeration }), value: scalar("String", "Off") }),
    "Int32 for UInteger": (m) => variable(m, { dataType: D.UInteger, value: scalar("Int32", 1) }),
    "another structure": (m) => variable(m, { dataType: D.Range, value: CELSIUS }),
    "a number out of range": (m) => variable(m, { dataType: D.Byte, value: scalar("Byte", 256) }),
    "a decimal for an integer": (m) => variable(m, { dataType: D.Int32, value: scalar("Int32", "1.5") }),
    "a word for a Boolean": (m) => variable(m, { dataType: D.Boolean, value: scalar("Boolean", "yes") }),
    "a text in a list of numbers": (m) => variable(m, { valueRank: 1, value: list("Double", 1, "x") }),
  },
});

describeRule("R119", {
  valid: {
    "a VariableType, whose instances get it": (m) =>
      m.variableType("LevelType", { supertype: T.AnalogItemType, dataType: D.Number }),
    "AnalogUnitType, which needs none": (m) => variable(m, { type: T.AnalogUnitType }),
  },
  invalid: {
    "a range of another DataType": (m) =>
      m.property("0:EURange", { parent: variable(m, { type: T.AnalogItemType }), dataType: D.Double }),
    "a range named in another namespace": (m) => {
      const key = variable(m, { type: T.AnalogItemType });
      m.property("EURange", { parent: key, dataType: D.Range });
      return key;
    },
    "a copied child with a left-over rule": (m) => variable(m, { type: T.AnalogItemType, rule: "Mandatory" }),
    "hint: a declaration": (m) =>
      m.variable("Speed", { parent: m.objectType("PumpType"), type: T.AnalogItemType, rule: "Mandatory" }),
  },
});

describeRule("R120", {
  valid: { "AnalogItemType, where it is optional": (m) => variable(m, { type: T.AnalogItemType }) },
  invalid: {
    AnalogUnitRangeType: (m) => variable(m, { type: T.AnalogUnitRangeType }),
    "a unit of another DataType": (m) =>
      m.property("0:EngineeringUnits", { parent: variable(m, { type: T.AnalogUnitType }) }),
    "hint: a declaration": (m) =>
      m.variable("Speed", { parent: m.objectType("PumpType"), type: T.AnalogUnitType, rule: "Mandatory" }),
  },
});

describeRule("R123", {
  valid: {
    "a Structure of numbers": (m) =>
      m.property("0:EngineeringUnits", { parent: variable(m, { dataType: D.Range }), dataType: D.EUInformation }),
    "an array item": (m) =>
      m.property("0:EngineeringUnits", {
        parent: variable(m, { type: standardKey(12021), dataType: D.BaseDataType }),
        dataType: D.EUInformation,
      }),
  },
  invalid: {
    "a Boolean": (m) => {
      const key = variable(m, { dataType: D.Boolean });
      m.property("0:EngineeringUnits", { parent: key, dataType: D.EUInformation });
      return key;
    },
    "warning: BaseDataType": (m) => {
      const key = variable(m, { dataType: D.BaseDataType });
      m.property("0:EngineeringUnits", { parent: key, dataType: D.EUInformation });
      return key;
    },
  },
});

describeRule("R125", {
  valid: {
    "another system": (m) => unitProperty(m, { uri: "http://opcfoundation.org/UA/IOLink", unitId: 1001, symbol: "°C" }),
    "IEC 62720": (m) =>
      unitProperty(m, { uri: "http://www.opcfoundation.org/UA/units/cdd/IEC62720", unitId: 1, symbol: "°C" }),
    "nothing at all": (m) => unitProperty(m, { uri: "", unitId: 0 }),
  },
  invalid: {
    "a closing slash": (m) => unitProperty(m, { uri: `${UNECE_URI}/`, unitId: 4408652, symbol: "°C" }),
    "other letter case": (m) => unitProperty(m, { uri: UNECE_URI.toUpperCase(), unitId: 4408652, symbol: "°C" }),
    "no www": (m) => unitProperty(m, { uri: UNECE_URI.replace("www.", ""), unitId: 4408652, symbol: "°C" }),
    "warning: none beside a symbol": (m) => unitProperty(m, { uri: "", unitId: 0, symbol: "°C" }),
  },
});

describeRule("R126", {
  valid: {
    "P1, two characters": (m) => unitProperty(m, { unitId: 20529, symbol: "%" }),
    "4K, a digit first": (m) => unitProperty(m, { unitId: 13387, symbol: "mA" }),
    "a number of another system beside its URI": (m) =>
      unitProperty(m, { uri: "http://opcfoundation.org/UA/IOLink", unitId: 1001, symbol: "°C" }),
  },
  invalid: {
    zero: (m) => unitProperty(m, { unitId: 0, symbol: "°C" }),
    "small letters": (m) => unitProperty(m, { unitId: 0x63656c, symbol: "°C" }),
    "warning: not available": (m) => unitProperty(m, { unitId: -1, symbol: "°C" }),
  },
});
