/** Names of the XML namespaces of NodeSet2 files and of their elements for nodes (OPC 10000-6 Annex F, §5.3). */
import type { NodeClass } from "../address-space/node";

export const NODESET_XML_NAMESPACE = "http://opcfoundation.org/UA/2011/03/UANodeSet.xsd";
export const TYPES_XML_NAMESPACE = "http://opcfoundation.org/UA/2008/02/Types.xsd";

export const NODE_ELEMENTS: ReadonlyMap<string, NodeClass> = new Map<string, NodeClass>([
  ["UAObject", "Object"],
  ["UAVariable", "Variable"],
  ["UAMethod", "Method"],
  ["UAView", "View"],
  ["UAObjectType", "ObjectType"],
  ["UAVariableType", "VariableType"],
  ["UADataType", "DataType"],
  ["UAReferenceType", "ReferenceType"],
]);
