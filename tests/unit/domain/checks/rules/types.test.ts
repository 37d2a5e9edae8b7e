/** Conditions from OPC 10000-3 and -6 v1.05.06; the clause of each stands in the rule. */
import { standardKey } from "~/domain/address-space/node-id";
import {
  StandardDataType as D,
  StandardReferenceType as R,
  StandardType as T,
} from "~/domain/address-space/standard-ids";
import type { ExampleModel, NodeKey } from "../../../../support/model-builder";
import { describeRule } from "../../../../support/describe-rule";

const StateType = standardKey(2307);

function ratedInterface(m: ExampleModel): NodeKey {
  const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
  const details = m.object("Rating", { parent: face, rule: "Optional" });
  m.variable("Power", { parent: details, rule: "Mandatory" });
  return face;
}

describeRule("R066", {
  valid: {
    "a declaration of an abstract type": (m) =>
      m.object("Motor", {
        parent: m.objectType("PumpType"),
        type: m.objectType("MotorType", { isAbstract: true }),
        rule: "Mandatory",
      }),
  },
  invalid: {
    "an instance with a left-over rule below an instance": (m) =>
      m.object("Motor", {
        parent: m.object("Pump1"),
        type: m.objectType("MotorType", { isAbstract: true }),
        rule: "Mandatory",
      }),
    "a Variable of an abstract VariableType": (m) =>
      m.variable("Level", { parent: m.object("Tank1"), type: m.variableType("LevelType", { isAbstract: true }) }),
    "hint: a detached placeholder": (m) => {
      const key = m.object("<Motor>", {
        type: m.objectType("MotorType", { isAbstract: true }),
        rule: "OptionalPlaceholder",
      });
      m.removeReferences(key, R.Organizes);
      return key;
    },
  },
});

describeRule("R069", {
  valid: {
    "a missing member below an absent optional one": (m) =>
      m.reference(m.object("Pump1"), R.HasInterface, ratedInterface(m)),
    "a placeholder that applies the Interface": (m) => {
      const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
      m.variable("Power", { parent: face, rule: "Mandatory" });
      m.reference(
        m.object("<Pump>", { parent: m.objectType("PlantType"), rule: "OptionalPlaceholder" }),
        R.HasInterface,
        face,
      );
    },
    "a member inherited from the supertype": (m) => {
      const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
      m.variable("Power", { parent: face, rule: "Mandatory" });
      const base = m.objectType("PumpType");
      m.variable("Power", { parent: base, rule: "Mandatory" });
      m.reference(m.objectType("FastPumpType", { supertype: base }), R.HasInterface, face);
    },
  },
  invalid: {
    "a nested member below a present optional one": (m) => {
      const pump = m.object("Pump1");
      m.object("Rating", { parent: pump });
      m.reference(pump, R.HasInterface, ratedInterface(m));
      return pump;
    },
    "an Optional member where Mandatory is asked for": (m) => {
      const face = m.objectType("IRatedType", { supertype: T.BaseInterfaceType, isAbstract: true });
      m.variable("Power", { parent: face, rule: "Mandatory" });
      const pump = m.objectType("PumpType");
      m.variable("Power", { parent: pump, rule: "Optional" });
      m.reference(pump, R.HasInterface, face);
      return pump;
    },
  },
});

describeRule("R075", {
  valid: {
    "a State": (m) =>
      m.object("Idle", {
        parent: m.objectType("PumpStateMachineType", { supertype: standardKey(2771) }),
        type: StateType,
      }),
    DefaultInstanceBrowseName: (m) =>
      m.property("0:DefaultInstanceBrowseName", { parent: m.objectType("PumpType"), dataType: D.QualifiedName }),
    "a Property of a DataType": (m) =>
      m.property("0:EnumStrings", { parent: m.dataType("StateEnum", { supertype: D.Enumeration }) }),
    "a child of an instance": (m) => m.variable("Speed", { parent: m.object("Pump1") }),
  },
  invalid: {
    "a child of a declaration": (m) =>
      m.variable("Speed", { parent: m.object("Drive", { parent: m.objectType("PumpType"), rule: "Mandatory" }) }),
  },
});

describeRule("R080", {
  valid: {
    "a Method that fills a placeholder": (m) => {
      const base = m.objectType("PumpType");
      m.method("Calibrate", { parent: base, rule: "OptionalPlaceholder" });
      m.method("Calibrate", { parent: m.objectType("FastPumpType", { supertype: base }), rule: "Optional" });
    },
  },
  invalid: {
    "a nested declaration against the member's own type": (m) => {
      const drive = m.objectType("DriveType");
      m.variable("Speed", { parent: drive, rule: "Mandatory" });
      return m.variable("Speed", {
        parent: m.object("Drive", { parent: m.objectType("PumpType"), type: drive, rule: "Mandatory" }),
        rule: "Optional",
      });
    },
    "warning: an optional placeholder made mandatory": (m) => {
      const base = m.objectType("PlantType");
      m.object("<Pump>", { parent: base, rule: "OptionalPlaceholder" });
      return m.object("<Pump>", {
        parent: m.objectType("BigPlantType", { supertype: base }),
        rule: "MandatoryPlaceholder",
      });
    },
  },
});

describeRule("R086", {
  valid: {
    "nothing below an absent optional member": (m) => {
      const pump = m.objectType("PumpType");
      m.variable("Speed", { parent: m.object("Drive", { parent: pump, rule: "Optional" }), rule: "Mandatory" });
      m.object("Pump1", { type: pump });
    },
    "nothing for placeholders": (m) => {
      const plant = m.objectType("PlantType");
      m.variable("Speed", {
        parent: m.object("<Pump>", { parent: plant, rule: "MandatoryPlaceholder" }),
        rule: "Mandatory",
      });
      m.object("Plant1", { type: plant });
    },
    "the declaration node itself as the instance's Method": (m) => {
      const pump = m.objectType("PumpType");
      const start = m.method("Start", { parent: pump, rule: "Mandatory" });
      m.reference(m.object("Pump1", { type: pump }), R.HasComponent, start);
    },
  },
  invalid: {
    "a member of the supertype": (m) => {
      const base = m.objectType("PumpType");
      m.variable("Speed", { parent: base, rule: "Mandatory" });
      return m.object("Pump1", { type: m.objectType("FastPumpType", { supertype: base }) });
    },
    "a nested member, at its parent": (m) => {
      const pump = m.objectType("PumpType");
      m.variable("Speed", { parent: m.object("Drive", { parent: pump, rule: "Optional" }), rule: "Mandatory" });
      return m.object("Drive", { parent: m.object("Pump1", { type: pump }) });
    },
    "a member of the right text in another namespace": (m) => {
      const pump = m.objectType("PumpType");
      m.property("0:Label", { parent: pump, rule: "Mandatory" });
      const pump1 = m.object("Pump1", { type: pump });
      m.property("Label", { parent: pump1 });
      return pump1;
    },
    "hint: a declaration that leaves a nested member out": (m) => {
      const drive = m.objectType("DriveType");
      m.variable("Speed", { parent: drive, rule: "Mandatory" });
      return m.object("Drive", { parent: m.objectType("PumpType"), type: drive, rule: "Mandatory" });
    },
  },
});

describeRule("R090", {
  valid: {
    "a subtype of the declared type": (m) => {
      const pump = m.objectType("PumpType");
      m.variable("Speed", { parent: pump, rule: "Mandatory" });
      m.variable("Speed", { parent: m.object("Pump1", { type: pump }), type: T.AnalogUnitType });
    },
    "two of one name where one fits": (m) => {
      const pump = m.objectType("PumpType");
      m.variable("Speed", { parent: pump, rule: "Mandatory" });
      const parent = m.object("Pump1", { type: pump });
      m.object("Speed", { parent });
      m.variable("Speed", { parent });
    },
    "a node named like a placeholder": (m) => {
      const plant = m.objectType("PlantType");
      m.object("<Pump>", { parent: plant, rule: "OptionalPlaceholder" });
      m.variable("<Pump>", { parent: m.object("Plant1", { type: plant }) });
    },
  },
  invalid: {
    "an unrelated type": (m) => {
      const pump = m.objectType("PumpType");
      m.variable("Speed", { parent: pump, rule: "Mandatory", type: T.AnalogUnitType });
      return m.variable("Speed", { parent: m.object("Pump1", { type: pump }) });
    },
  },
});
