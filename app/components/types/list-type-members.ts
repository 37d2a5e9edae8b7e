/** What a type brings: its own members and those that it inherits, as rows. Pure. */
import {
  formatDataType,
  findRuleName,
  getCardinality,
  getTypeDefinitionName,
  isProperty,
  listInheritedMembers,
} from "~/components/model/member-facts";
import type { GlyphKind } from "~/components/notation/node-class-glyph";
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDisplayName, listMembers } from "~/domain/address-space/browse";
import type { Node } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { findText } from "~/domain/address-space/qualified-name";

export type TypeMemberRow = {
  readonly key: NodeKey;
  readonly glyph: GlyphKind;
  readonly name: string;
  readonly typeName: string;
  readonly dataType: string;
  readonly cardinality: string;
  readonly description: string;
  /** The type that declares it, when that is another one. */
  readonly origin: string | undefined;
};

export function listTypeMembers(space: AddressSpace, type: NodeKey): TypeMemberRow[] {
  const own = listMembers(space, type).map((node) => toRow(space, node, undefined));
  const inherited = listInheritedMembers(space, type).map(({ node, origin }) => toRow(space, node, origin));
  return [...own, ...inherited];
}

function toRow(space: AddressSpace, node: Node, origin: NodeKey | undefined): TypeMemberRow {
  const declaring = origin === undefined ? undefined : space.getNode(origin);
  return {
    key: node.key,
    glyph: isProperty(space, node) ? "Property" : node.nodeClass,
    name: getDisplayName(node),
    typeName: getTypeDefinitionName(space, node.key),
    dataType: formatDataType(space, node),
    cardinality: getCardinality(findRuleName(space, node.key)),
    description: findText(node.description ?? []) ?? "",
    origin: declaring ? getDisplayName(declaring) : undefined,
  };
}
