/** What kind of DataType a node is, as people speak of it. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import type { DataTypeField, DataTypeNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { StandardDataType } from "~/domain/address-space/standard-ids";
import { listSupertypes } from "~/domain/address-space/type-hierarchy";

export type DataTypeKind = "structure" | "union" | "option set" | "enumeration" | "simple";

export function getDataTypeKind(space: AddressSpace, node: DataTypeNode): DataTypeKind {
  const chain = [node.key, ...listSupertypes(space, node.key)];
  if (node.definition?.isOptionSet === true || chain.includes(StandardDataType.OptionSet)) return "option set";
  if (node.definition?.isUnion === true || chain.includes(StandardDataType.Union)) return "union";
  if (chain.includes(StandardDataType.Structure)) return "structure";
  return chain.includes(StandardDataType.Enumeration) ? "enumeration" : "simple";
}

/** Below which DataType another base of the same kind is searched. */
export function getKindRoot(space: AddressSpace, node: DataTypeNode): NodeKey {
  const chain = [node.key, ...listSupertypes(space, node.key)];
  const roots = [
    StandardDataType.Union,
    StandardDataType.OptionSet,
    StandardDataType.Structure,
    StandardDataType.Enumeration,
  ];
  return roots.find((root) => chain.includes(root)) ?? StandardDataType.BaseDataType;
}

export type InheritedField = { readonly field: DataTypeField; readonly origin: NodeKey };

/** Fields of the supertypes, topmost first. */
export function listInheritedFields(space: AddressSpace, key: NodeKey): InheritedField[] {
  return listSupertypes(space, key)
    .reverse()
    .flatMap((origin) => {
      const node = space.getNode(origin);
      const fields = node?.nodeClass === "DataType" ? (node.definition?.fields ?? []) : [];
      return fields.map((field) => ({ field, origin }));
    });
}
