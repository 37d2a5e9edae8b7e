import { AddressSpace, buildLayer, type Layer } from "~/domain/address-space/address-space";
import type { DeclaredReference, Node } from "~/domain/address-space/node";
import { OPC_UA_NAMESPACE, numericNodeId, standardKey, toNodeKey } from "~/domain/address-space/node-id";

/**
 * A few nodes of namespace 0 for tests that need no more: `[id, class, name, supertype]`. Ids and supertypes are those of
 * Opc.Ua.NodeSet2.xml (1.05), which the conformance tests use whole.
 */
const TYPES: readonly (readonly [number, Node["nodeClass"], string, number?])[] = [
  [31, "ReferenceType", "References"],
  [32, "ReferenceType", "NonHierarchicalReferences", 31],
  [33, "ReferenceType", "HierarchicalReferences", 31],
  [34, "ReferenceType", "HasChild", 33],
  [35, "ReferenceType", "Organizes", 33],
  [37, "ReferenceType", "HasModellingRule", 32],
  [38, "ReferenceType", "HasEncoding", 32],
  [40, "ReferenceType", "HasTypeDefinition", 32],
  [41, "ReferenceType", "GeneratesEvent", 32],
  [44, "ReferenceType", "Aggregates", 34],
  [45, "ReferenceType", "HasSubtype", 34],
  [46, "ReferenceType", "HasProperty", 44],
  [47, "ReferenceType", "HasComponent", 44],
  [58, "ObjectType", "BaseObjectType"],
  [61, "ObjectType", "FolderType", 58],
  [62, "VariableType", "BaseVariableType"],
  [63, "VariableType", "BaseDataVariableType", 62],
  [68, "VariableType", "PropertyType", 62],
  [78, "Object", "Mandatory"],
  [80, "Object", "Optional"],
  [85, "Object", "Objects"],
  [24, "DataType", "BaseDataType"],
  [26, "DataType", "Number", 24],
  [11, "DataType", "Double", 26],
  [12, "DataType", "String", 24],
  [29, "DataType", "Enumeration", 24],
];

export function makeStandardNode(id: number, nodeClass: Node["nodeClass"], name: string, supertype?: number): Node {
  const references: DeclaredReference[] =
    supertype === undefined ? [] : [{ type: standardKey(45), target: standardKey(supertype), isForward: false }];
  return {
    key: standardKey(id),
    nodeId: numericNodeId(OPC_UA_NAMESPACE, id),
    nodeClass,
    order: id,
    browseName: { namespaceUri: OPC_UA_NAMESPACE, name },
    displayName: [{ text: name }],
    references,
  } as Node;
}

export const smallStandard: Layer = buildLayer(
  { namespaceUris: [], models: [{ modelUri: OPC_UA_NAMESPACE, version: "1.05", requiredModels: [] }] },
  TYPES.map((row) => makeStandardNode(...row)),
);

/** The namespace of test models. */
export const TEST_NAMESPACE = "http://example.test/UA/Model/";

/** A node of the test namespace; `overrides` holds what else the test needs. */
export function makeNode(id: number, nodeClass: Node["nodeClass"], overrides: Partial<Node> = {}): Node {
  const nodeId = numericNodeId(TEST_NAMESPACE, id);
  const name = `Node${id}`;
  return {
    key: toNodeKey(nodeId),
    nodeId,
    nodeClass,
    order: id,
    browseName: { namespaceUri: TEST_NAMESPACE, name },
    displayName: [{ text: name }],
    references: [],
    ...overrides,
  } as Node;
}

export function makeSpace(nodes: readonly Node[] = []): AddressSpace {
  const models = [
    {
      modelUri: TEST_NAMESPACE,
      version: "1.0.0",
      requiredModels: [{ modelUri: OPC_UA_NAMESPACE, requiredModels: [] }],
    },
  ];
  return AddressSpace.of([smallStandard], buildLayer({ namespaceUris: [TEST_NAMESPACE], models }, nodes));
}
