import type { AddressSpace } from "../address-space/address-space";
import { findProperty } from "../address-space/browse";
import { getDataType, type Node, type VariableNode, type XmlText } from "../address-space/node";
import { StandardDataType } from "../address-space/standard-ids";
import { isSubtypeOf } from "../address-space/type-hierarchy";

const ENUM_VALUE = /<(?:[\w.-]+:)?EnumValueType[\s>][\s\S]*?<(?:[\w.-]+:)?Value>\s*(-?\d+)\s*</g;
const LOCALIZED_TEXT = /<(?:[\w.-]+:)?LocalizedText(?:\s[^>]*)?\/?>/g;

/**
 * The numbers that a stepping Variable may show: EnumValues or EnumStrings at the Variable (OPC 10000-8 §5.3.3), else the
 * definition of its enumeration (OPC 10000-3 §8.14, §8.40), else the Property of the DataType. Empty when it has no states.
 */
export function listStates(space: AddressSpace, node: VariableNode): number[] {
  const atVariable = statesFromProperties(space, node);
  if (atVariable.length > 0) return atVariable;
  const dataType = getDataType(node);
  if (!isSubtypeOf(space, dataType, StandardDataType.Enumeration)) return [];
  const type = space.getNode(dataType);
  if (type?.nodeClass !== "DataType") return [];
  const defined = (type.definition?.fields ?? []).flatMap((field) => (field.value === undefined ? [] : [field.value]));
  return defined.length > 0 ? defined : statesFromProperties(space, type);
}

function statesFromProperties(space: AddressSpace, node: Node): number[] {
  const values = getValue(findProperty(space, node.key, "EnumValues"));
  if (values) return [...values.xml.matchAll(ENUM_VALUE)].map((match) => Number(match[1]));
  const strings = getValue(findProperty(space, node.key, "EnumStrings"));
  return strings ? [...strings.xml.matchAll(LOCALIZED_TEXT)].map((_, index) => index) : [];
}

function getValue(node: Node | undefined): XmlText | undefined {
  return node?.nodeClass === "Variable" ? node.value : undefined;
}
