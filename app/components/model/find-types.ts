/** Searching types over all loaded models. Pure. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { getDisplayName } from "~/domain/address-space/browse";
import type { Node, TypeNode } from "~/domain/address-space/node";
import type { NodeKey } from "~/domain/address-space/node-id";
import { findText } from "~/domain/address-space/qualified-name";
import { isSubtypeOf } from "~/domain/address-space/type-hierarchy";
import { getNamespaceLabel } from "./namespace-label";
import { rankText } from "../palette/rank-entries";

export type TypeKind = TypeNode["nodeClass"];

export type TypeHit = {
  readonly key: NodeKey;
  readonly name: string;
  readonly kind: TypeKind;
  readonly isAbstract: boolean;
  readonly namespaceLabel: string;
  /** The description that its model gives. */
  readonly description: string;
};

export type TypeQuestion = { readonly kind: TypeKind; readonly concreteOnly?: boolean; readonly below?: NodeKey };

const listsByLayer = new WeakMap<object, readonly TypeNode[]>();

/** All types of the loaded models; published layers never change, so their lists are kept. */
function listTypes(space: AddressSpace): TypeNode[] {
  return space.layers.flatMap((layer) => {
    let types = listsByLayer.get(layer);
    if (!types) {
      types = [...layer.nodes.values()].filter((node): node is TypeNode => node.nodeClass.endsWith("Type"));
      listsByLayer.set(layer, types);
    }
    return types;
  });
}

/** Best answers first: own types before those of required models, nearer models before namespace 0, short names before long ones. */
export function findTypes(space: AddressSpace, question: TypeQuestion, query: string, limit: number): TypeHit[] {
  const { kind, concreteOnly, below } = question;
  const text = query.trim();
  const found: { node: TypeNode; score: number }[] = [];
  for (const node of listTypes(space)) {
    if (node.nodeClass !== kind || (concreteOnly && node.isAbstract)) continue;
    const rank = Math.max(rankText(node.browseName.name, text), text.length < 4 ? 0 : rankText(describe(node), text) / 4);
    if (rank === 0 || (below !== undefined && !isSubtypeOf(space, node.key, below))) continue;
    found.push({ node, score: rank + getNearness(space, node) - node.browseName.name.length / 50 });
  }
  found.sort((a, b) => b.score - a.score);
  return found.slice(0, limit).map(({ node }) => toHit(node));
}

/** The type of exactly this name, the nearest one where several models have one. */
export function findTypeByName(space: AddressSpace, name: string, kinds: readonly TypeKind[]): TypeNode | undefined {
  return listTypes(space).findLast((node) => node.browseName.name === name && kinds.includes(node.nodeClass));
}

function getNearness(space: AddressSpace, node: Node): number {
  if (space.isOwn(node.key)) return 8;
  const layer = space.layers.findIndex((l) => l.nodes.has(node.key));
  return layer <= 0 ? (USUAL.has(node.browseName.name) ? 6 : 0) : 4;
}

/** Types of namespace 0 that machine models use most (common practice, no source). */
const USUAL = new Set([
  "BaseObjectType",
  "FolderType",
  "AnalogUnitRangeType",
  "AnalogUnitType",
  "BaseDataVariableType",
  "PropertyType",
  "TwoStateDiscreteType",
  "MultiStateValueDiscreteType",
  "MultiStateDiscreteType",
  "Boolean",
  "Float",
  "Double",
  "String",
  "UInt16",
  "UInt32",
  "Int16",
  "Int32",
  "Enumeration",
  "LocalizedText",
  "DateTime",
]);

function toHit(node: TypeNode): TypeHit {
  return {
    key: node.key,
    name: getDisplayName(node),
    kind: node.nodeClass,
    isAbstract: node.isAbstract === true,
    namespaceLabel: getNamespaceLabel(node.nodeId.namespaceUri),
    description: describe(node),
  };
}

function describe(node: Node): string {
  return findText(node.description ?? []) ?? "";
}
