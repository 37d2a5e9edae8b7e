/** Makes the Property that goes with an enumeration's fields: EnumStrings for 0 … n−1, else EnumValues. */
import type { AddressSpace } from "../address-space/address-space";
import { findProperty } from "../address-space/browse";
import type { DataTypeNode, VariableNode } from "../address-space/node";
import { OPC_UA_NAMESPACE, toNodeKey } from "../address-space/node-id";
import { StandardDataType as D, StandardReferenceType as R, StandardType as T } from "../address-space/standard-ids";
import { ok, type Result } from "../core/result";
import type { NodeIdAllocator } from "../editing/allocate-node-id";
import type { Operation } from "../editing/operation";
import { escapeText } from "../nodeset/xml/escape";
import { fieldText, valueOf } from "./enumerations";
import { enumValues, localizedTexts } from "./example-values";
import type { Finding } from "./finding";
import { findSubject, notPossible } from "./fixes";
import type { Fix } from "./rule";

export const enumerationPropertyFix: Fix = {
  label: "Make EnumStrings or EnumValues anew from the fields",
  apply(space, finding, ids) {
    const node = findSubject(space, finding);
    if (node?.nodeClass !== "DataType" || !node.definition || node.definition.fields.length === 0)
      return notPossible(finding);
    return makeOperations(space, node, finding, ids);
  },
};

function makeOperations(
  space: AddressSpace,
  node: DataTypeNode,
  finding: Finding,
  ids: NodeIdAllocator,
): Result<readonly Operation[]> {
  const fields = [...(node.definition?.fields ?? [])].sort((a, b) => valueOf(a) - valueOf(b));
  const isZeroBased = fields.every((f, i) => valueOf(f) === i);
  const [wanted, other] = isZeroBased ? ["EnumStrings", "EnumValues"] : ["EnumValues", "EnumStrings"];
  const value = isZeroBased
    ? localizedTexts(...fields.map((f) => escapeText(fieldText(f))))
    : enumValues(...fields.map((f) => [valueOf(f), escapeText(fieldText(f))] as const));
  const existing = findProperty(space, node.key, wanted);
  const surplus = findProperty(space, node.key, other);
  if ((existing && !space.isOwn(existing.key)) || (surplus && !space.isOwn(surplus.key))) return notPossible(finding);
  const operations: Operation[] = surplus ? [{ kind: "removeNode", key: surplus.key }] : [];
  if (existing) return ok([...operations, { kind: "setAttribute", key: existing.key, attribute: "value", value }]);
  const allocated = ids.allocate("Variable");
  if (!allocated.ok) return allocated;
  const property: VariableNode = {
    key: toNodeKey(allocated.value),
    nodeId: allocated.value,
    nodeClass: "Variable",
    order: space.own.nextOrder,
    browseName: { namespaceUri: OPC_UA_NAMESPACE, name: wanted },
    displayName: [{ text: wanted }],
    references: [
      { type: R.HasTypeDefinition, target: T.PropertyType, isForward: true },
      { type: R.HasProperty, target: node.key, isForward: false },
    ],
    parent: node.key,
    dataType: isZeroBased ? D.LocalizedText : D.EnumValueType,
    valueRank: 1,
    arrayDimensions: "0",
    value,
  };
  return ok([...operations, { kind: "addNode", node: property }]);
}
