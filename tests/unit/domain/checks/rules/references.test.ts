/** Conditions from OPC 10000-3, -5 and -6 v1.05.06; the clause of each stands in the rule. */
import { numericNodeId, standardKey, toNodeKey } from "~/domain/address-space/node-id";
import {
  StandardModellingRule,
  StandardReferenceType as R,
  StandardType as T,
} from "~/domain/address-space/standard-ids";
import { describeRule } from "../../../../support/describe-rule";

const HasArgumentDescription = standardKey(129);

describeRule("R024", {
  valid: {
    "a reference type of one's own": (m) =>
      m.reference(m.object("A"), m.referenceType("Feeds", { inverseName: "IsFedBy" }), m.object("B")),
  },
  invalid: {
    "an own abstract reference type": (m) => {
      const a = m.object("A");
      m.reference(a, m.referenceType("Feeds", { inverseName: "IsFedBy", isAbstract: true }), m.object("B"));
      return a;
    },
    "an ObjectType in place of a reference type": (m) => {
      const a = m.object("A");
      m.reference(a, T.FolderType, m.object("B"));
      return a;
    },
    "a missing type of a loaded namespace": (m) => {
      const a = m.object("A");
      m.reference(a, standardKey(4294967290), m.object("B"));
      return a;
    },
    "warning: a type of a namespace that is not loaded": (m) => {
      const a = m.object("A");
      m.reference(a, toNodeKey(numericNodeId("http://example.org/UA/Other/", 1)), m.object("B"));
      return a;
    },
  },
});

describeRule("R027", {
  valid: {
    "a node with two parents": (m) => {
      const root = m.object("Root");
      const left = m.object("Left", { parent: root });
      const right = m.object("Right", { parent: root });
      m.reference(right, R.HasComponent, m.object("Shared", { parent: left }));
    },
    "a loop of Organizes": (m) => {
      const a = m.object("A");
      const b = m.object("B", { parent: a, reference: R.Organizes });
      m.reference(b, R.Organizes, a);
    },
  },
  invalid: {
    "a node that is its own component": (m) => {
      const a = m.object("A");
      m.reference(a, R.HasComponent, a);
      return a;
    },
    "a type that is its own supertype over another": (m) => {
      const a = m.objectType("A");
      const b = m.objectType("B", { supertype: a });
      m.removeReferences(a, R.HasSubtype);
      m.reference(b, R.HasSubtype, a);
      return a;
    },
  },
});

describeRule("R029", {
  valid: {
    "all three classes": (m) => (
      m.variable("V", { parent: m.object("A") }),
      m.method("M", { parent: m.object("B") }),
      m.object("O", { parent: m.object("C") })
    ),
  },
  invalid: {
    "a View below a subtype of HasComponent": (m) => {
      const a = m.object("A");
      m.reference(a, R.HasOrderedComponent, m.view("Operation"));
      return a;
    },
    "one that both ends declare, once": (m) => {
      const a = m.object("A");
      const type = m.objectType("PumpType");
      m.reference(a, R.HasComponent, type);
      m.set(type, { references: [...m.get(type).references, { type: R.HasComponent, target: a, isForward: false }] });
      return a;
    },
  },
});

describeRule("R030", {
  valid: {
    "HasArgumentDescription from a Method": (m) =>
      m.variable("Speed", {
        parent: m.method("Start", { parent: m.object("Pump1") }),
        reference: HasArgumentDescription,
      }),
    "a DataVariable below a DataVariable": (m) =>
      m.variable("Raw", { parent: m.variable("Speed", { parent: m.object("Pump1") }) }),
  },
  invalid: { "a View as source": (m) => m.variable("Speed", { parent: m.view("Operation") }) },
});

describeRule("R031", {
  invalid: {
    "a Method below a Variable": (m) => m.method("Reset", { parent: m.variable("Counter", { parent: m.object("A") }) }),
    "an Object by HasAddIn below a VariableType": (m) =>
      m.object("Details", { parent: m.variableType("LevelType"), reference: R.HasAddIn, rule: "Optional" }),
  },
});

describeRule("R032", {
  invalid: { "a Method as Property": (m) => m.method("Reset", { parent: m.object("A"), reference: R.HasProperty }) },
});

describeRule("R033", {
  valid: {
    "a non-hierarchical reference from a Property": (m) =>
      m.reference(
        m.property("Label", { parent: m.object("A") }),
        m.referenceType("Explains", { inverseName: "IsExplainedBy" }),
        m.object("B"),
      ),
    "children of a DataVariable": (m) =>
      m.property("Label", { parent: m.variable("Speed", { parent: m.object("A") }) }),
  },
  invalid: {
    "Organizes from a Property": (m) => {
      const label = m.property("Label", { parent: m.object("A") });
      m.reference(label, R.Organizes, m.object("B"));
      return label;
    },
  },
});

describeRule("R035", {
  invalid: {
    "a subtype of BaseDataVariableType": (m) => m.property("Label", { parent: m.object("A"), type: T.AnalogUnitType }),
  },
});

describeRule("R036", {
  valid: { "a Property": (m) => m.property("Label", { parent: m.object("A") }) },
  invalid: {
    "PropertyType below a subtype of HasComponent": (m) =>
      m.variable("Label", { parent: m.object("A"), type: T.PropertyType, reference: R.HasOrderedComponent }),
  },
});

describeRule("R041", {
  invalid: {
    "an instance as subtype": (m) => {
      const type = m.objectType("PumpType");
      m.reference(type, R.HasSubtype, m.object("A"));
      return type;
    },
    "hint: a subtype declared at its own supertype only": (m) => {
      const base = m.objectType("PumpType");
      const sub = m.objectType("FastPumpType", { supertype: base });
      m.removeReferences(sub, R.HasSubtype);
      m.reference(base, R.HasSubtype, sub);
      return sub;
    },
  },
});

describeRule("R042", {
  valid: {
    "a supertype of a model that is not loaded": (m) =>
      m.objectType("A", { supertype: toNodeKey(numericNodeId("http://example.org/UA/Other/", 1)) }),
  },
  invalid: {
    "a ReferenceType with two supertypes": (m) => {
      const type = m.referenceType("Feeds", { inverseName: "IsFedBy" });
      m.set(type, {
        references: [...m.get(type).references, { type: R.HasSubtype, target: R.Organizes, isForward: false }],
      });
      return type;
    },
    "warning: an ObjectType with two supertypes": (m) => {
      const type = m.objectType("A");
      m.set(type, {
        references: [...m.get(type).references, { type: R.HasSubtype, target: T.FolderType, isForward: false }],
      });
      return type;
    },
  },
});

describeRule("R049", {
  valid: {
    "a type that is not loaded": (m) =>
      m.object("A", { type: toNodeKey(numericNodeId("http://example.org/UA/Other/", 1)) }),
  },
  invalid: {
    "two type definitions": (m) => {
      const a = m.object("A");
      m.reference(a, R.HasTypeDefinition, T.FolderType);
      return a;
    },
    "none at all": (m) => {
      const a = m.object("A");
      m.removeReferences(a, R.HasTypeDefinition);
      return a;
    },
    "one on a Method": (m) => {
      const method = m.method("Start", { parent: m.object("A") });
      m.reference(method, R.HasTypeDefinition, T.BaseObjectType);
      return method;
    },
  },
});

describeRule("R050", {
  valid: {
    "a rule of one's own": (m) => {
      const rule = m.object("OnlyInWinter", { type: T.ModellingRuleType });
      m.reference(m.variable("Heater", { parent: m.objectType("PumpType") }), R.HasModellingRule, rule);
    },
  },
  invalid: {
    "a rule on a type": (m) => {
      const type = m.objectType("PumpType");
      m.reference(type, R.HasModellingRule, StandardModellingRule.Mandatory);
      return type;
    },
    "an Object that is no modelling rule": (m) => {
      const speed = m.variable("Speed", { parent: m.objectType("PumpType") });
      m.reference(speed, R.HasModellingRule, m.object("A"));
      return speed;
    },
  },
});
