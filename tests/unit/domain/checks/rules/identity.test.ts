/** Conditions from OPC 10000-3 and -6 v1.05.06; the clause of each stands in the rule. */
import { numericNodeId, OPC_UA_NAMESPACE, standardKey, toNodeKey } from "~/domain/address-space/node-id";
import {
  StandardDataType as D,
  StandardReferenceType as R,
  StandardType as T,
} from "~/domain/address-space/standard-ids";
import { getPublishedLayer, getStandardLayer } from "../../../../support/published-layers";
import { describeRule } from "../../../../support/describe-rule";

describeRule("R001", {
  valid: {
    "zero in a namespace of one's own": (m) => m.objectType("PumpType", { nodeId: numericNodeId(m.uri, 0) }),
    "an empty text in a namespace of one's own": (m) =>
      m.objectType("PumpType", { nodeId: { namespaceUri: m.uri, type: "s", identifier: "" } }),
  },
  invalid: {
    "an empty text in namespace 0": (m) =>
      m.objectType("A", { nodeId: { namespaceUri: OPC_UA_NAMESPACE, type: "s", identifier: "" } }),
    "an all-zero GUID in namespace 0": (m) =>
      m.objectType("A", {
        nodeId: { namespaceUri: OPC_UA_NAMESPACE, type: "g", identifier: "00000000-0000-0000-0000-000000000000" },
      }),
    "empty bytes in namespace 0": (m) =>
      m.objectType("A", { nodeId: { namespaceUri: OPC_UA_NAMESPACE, type: "b", identifier: "" } }),
  },
});

describeRule("R002", {
  valid: {
    "one number in two namespaces": (m) => m.objectType("PumpType", { nodeId: numericNodeId(m.uri, 58) }),
    "a number and its text": (m) => {
      m.objectType("A", { nodeId: numericNodeId(m.uri, 7) });
      m.objectType("B", { nodeId: { namespaceUri: m.uri, type: "s", identifier: "7" } });
    },
  },
  invalid: {
    "a NodeId of a required model": (m) => {
      const key = m.objectType("PumpType");
      m.set(key, { nodeId: numericNodeId(OPC_UA_NAMESPACE, 58) });
      return key;
    },
  },
});

describeRule("R004", {
  valid: {
    "any namespace in a file without Models": (m) => {
      m.objectType("A", { nodeId: numericNodeId("http://example.org/UA/Other/", 1) });
      m.setHeader({ models: [] });
    },
  },
  invalid: {
    "a namespace that no row of Models has": (m) =>
      m.objectType("A", { nodeId: numericNodeId("http://example.org/UA/Other/", 1) }),
    "the own URI without its closing slash": (m) => m.objectType("A", { nodeId: numericNodeId(m.uri.slice(0, -1), 1) }),
  },
});

describeRule("R006", {
  valid: {
    "512 characters": (m) => m.objectType("x".repeat(512)),
    "letters of any script": (m) => m.objectType("ÖlTemperatur"),
  },
  invalid: {
    "513 characters": (m) => m.objectType("x".repeat(513)),
    "an empty name": (m) => m.objectType(""),
    "a C1 control character": (m) => m.objectType("Pump\u0085"),
  },
});

describeRule("R008", {
  valid: {
    "a name that namespace 0 has": (m) => m.objectType("FolderType"),
    "an instance named like a type": (m) => (m.objectType("Pump"), m.object("Pump")),
  },
  invalid: {
    "a type of namespace 0 borrowed by name": (m) => m.objectType("0:FolderType"),
  },
});

describeRule("R009", {
  valid: {
    "one node reached by two references": (m) => {
      const parent = m.objectType("PumpType");
      const speed = m.variable("Speed", { parent, rule: "Mandatory" });
      m.reference(parent, R.Organizes, speed);
    },
    "the same name in two namespaces": (m) => {
      const parent = m.objectType("PumpType");
      m.property("Label", { parent, rule: "Mandatory" });
      m.property("0:Label", { parent, rule: "Mandatory" });
    },
    "an override in a subtype": (m) => {
      const base = m.objectType("PumpType");
      m.variable("Speed", { parent: base, rule: "Optional" });
      m.variable("Speed", { parent: m.objectType("FastPumpType", { supertype: base }), rule: "Mandatory" });
    },
    "plain instances": (m) => {
      const parent = m.object("Pump1");
      m.variable("Speed", { parent });
      m.variable("Speed", { parent });
    },
  },
  invalid: {
    "a child without a rule beside one with": (m) => {
      const parent = m.objectType("PumpType");
      m.variable("Speed", { parent, rule: "Mandatory" });
      return m.variable("Speed", { parent });
    },
    "two InputArguments below a declared Method": (m) => {
      const parent = m.method("Start", { parent: m.objectType("PumpType"), rule: "Mandatory" });
      m.property("0:InputArguments", { parent, rule: "Mandatory" });
      return m.property("0:InputArguments", { parent, rule: "Mandatory" });
    },
  },
});

describeRule("R012", {
  valid: {
    "the same text where it means something else": (m) => m.property("InputArguments", { parent: m.object("Pump1") }),
    "an own name beside the standard one": (m) => {
      const parent = m.variable("Level", { parent: m.object("Tank1"), type: T.AnalogUnitType });
      m.property("0:EngineeringUnits", { parent, dataType: D.EUInformation });
      m.property("Note", { parent });
    },
  },
  invalid: {
    "InputArguments of a Method": (m) =>
      m.property("InputArguments", { parent: m.method("Start", { parent: m.object("Pump1") }) }),
    "EnumStrings of a DataType": (m) =>
      m.property("EnumStrings", { parent: m.dataType("StateEnum", { supertype: D.Enumeration }) }),
    "warning: a member of a declaration of a required model": (m) =>
      m.property("SerialNumber", {
        parent: m.object("Pump1", { type: toNodeKey(numericNodeId("http://opcfoundation.org/UA/DI/", 1002)) }),
      }),
  },
  required: [getStandardLayer(), getPublishedLayer("Opc.Ua.Di.NodeSet2.xml")],
});

describeRule("R016", {
  valid: { "512 characters": (m) => m.objectType("A", { set: { displayName: [{ text: "x".repeat(512) }] } }) },
  invalid: {
    "513 characters": (m) => m.objectType("A", { set: { displayName: [{ text: "x".repeat(513) }] } }),
    "warning: an empty text": (m) => m.objectType("A", { set: { displayName: [{ text: "" }] } }),
  },
});

describeRule("R023", {
  valid: {
    "a target in a namespace that is not loaded": (m) => {
      const a = m.object("A");
      m.reference(a, R.Organizes, toNodeKey(numericNodeId("http://example.org/UA/Other/", 1)));
    },
    "a target in another server": (m) =>
      m.set(m.object("A"), {
        references: [
          { type: R.HasComponent, target: standardKey(4294967290), isForward: true, serverUri: "urn:other" },
        ],
      }),
  },
  invalid: {
    "a missing supertype": (m) => m.objectType("A", { supertype: standardKey(4294967290) }),
    "a missing modelling rule": (m) => {
      const a = m.variable("Speed", { parent: m.objectType("PumpType") });
      m.reference(a, R.HasModellingRule, standardKey(4294967290));
      return a;
    },
    "warning: another missing target": (m) => {
      const a = m.object("A");
      m.reference(a, R.Organizes, standardKey(4294967290));
      return a;
    },
  },
});
