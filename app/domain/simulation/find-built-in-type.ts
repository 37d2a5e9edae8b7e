import type { AddressSpace } from "../address-space/address-space";
import type { NodeKey } from "../address-space/node-id";
import { StandardDataType as T } from "../address-space/standard-ids";
import { listSupertypes } from "../address-space/type-hierarchy";
import type { BuiltInType } from "./motion";

/** Concrete built-in types by DataType; abstract number types get a concrete one that a client can read without surprise. */
const BUILT_IN: ReadonlyMap<NodeKey, BuiltInType> = new Map<NodeKey, BuiltInType>([
  [T.Boolean, "Boolean"],
  [T.SByte, "SByte"],
  [T.Byte, "Byte"],
  [T.Int16, "Int16"],
  [T.UInt16, "UInt16"],
  [T.Int32, "Int32"],
  [T.UInt32, "UInt32"],
  [T.Int64, "Int64"],
  [T.UInt64, "UInt64"],
  [T.Float, "Float"],
  [T.Double, "Double"],
  [T.String, "String"],
  [T.DateTime, "DateTime"],
  [T.Guid, "Guid"],
  [T.ByteString, "ByteString"],
  [T.XmlElement, "XmlElement"],
  [T.NodeId, "NodeId"],
  [T.ExpandedNodeId, "ExpandedNodeId"],
  [T.StatusCode, "StatusCode"],
  [T.QualifiedName, "QualifiedName"],
  [T.LocalizedText, "LocalizedText"],
  [T.Structure, "ExtensionObject"],
  [T.DataValue, "DataValue"],
  [T.DiagnosticInfo, "DiagnosticInfo"],
  [T.Enumeration, "Int32"],
  [T.UInteger, "UInt32"],
  [T.Integer, "Int32"],
  [T.Number, "Double"],
  [T.BaseDataType, "Variant"],
]);

/**
 * The built-in type that values of a DataType are encoded as: the nearest one upwards (OPC 10000-3 §8.2 ff., OPC 10000-6
 * §5.1.2; enumerations as Int32, §5.2.4). "Variant" when nothing is known, so that no wrong type is claimed.
 */
export function findBuiltInType(space: AddressSpace, dataType: NodeKey): BuiltInType {
  for (const at of [dataType, ...listSupertypes(space, dataType)]) {
    const found = BUILT_IN.get(at);
    if (found) return found;
  }
  return "Variant";
}
