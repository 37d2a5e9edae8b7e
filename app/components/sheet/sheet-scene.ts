/**
 * What a sheet shows: cards with their rows, and the references between cards. Pure: an address space and the saved choice
 * of the sheet go in, drawn things without positions come out. The rules are those of OPC 10000-3 Annex C: a type stands
 * either as a line or inside the node, a member either as a row or as a node of its own, never both.
 */
import type { AddressSpace, Edge } from "~/domain/address-space/address-space";
import { findTypeDefinition, getDisplayName, listMembers } from "~/domain/address-space/browse";
import { hasValueAttributes, getDataType, isAbstract, isTypeNode, type Node } from "~/domain/address-space/node";
import { formatNodeId, type NodeKey } from "~/domain/address-space/node-id";
import { StandardReferenceType, StandardType } from "~/domain/address-space/standard-ids";
import { isHierarchical } from "~/domain/address-space/type-hierarchy";
import {
  findRuleName,
  formatDataType,
  getCardinality,
  getNodeName,
  isProperty,
  listInheritedMembers,
} from "../model/member-facts";
import { findUnitSymbol } from "../model/analog-facts";
import { formatLocalNodeId, getNamespaceLabel } from "../model/namespace-label";
import type { Feed } from "../notation/ferrule-badge";
import type { LineEnd } from "../notation/line-ends";
import { findSourceField } from "../register/source-field";
import { FOOT_HEIGHT, HEAD_HEIGHT, ROW_HEIGHT } from "./sheet-geometry";

export type MemberRow = {
  readonly key: NodeKey;
  readonly name: string;
  readonly nodeClass: Node["nodeClass"];
  readonly isProperty: boolean;
  /** Type definition of an Object member, shown as `Name::Type`. */
  readonly typeName?: string;
  readonly dataType: string;
  readonly unit: string;
  readonly cardinality: string;
  /** Name of the type that the member comes from, where it is inherited. */
  readonly origin?: string;
  /** Whether the model's mapping feeds it; absent where no mapping speaks of it. */
  readonly feed?: Feed;
};

export type CardShape = "card" | "variable" | "oval" | "hexagon" | "signpost" | "trapezium";

export type Card = {
  readonly key: NodeKey;
  readonly shape: CardShape;
  readonly nodeClass: Node["nodeClass"];
  readonly name: string;
  /** Type inside the node (`Name::Type`), where it is not drawn as a line. */
  readonly typeName?: string;
  readonly isType: boolean;
  readonly isAbstract: boolean;
  readonly isForeign: boolean;
  readonly namespaceLabel: string;
  readonly idText: string;
  readonly nodeIdText: string;
  readonly rows: readonly MemberRow[];
  /** Rows kept back by folding. */
  readonly folded: number;
  /** Members that stand as cards beside this one. */
  readonly drawn: number;
  readonly members: number;
  readonly width: number;
  readonly height: number;
};

/** A leader is the dotted line from a row to the DataType of its Variable: an attribute, no reference. */
export type DrawnEnd = LineEnd | "leader";

export type Line = {
  readonly id: string;
  readonly edge: Edge;
  /** Cards between which it is drawn; HasSubtype runs against its direction, since its heads stand at the supertype. */
  readonly from: NodeKey;
  readonly to: NodeKey;
  readonly end: DrawnEnd;
  /** Name beside the line, where the end alone does not say it. */
  readonly label?: string;
  readonly cardinality?: string;
  /** Row at which the line leaves its source's card. */
  readonly sourceRow?: number;
  /** From a folder to what it organises: such lines come from above, on one bus. */
  readonly isOrganized?: true;
};

export type Scene = { readonly cards: readonly Card[]; readonly lines: readonly Line[] };

export type SceneChoice = {
  readonly shown: readonly NodeKey[];
  /** Cards that show all of their rows. */
  readonly unfolded: ReadonlySet<NodeKey>;
};

const INHERITED_ROWS = 6;
const FOREIGN_ROWS = 4;
const OWN_ROWS = 32;

export function buildScene(space: AddressSpace, choice: SceneChoice): Scene {
  const shown = new Set(choice.shown.filter((key) => space.getNode(key) !== undefined));
  const cards = [...shown].map((key) => buildCard(space, space.requireNode(key), shown, choice.unfolded.has(key)));
  const cardsByKey = new Map(cards.map((card) => [card.key, card]));
  return { cards, lines: cards.flatMap((card) => buildLines(space, card, cardsByKey)) };
}

const SHAPES: Readonly<Record<Node["nodeClass"], CardShape>> = {
  Object: "card",
  ObjectType: "card",
  Variable: "variable",
  VariableType: "variable",
  Method: "oval",
  DataType: "hexagon",
  ReferenceType: "signpost",
  View: "trapezium",
};

function buildCard(space: AddressSpace, node: Node, shown: ReadonlySet<NodeKey>, isUnfolded: boolean): Card {
  const isForeign = !space.isOwn(node.key);
  const members = listMembers(space, node.key);
  const hasRows = node.nodeClass !== "Method" && node.nodeClass !== "DataType" && node.nodeClass !== "ReferenceType";
  const own = hasRows ? members.filter((member) => !shown.has(member.key)) : [];
  const inherited = hasRows && !isForeign && isTypeNode(node) ? listInheritedMembers(space, node.key) : [];
  const ownLimit = isUnfolded ? own.length : isForeign ? FOREIGN_ROWS : OWN_ROWS;
  const inheritedLimit = isUnfolded ? inherited.length : INHERITED_ROWS;
  const rows = [
    ...inherited.slice(0, inheritedLimit).map((m) => buildRow(space, m.node, getNodeName(space, m.origin))),
    ...own.slice(0, ownLimit).map((member) => buildRow(space, member)),
  ];
  const folded = own.length + inherited.length - rows.length;
  const drawn = hasRows ? members.length - own.length : 0;
  const typeDefinition = isTypeNode(node) ? undefined : findTypeDefinition(space, node.key);
  const typeName = getInlineType(space, typeDefinition, shown);
  const card = {
    key: node.key,
    shape: SHAPES[node.nodeClass],
    nodeClass: node.nodeClass,
    name: getDisplayName(node),
    ...(typeName === undefined ? {} : { typeName }),
    isType: isTypeNode(node),
    isAbstract: isAbstract(node),
    isForeign,
    namespaceLabel: getNamespaceLabel(node.nodeId.namespaceUri),
    idText: formatLocalNodeId(node.nodeId),
    nodeIdText: formatNodeId(node.nodeId),
    rows,
    folded,
    drawn,
    members: members.length + inherited.length,
  };
  return { ...card, ...measureCard(card) };
}

/** Plain Objects and folders need no type beside their name. */
const PLAIN_TYPES = new Set<NodeKey>([StandardType.BaseObjectType, StandardType.FolderType, StandardType.BaseDataVariableType, StandardType.PropertyType]);

function getInlineType(space: AddressSpace, type: NodeKey | undefined, shown: ReadonlySet<NodeKey>): string | undefined {
  if (type === undefined || PLAIN_TYPES.has(type) || (shown.has(type) && space.isOwn(type))) return undefined;
  return getNodeName(space, type);
}

function buildRow(space: AddressSpace, node: Node, origin?: string): MemberRow {
  const feed = findSourceField(space, node)?.feed;
  const typeDefinition = node.nodeClass === "Object" ? findTypeDefinition(space, node.key) : undefined;
  return {
    key: node.key,
    name: getDisplayName(node),
    nodeClass: node.nodeClass,
    isProperty: isProperty(space, node),
    ...(typeDefinition === undefined || PLAIN_TYPES.has(typeDefinition) ? {} : { typeName: getNodeName(space, typeDefinition) }),
    dataType: formatDataType(space, node),
    unit: node.nodeClass === "Variable" ? findUnitSymbol(space, node.key) : "",
    cardinality: getCardinality(findRuleName(space, node.key)),
    ...(origin === undefined ? {} : { origin }),
    ...(feed === undefined ? {} : { feed }),
  };
}

const WORD = 6.5;
const BOLD = 7.6;
const MONO = 6.7;

function measureCard(card: Omit<Card, "width" | "height">): { width: number; height: number } {
  const head = card.name.length * BOLD + (card.typeName ? (card.typeName.length + 2) * WORD : 0);
  const label = (card.isForeign ? card.namespaceLabel : card.idText).length * MONO;
  if (card.shape === "oval") return { width: snap(clamp(head + 56, 112, 320)), height: 38 };
  if (card.shape === "hexagon" || card.shape === "signpost") return { width: snap(clamp(head + 76, 140, 360)), height: 44 };
  const rows = card.rows.map(measureRow);
  const hasFoot = card.folded > 0 || card.drawn > 0;
  const wide = card.rows.length > 0 || hasFoot;
  const width = snap(clamp(Math.max(head + label + 40, ...rows), wide ? 264 : 140, 408), wide ? 24 : 4);
  return { width, height: HEAD_HEIGHT + card.rows.length * ROW_HEIGHT + (hasFoot ? FOOT_HEIGHT : 0) };
}

function measureRow(row: MemberRow): number {
  const name = row.name.length * WORD + (row.typeName ? (row.typeName.length + 2) * WORD : 0);
  const right = row.origin ? (row.origin.length + 5) * 6 : (row.dataType.length + row.unit.length) * MONO + 8;
  return 106 + (row.feed === undefined ? 0 : 26) + name + right;
}

function clamp(value: number, low: number, high: number): number {
  return Math.min(high, Math.max(low, value));
}

/** Whole steps, so that cards of one column mostly have one width. */
function snap(value: number, step = 4): number {
  return Math.ceil(value / step) * step;
}

function buildLines(space: AddressSpace, card: Card, cards: ReadonlyMap<NodeKey, Card>): Line[] {
  const lines: Line[] = [];
  for (const edge of space.edgesFrom(card.key)) {
    const line = cards.has(edge.target) ? buildLine(space, edge) : undefined;
    if (line) lines.push(line);
  }
  lines.push(...buildLeaders(space, card, cards));
  return lines;
}

function buildLine(space: AddressSpace, edge: Edge): Line | undefined {
  const { HasModellingRule, HasSubtype, HasComponent, HasProperty, HasTypeDefinition } = StandardReferenceType;
  if (edge.type === HasModellingRule) return undefined;
  // The type of a required model stands inside the node; only own types are joined by a line.
  if (edge.type === HasTypeDefinition && !space.isOwn(edge.target)) return undefined;
  const end = getLineEnd(space, edge.type);
  const says = edge.type === HasSubtype || edge.type === HasComponent || edge.type === HasProperty || edge.type === HasTypeDefinition;
  const cardinality = isHierarchical(space, edge.type) ? getCardinality(findRuleName(space, edge.target)) : "";
  return {
    id: `${edge.source}\n${edge.type}\n${edge.target}`,
    edge,
    from: end === "subtype" ? edge.target : edge.source,
    to: end === "subtype" ? edge.source : edge.target,
    end,
    ...(says ? {} : { label: getNodeName(space, edge.type) }),
    ...(edge.type === StandardReferenceType.Organizes ? { isOrganized: true as const } : {}),
    ...(cardinality === "" ? {} : { cardinality }),
  };
}

/** The end of a line by its ReferenceType (OPC 10000-3 Table C.2). */
export function getLineEnd(space: AddressSpace, type: NodeKey): LineEnd {
  switch (type) {
    case StandardReferenceType.HasComponent:
      return "component";
    case StandardReferenceType.HasProperty:
      return "property";
    case StandardReferenceType.HasTypeDefinition:
      return "type-definition";
    case StandardReferenceType.HasSubtype:
      return "subtype";
    case StandardReferenceType.HasInterface:
      return "interface";
    case StandardReferenceType.HasEventSource:
      return "event-source";
  }
  const node = space.getNode(type);
  if (node?.nodeClass === "ReferenceType" && node.symmetric === true) return "symmetric";
  return isHierarchical(space, type) ? "hierarchical" : "other";
}

/** Dotted leaders from a row, or from a Variable's card, to the card of its DataType. */
function buildLeaders(space: AddressSpace, card: Card, cards: ReadonlyMap<NodeKey, Card>): Line[] {
  const sources: [NodeKey, number | undefined][] = card.rows.map((row, index) => [row.key, index]);
  if (card.shape === "variable") sources.push([card.key, undefined]);
  const taken = new Set<NodeKey>();
  return sources.flatMap(([key, sourceRow]) => {
    const node = space.getNode(key);
    if (!node || !hasValueAttributes(node) || card.rows[sourceRow ?? -1]?.origin !== undefined) return [];
    const target = getDataType(node);
    if (!cards.has(target) || taken.has(target)) return [];
    taken.add(target);
    const edge = { source: card.key, type: target, target };
    return [{ id: `${key}\nDataType\n${target}`, edge, from: card.key, to: target, end: "leader" as const, ...(sourceRow === undefined ? {} : { sourceRow }) }];
  });
}
