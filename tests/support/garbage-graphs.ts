/** Models broken in every way: dangling references, cycles, unknown types, null ids, values that are no XML. */
import fc from "fast-check";
import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { DeclaredReference, Node, NodeClass } from "~/domain/address-space/node";
import {
  numericNodeId,
  OPC_UA_NAMESPACE,
  standardKey,
  toNodeKey,
  type NodeId,
  type NodeKey,
} from "~/domain/address-space/node-id";

const URI = "http://example.org/UA/Garbage/";
const CLASSES: readonly NodeClass[] = [
  "Object",
  "Variable",
  "Method",
  "View",
  "ObjectType",
  "VariableType",
  "DataType",
  "ReferenceType",
];
const OWN = 14;

/** Nodes of namespace 0 that rules ask for, and some that do not exist. */
const STANDARD = [
  0, 1, 11, 12, 21, 22, 23, 24, 26, 27, 28, 29, 31, 32, 33, 34, 35, 36, 37, 38, 39, 40, 41, 44, 45, 46, 47, 48, 49, 58,
  61, 62, 63, 68, 76, 77, 78, 80, 83, 85, 87, 117, 129, 131, 290, 296, 297, 884, 887, 888, 2041, 2253, 2299, 2307, 2310,
  2365, 2368, 2373, 2376, 2771, 2782, 3065, 7594, 9004, 9006, 11238, 11508, 11510, 11616, 11715, 12021, 12029, 12755,
  12756, 15318, 17497, 17570, 17597, 17602, 17603, 17604, 23455, 23469, 23562, 4294967290,
].map(standardKey);

const NAMES = [
  "A",
  "B",
  "<C>",
  "Speed",
  "speed",
  "",
  "InputArguments",
  "OutputArguments",
  "EURange",
  "EngineeringUnits",
  "InstrumentRange",
  "EnumStrings",
  "EnumValues",
  "OptionSetValues",
  "NamespaceUri",
  "NamespaceVersion",
  "NamespacePublicationDate",
  "DefaultInstanceBrowseName",
  "TrueState",
  "FalseState",
  "ValuePrecision",
  "StateNumber",
  "TransitionNumber",
  "Default Binary",
  "Default XML",
  "Id",
  "CurrentState",
  "MaxStringLength",
  "a\nb",
  "3:x",
  "Ünit °C",
];

const VALUES = [
  "",
  "<",
  "<Double>1</Double>",
  "<Double>x</Double>",
  "<String/><String/>",
  "<ListOfDouble><Double>1</Double></ListOfDouble>",
  "<ListOfString/>",
  "<Matrix><Dimensions><Int32>x</Int32></Dimensions></Matrix>",
  "<ExtensionObject/>",
  "<ListOfExtensionObject><ExtensionObject/></ListOfExtensionObject>",
  "<ExtensionObject><TypeId><Identifier>i=888</Identifier></TypeId><Body><EUInformation><UnitId>x</UnitId></EUInformation></Body></ExtensionObject>",
  "<ExtensionObject><TypeId><Identifier>nonsense</Identifier></TypeId><Body><Range><Low>9</Low><High>1</High></Range></Body></ExtensionObject>",
  "<ListOfExtensionObject><ExtensionObject><TypeId><Identifier>i=297</Identifier></TypeId><Body><Argument><Name>a</Name><DataType><Identifier>i=999999</Identifier></DataType></Argument></Body></ExtensionObject></ListOfExtensionObject>",
  "<ListOfExtensionObject><ExtensionObject><TypeId><Identifier>i=7616</Identifier></TypeId><Body><EnumValueType><Value>999999999999999999999</Value></EnumValueType></Body></ExtensionObject></ListOfExtensionObject>",
  "<LocalizedText><Text>t</Text></LocalizedText>",
  "<ListOfLocalizedText><LocalizedText/></ListOfLocalizedText>",
  "<QualifiedName><Name>x</Name></QualifiedName>",
  "<Int32>99999999999999999999</Int32>",
  "<NodeId><Identifier>String</Identifier></NodeId>",
  "<p:Double>1</p:Double>",
];

function ownKey(index: number): NodeKey {
  return toNodeKey(numericNodeId(URI, index));
}

const anyKey: fc.Arbitrary<NodeKey> = fc.oneof(
  { weight: 4, arbitrary: fc.nat(OWN + 2).map(ownKey) },
  { weight: 4, arbitrary: fc.constantFrom(...STANDARD) },
  {
    weight: 1,
    arbitrary: fc.constantFrom("nonsense" as NodeKey, "" as NodeKey, "nsu=http://unknown.example/;i=1" as NodeKey),
  },
);

const reference: fc.Arbitrary<DeclaredReference> = fc.record({ type: anyKey, target: anyKey, isForward: fc.boolean() });

/** References of the types that matter most, so that walks of rules get somewhere. */
const likelyReference: fc.Arbitrary<DeclaredReference> = fc.record({
  type: fc.constantFrom(
    ...[35, 37, 38, 40, 41, 45, 45, 46, 46, 47, 47, 47, 51, 52, 9006, 17603, 17604].map(standardKey),
  ),
  target: anyKey,
  isForward: fc.boolean(),
});

const rank = fc.constantFrom(-9, -3, -2, -1, 0, 1, 2, 1.5, Number.NaN);

const optional = fc.record(
  {
    dataType: anyKey,
    valueRank: rank,
    arrayDimensions: fc.constantFrom("", "0", "0,0", "x", "-1", "3"),
    value: fc.record({ xml: fc.constantFrom(...VALUES) }),
    accessLevel: fc.constantFrom(0, 1, 3, 5, 17, 128, 0xffffffff),
    userAccessLevel: fc.constantFrom(0, 3),
    historizing: fc.boolean(),
    minimumSamplingInterval: fc.constantFrom(-5, -1, 0, Number.NaN),
    eventNotifier: fc.constantFrom(0, 1, 2, 255),
    isAbstract: fc.boolean(),
    symmetric: fc.boolean(),
    inverseName: fc.constantFrom([], [{ text: "" }], [{ text: "IsX" }]),
    parent: anyKey,
    methodDeclaration: anyKey,
    designToolOnly: fc.boolean(),
    symbolicName: fc.constantFrom("", "a b", "Ok"),
    writeMask: fc.constantFrom(0, 0xffffffff),
    accessRestrictions: fc.constantFrom(0, 255),
    releaseStatus: fc.constantFrom("Draft" as const, "Deprecated" as const),
    purpose: fc.constantFrom("Normal" as const, "ServicesOnly" as const),
    rolePermissions: fc.array(fc.record({ role: anyKey, permissions: fc.constantFrom(0, 0xffffffff) }), {
      maxLength: 2,
    }),
    description: fc.constantFrom(
      [],
      [
        { text: "x", locale: "en" },
        { text: "y", locale: "en" },
      ],
      [{ text: "", locale: "e_n" }],
    ),
    executable: fc.boolean(),
    userExecutable: fc.boolean(),
    translations: fc.constantFrom([], [{ xml: "<Text/>" }]),
    definition: fc.record(
      {
        name: fc.constantFrom({ namespaceUri: URI, name: "A" }),
        isUnion: fc.boolean(),
        isOptionSet: fc.boolean(),
        fields: fc.array(
          fc.record(
            {
              name: fc.constantFrom("", "a", "A", "b c"),
              dataType: anyKey,
              valueRank: rank,
              value: fc.constantFrom(0, 1, -1, 99, 2 ** 40),
              isOptional: fc.boolean(),
              allowSubTypes: fc.boolean(),
              maxStringLength: fc.constantFrom(0, 5),
              arrayDimensions: fc.constantFrom("", "0", "x"),
            },
            { requiredKeys: ["name"] },
          ),
          { maxLength: 4 },
        ),
      },
      { requiredKeys: ["name", "fields"] },
    ),
  },
  { requiredKeys: [] },
);

function nodeAt(index: number): fc.Arbitrary<Node> {
  return fc
    .record({
      nodeClass: fc.constantFrom(...CLASSES),
      name: fc.constantFrom(...NAMES),
      namespaceUri: fc.constantFrom(URI, OPC_UA_NAMESPACE, "http://unknown.example/"),
      nodeId: fc.constantFrom<NodeId>(
        numericNodeId(URI, index),
        numericNodeId(URI, index),
        numericNodeId(URI, 1),
        numericNodeId(OPC_UA_NAMESPACE, 0),
      ),
      displayName: fc.constantFrom([], [{ text: "x" }], [{ text: "" }, { text: "x".repeat(600) }]),
      references: fc.array(fc.oneof(reference, likelyReference), { maxLength: 7 }),
      attributes: optional,
    })
    .map(({ nodeClass, name, namespaceUri, nodeId, displayName, references, attributes }) => {
      const node = {
        key: ownKey(index),
        nodeId,
        nodeClass,
        order: index,
        browseName: { namespaceUri, name },
        displayName,
        references,
        ...attributes,
      };
      return node as unknown as Node;
    });
}

const header = fc.record({
  namespaceUris: fc.constantFrom([], [URI], [URI, URI, "http://unknown.example/"]),
  models: fc.array(
    fc.record(
      {
        modelUri: fc.constantFrom(URI, "", OPC_UA_NAMESPACE),
        version: fc.constantFrom("", "1.0"),
        modelVersion: fc.constantFrom("", "1.0", "1.0.0"),
        publicationDate: fc.constantFrom("", "2026-05-01T00:00:00Z", "2026-05-01T00:00:00", "x"),
        requiredModels: fc.constantFrom(
          [],
          [{ modelUri: URI, requiredModels: [] }],
          [{ modelUri: OPC_UA_NAMESPACE, modelVersion: "9.9.9", requiredModels: [] }],
        ),
      },
      { requiredKeys: ["modelUri", "requiredModels"] },
    ),
    { maxLength: 2 },
  ),
});

export const garbageNodes: fc.Arbitrary<Node[]> = fc.tuple(...Array.from({ length: OWN }, (_, i) => nodeAt(i)));

/** One garbage node, to put in the place of another. */
export const garbageNode: fc.Arbitrary<Node> = fc.nat(OWN - 1).chain(nodeAt);

export function garbageSpace(required: readonly Layer[]): fc.Arbitrary<AddressSpace> {
  return fc
    .record({ header, nodes: garbageNodes })
    .map(({ header: head, nodes }) => AddressSpace.of(required, buildLayer(head, nodes)));
}
