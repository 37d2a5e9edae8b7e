/**
 * The attributes of NodeSet2 elements (UANodeSet.xsd): name in the file, field in the model, type. One table serves reader
 * and writer; its order is the order in which attributes are written, which is the order of most published files.
 */
import type { NodeClass } from "../address-space/node";

export type AttributeType =
  | "text"
  | "boolean"
  | "byte"
  | "uint16"
  | "uint32"
  | "int32"
  | "double"
  | "nodeId"
  | "arrayDimensions"
  | "releaseStatus"
  | "purpose";

export type AttributeSpec = { readonly name: string; readonly field: string; readonly type: AttributeType };

type NodeAttributeSpec = AttributeSpec & { readonly classes?: readonly NodeClass[] };

const INSTANCES: readonly NodeClass[] = ["Object", "Variable", "Method", "View"];
const TYPES: readonly NodeClass[] = ["ObjectType", "VariableType", "DataType", "ReferenceType"];
const WITH_VALUE: readonly NodeClass[] = ["Variable", "VariableType"];

/** Attributes of nodes but NodeId and BrowseName, which every node has. */
const nodeAttributes: readonly NodeAttributeSpec[] = [
  { name: "SymbolicName", field: "symbolicName", type: "text" },
  { name: "ReleaseStatus", field: "releaseStatus", type: "releaseStatus" },
  { name: "WriteMask", field: "writeMask", type: "uint32" },
  { name: "UserWriteMask", field: "userWriteMask", type: "uint32" },
  { name: "AccessRestrictions", field: "accessRestrictions", type: "uint16" },
  { name: "HasNoPermissions", field: "hasNoPermissions", type: "boolean" },
  { name: "ParentNodeId", field: "parent", type: "nodeId", classes: INSTANCES },
  { name: "DesignToolOnly", field: "designToolOnly", type: "boolean", classes: INSTANCES },
  { name: "IsAbstract", field: "isAbstract", type: "boolean", classes: TYPES },
  { name: "Symmetric", field: "symmetric", type: "boolean", classes: ["ReferenceType"] },
  { name: "Purpose", field: "purpose", type: "purpose", classes: ["DataType"] },
  { name: "DataType", field: "dataType", type: "nodeId", classes: WITH_VALUE },
  { name: "ValueRank", field: "valueRank", type: "int32", classes: WITH_VALUE },
  { name: "ArrayDimensions", field: "arrayDimensions", type: "arrayDimensions", classes: WITH_VALUE },
  { name: "AccessLevel", field: "accessLevel", type: "uint32", classes: ["Variable"] },
  { name: "UserAccessLevel", field: "userAccessLevel", type: "uint32", classes: ["Variable"] },
  { name: "MinimumSamplingInterval", field: "minimumSamplingInterval", type: "double", classes: ["Variable"] },
  { name: "Historizing", field: "historizing", type: "boolean", classes: ["Variable"] },
  { name: "ContainsNoLoops", field: "containsNoLoops", type: "boolean", classes: ["View"] },
  { name: "EventNotifier", field: "eventNotifier", type: "byte", classes: ["Object", "View"] },
  { name: "Executable", field: "executable", type: "boolean", classes: ["Method"] },
  { name: "UserExecutable", field: "userExecutable", type: "boolean", classes: ["Method"] },
  { name: "MethodDeclarationId", field: "methodDeclaration", type: "nodeId", classes: ["Method"] },
];

export type AttributeTable = ReadonlyMap<string, AttributeSpec>;

function toTable(specs: readonly AttributeSpec[]): AttributeTable {
  return new Map(specs.map((spec) => [spec.name, spec]));
}

function tableOf(nodeClass: NodeClass): AttributeTable {
  return toTable(nodeAttributes.filter((spec) => spec.classes === undefined || spec.classes.includes(nodeClass)));
}

export const NODE_ATTRIBUTES: Readonly<Record<NodeClass, AttributeTable>> = {
  Object: tableOf("Object"),
  Variable: tableOf("Variable"),
  Method: tableOf("Method"),
  View: tableOf("View"),
  ObjectType: tableOf("ObjectType"),
  VariableType: tableOf("VariableType"),
  DataType: tableOf("DataType"),
  ReferenceType: tableOf("ReferenceType"),
};

/** Attributes of a Field but Name. */
export const FIELD_ATTRIBUTES: AttributeTable = toTable([
  { name: "SymbolicName", field: "symbolicName", type: "text" },
  { name: "DataType", field: "dataType", type: "nodeId" },
  { name: "ValueRank", field: "valueRank", type: "int32" },
  { name: "ArrayDimensions", field: "arrayDimensions", type: "arrayDimensions" },
  { name: "MaxStringLength", field: "maxStringLength", type: "uint32" },
  { name: "Value", field: "value", type: "int32" },
  { name: "IsOptional", field: "isOptional", type: "boolean" },
  { name: "AllowSubTypes", field: "allowSubTypes", type: "boolean" },
]);

/** Attributes of a Definition but Name. */
export const DEFINITION_ATTRIBUTES: AttributeTable = toTable([
  { name: "SymbolicName", field: "symbolicName", type: "text" },
  { name: "BaseType", field: "baseType", type: "text" },
  { name: "IsUnion", field: "isUnion", type: "boolean" },
  { name: "IsOptionSet", field: "isOptionSet", type: "boolean" },
]);

/** Attributes of Model and RequiredModel but ModelUri. */
export const MODEL_ATTRIBUTES: AttributeTable = toTable([
  { name: "XmlSchemaUri", field: "xmlSchemaUri", type: "text" },
  { name: "Version", field: "version", type: "text" },
  { name: "PublicationDate", field: "publicationDate", type: "text" },
  { name: "ModelVersion", field: "modelVersion", type: "text" },
  { name: "AccessRestrictions", field: "accessRestrictions", type: "uint16" },
]);
