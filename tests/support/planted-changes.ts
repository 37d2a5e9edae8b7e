/** Plants changes of known kind and rating into a model, each on nodes of its own, for the recall test of the comparison. */
import type { AddressSpace } from "~/domain/address-space/address-space";
import { findModellingRule, findParent, findTypeDefinition, listMembers } from "~/domain/address-space/browse";
import { hasValueAttributes, isTypeNode, type DeclaredReference, type Node } from "~/domain/address-space/node";
import { formatNodeId, numericNodeId, toNodeKey, type NodeKey } from "~/domain/address-space/node-id";
import { getOwnNamespace } from "~/domain/address-space/model-header";
import {
  StandardDataType,
  StandardModellingRule,
  StandardReferenceType,
  StandardType,
} from "~/domain/address-space/standard-ids";
import { isSubtypeOf } from "~/domain/address-space/type-hierarchy";
import type { ChangeKind, ChangeRating } from "~/domain/compare/change";
import { makeRandom } from "./random";

export type Planted = { readonly kind: ChangeKind; readonly node: string; readonly rating: ChangeRating };

type Context = { space: AddressSpace; readonly fresh: () => number; readonly used: Set<NodeKey> };
type Planter = { readonly name: string; readonly plant: (context: Context, node: Node) => Planted | undefined };

const { HasComponent, HasProperty, HasSubtype, HasTypeDefinition, HasModellingRule, GeneratesEvent } =
  StandardReferenceType;
const { Mandatory, Optional } = StandardModellingRule;
const TYPES_XSD = "http://opcfoundation.org/UA/2008/02/Types.xsd";

function idOf(node: Node): string {
  return formatNodeId(node.nodeId);
}

function replace(context: Context, node: Node, change: Partial<Node>): void {
  context.space = context.space.withNode({ ...node, ...change } as Node);
}

function isLeafMember(context: Context, node: Node): boolean {
  const { space } = context;
  const parent = findParent(space, node.key);
  const owner = parent === undefined ? undefined : space.getNode(parent);
  if (isTypeNode(node)) return false;
  return owner?.nodeClass === "ObjectType" && listMembers(space, node.key).length === 0 && space.isOwn(owner.key);
}

/** All that refer to the node are owners or the node itself: taking it away changes nothing else. */
function isUnshared(context: Context, node: Node): boolean {
  return context.space.edgesTo(node.key).length === 1;
}

function withoutDeclarations(context: Context, key: NodeKey): void {
  for (const edge of context.space.edgesTo(key)) {
    const source = context.space.own.nodes.get(edge.source);
    if (source)
      replace(context, source, { references: source.references.filter((r) => !(r.isForward && r.target === key)) });
  }
}

function swapReference(node: Node, type: NodeKey, isForward: boolean, target: NodeKey): readonly DeclaredReference[] {
  return node.references.map((r) => (r.type === type && r.isForward === isForward ? { ...r, target } : r));
}

function addMember(context: Context, owner: Node, rule: NodeKey, rating: ChangeRating): Planted | undefined {
  if (owner.nodeClass !== "ObjectType") return undefined;
  const number = context.fresh();
  const nodeId = numericNodeId(getOwnNamespace(context.space.own.header), number);
  context.space = context.space.withNode({
    key: toNodeKey(nodeId),
    nodeId,
    nodeClass: "Variable",
    order: context.space.own.nextOrder,
    browseName: { namespaceUri: nodeId.namespaceUri, name: `Planted${number}` },
    displayName: [{ text: `Planted${number}` }],
    dataType: StandardDataType.Double,
    parent: owner.key,
    references: [
      { type: HasTypeDefinition, target: StandardType.BaseDataVariableType, isForward: true },
      { type: HasModellingRule, target: rule, isForward: true },
      { type: HasComponent, target: owner.key, isForward: false },
    ],
  });
  return { kind: "member-added", node: formatNodeId(nodeId), rating };
}

function addProperty(context: Context, owner: Node, name: string, xml: string, dataType: NodeKey): void {
  const nodeId = numericNodeId(getOwnNamespace(context.space.own.header), context.fresh());
  context.space = context.space.withNode({
    key: toNodeKey(nodeId),
    nodeId,
    nodeClass: "Variable",
    order: context.space.own.nextOrder,
    browseName: { namespaceUri: "http://opcfoundation.org/UA/", name },
    displayName: [{ text: name }],
    dataType,
    parent: owner.key,
    value: { xml },
    references: [
      { type: HasTypeDefinition, target: StandardType.PropertyType, isForward: true },
      { type: HasProperty, target: owner.key, isForward: false },
    ],
  });
}

const unitXml = `<ExtensionObject xmlns="${TYPES_XSD}"><TypeId><Identifier>i=888</Identifier></TypeId><Body><EUInformation><NamespaceUri>http://www.opcfoundation.org/UA/units/un/cefact</NamespaceUri><UnitId>4408652</UnitId><DisplayName><Text>°C</Text></DisplayName></EUInformation></Body></ExtensionObject>`;
const rangeXml = `<ExtensionObject xmlns="${TYPES_XSD}"><TypeId><Identifier>i=885</Identifier></TypeId><Body><Range><Low>0</Low><High>7</High></Range></Body></ExtensionObject>`;

export const planters: readonly Planter[] = [
  {
    name: "remove a member",
    plant: (c, n) => {
      if (!isLeafMember(c, n) || !isUnshared(c, n)) return undefined;
      withoutDeclarations(c, n.key);
      c.space = c.space.withoutNode(n.key);
      return { kind: "member-removed", node: idOf(n), rating: "breaking" };
    },
  },
  { name: "add a mandatory member", plant: (c, n) => addMember(c, n, Mandatory, "breaking") },
  { name: "add an optional member", plant: (c, n) => addMember(c, n, Optional, "additive") },
  {
    name: "add a type",
    plant: (c, n) => {
      if (n.nodeClass !== "ObjectType") return undefined;
      const nodeId = numericNodeId(getOwnNamespace(c.space.own.header), c.fresh());
      const name = `Planted${nodeId.identifier}Type`;
      c.space = c.space.withNode({
        key: toNodeKey(nodeId),
        nodeId,
        nodeClass: "ObjectType",
        order: c.space.own.nextOrder,
        browseName: { namespaceUri: nodeId.namespaceUri, name },
        displayName: [{ text: name }],
        references: [{ type: HasSubtype, target: n.key, isForward: false }],
      });
      return { kind: "type-added", node: formatNodeId(nodeId), rating: "additive" };
    },
  },
  {
    name: "renumber",
    plant: (c, n) => {
      if (!isLeafMember(c, n)) return undefined;
      const nodeId = numericNodeId(n.nodeId.namespaceUri, c.fresh());
      replace(c, n, { nodeId });
      return { kind: "renumbered", node: formatNodeId(nodeId), rating: "breaking" };
    },
  },
  {
    name: "rename",
    plant: (c, n) => {
      if (!isLeafMember(c, n)) return undefined;
      const name = `${n.browseName.name}${c.fresh()}`;
      replace(c, n, { browseName: { ...n.browseName, name }, displayName: [{ text: name }] });
      return { kind: "renamed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "move",
    plant: (c, n) => {
      const parent = findParent(c.space, n.key);
      if (!isLeafMember(c, n) || !isUnshared(c, n) || !("parent" in n) || parent === undefined) return undefined;
      const other = c.space
        .listOwnNodes()
        .find((o) => o.nodeClass === "ObjectType" && o.key !== parent && !c.used.has(o.key));
      const own = n.references.find((r) => !r.isForward && r.target === parent);
      if (!other || !own) return undefined;
      withoutDeclarations(c, n.key);
      const present = c.space.requireNode(n.key);
      const references = [...present.references.filter((r) => r.isForward), { ...own, target: other.key }];
      replace(c, present, { references, parent: other.key } as Partial<Node>);
      return { kind: "moved", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "change the data type",
    plant: (c, n) => {
      if (
        !hasValueAttributes(n) ||
        n.value ||
        n.dataType === StandardDataType.Guid ||
        n.browseName.name.endsWith("Arguments")
      )
        return undefined;
      replace(c, n, { dataType: StandardDataType.Guid } as Partial<Node>);
      return { kind: "data-type-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "change the rank",
    plant: (c, n) => {
      if (!hasValueAttributes(n) || n.value || (n.valueRank ?? -1) !== -1) return undefined;
      replace(c, n, { valueRank: 1, arrayDimensions: "0" } as Partial<Node>);
      return { kind: "value-rank-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "add a unit",
    plant: (c, n) => {
      if (n.nodeClass !== "Variable" || listMembers(c.space, n.key).length > 0 || !isLeafMember(c, n)) return undefined;
      addProperty(c, n, "EngineeringUnits", unitXml, StandardDataType.EUInformation);
      return { kind: "unit-changed", node: idOf(n), rating: "additive" };
    },
  },
  {
    name: "add a range",
    plant: (c, n) => {
      if (n.nodeClass !== "Variable" || listMembers(c.space, n.key).length > 0 || !isLeafMember(c, n)) return undefined;
      addProperty(c, n, "EURange", rangeXml, StandardDataType.Range);
      return { kind: "range-changed", node: idOf(n), rating: "neutral" };
    },
  },
  {
    name: "allow writing",
    plant: (c, n) => {
      if (n.nodeClass !== "Variable" || (n.accessLevel ?? 1) !== 1) return undefined;
      replace(c, n, { accessLevel: 3 } as Partial<Node>);
      return { kind: "access-changed", node: idOf(n), rating: "additive" };
    },
  },
  {
    name: "forbid reading",
    plant: (c, n) => {
      if (n.nodeClass !== "Variable" || (n.accessLevel ?? 1) !== 1) return undefined;
      replace(c, n, { accessLevel: 0 } as Partial<Node>);
      return { kind: "access-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "optional to mandatory",
    plant: (c, n) => {
      if (findModellingRule(c.space, n.key) !== Optional) return undefined;
      replace(c, n, { references: swapReference(n, HasModellingRule, true, Mandatory) });
      return { kind: "modelling-rule-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "change the supertype",
    plant: (c, n) => {
      const own = n.references.find((r) => r.type === HasSubtype && !r.isForward);
      if (n.nodeClass !== "ObjectType" || own?.target !== StandardType.BaseObjectType) return undefined;
      replace(c, n, { references: swapReference(n, HasSubtype, false, StandardType.FolderType) });
      return { kind: "supertype-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "change the type definition",
    plant: (c, n) => {
      if (n.nodeClass !== "Variable" || findTypeDefinition(c.space, n.key) !== StandardType.BaseDataVariableType)
        return undefined;
      // A subtype that asks for a mandatory member (EnumStrings).
      replace(c, n, { references: swapReference(n, HasTypeDefinition, true, StandardType.MultiStateDiscreteType) });
      return { kind: "type-definition-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "make abstract",
    plant: (c, n) => {
      if ((n.nodeClass !== "ObjectType" && n.nodeClass !== "VariableType") || n.isAbstract) return undefined;
      replace(c, n, { isAbstract: true } as Partial<Node>);
      return { kind: "abstract-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "add an enumeration value",
    plant: (c, n) => {
      if (n.nodeClass !== "DataType" || !n.definition || !isSubtypeOf(c.space, n.key, StandardDataType.Enumeration))
        return undefined;
      replace(c, n, {
        definition: { ...n.definition, fields: [...n.definition.fields, { name: "Planted", value: 4711 }] },
      } as Partial<Node>);
      return { kind: "enumeration-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "add a structure field",
    plant: (c, n) => {
      if (n.nodeClass !== "DataType" || !n.definition || !isSubtypeOf(c.space, n.key, StandardDataType.Structure))
        return undefined;
      replace(c, n, {
        definition: {
          ...n.definition,
          fields: [...n.definition.fields, { name: "Planted", dataType: StandardDataType.Double }],
        },
      } as Partial<Node>);
      return { kind: "structure-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "rename an argument",
    plant: (c, n) => {
      const members = n.nodeClass === "Method" ? listMembers(c.space, n.key) : [];
      const property = members.find((m) => m.browseName.name === "InputArguments" && c.space.isOwn(m.key));
      if (!property || !hasValueAttributes(property) || !property.value || c.used.has(property.key)) return undefined;
      c.used.add(property.key);
      const xml = property.value.xml.replace(/<((?:\w+:)?)Name>[^<]*</, "<$1Name>Planted<");
      if (xml === property.value.xml) return undefined;
      replace(c, property, { value: { ...property.value, xml } } as Partial<Node>);
      return { kind: "arguments-changed", node: idOf(n), rating: "breaking" };
    },
  },
  {
    name: "change a description",
    plant: (c, n) => {
      replace(c, n, { description: [{ text: `Planted ${c.fresh()}` }] });
      return { kind: "text-changed", node: idOf(n), rating: "neutral" };
    },
  },
  {
    name: "add an event",
    plant: (c, n) => {
      if (n.nodeClass !== "ObjectType") return undefined;
      replace(c, n, {
        references: [...n.references, { type: GeneratesEvent, target: StandardType.BaseEventType, isForward: true }],
      });
      return { kind: "reference-added", node: idOf(n), rating: "additive" };
    },
  },
  {
    name: "deprecate",
    plant: (c, n) => {
      if (n.releaseStatus !== undefined) return undefined;
      replace(c, n, { releaseStatus: "Deprecated" });
      return { kind: "release-status-changed", node: idOf(n), rating: "neutral" };
    },
  },
];

/** Plants up to `count` changes, evenly over the kinds; no node is touched twice. */
export function plantChanges(
  start: AddressSpace,
  count: number,
  seed: number,
): { space: AddressSpace; planted: Planted[] } {
  const random = makeRandom(String(seed));
  let next = 900_000;
  const context: Context = { space: start, fresh: () => next++, used: new Set() };
  const candidates = start.listOwnNodes().map((n) => n.key);
  const planted: Planted[] = [];
  const exhausted = new Set<Planter>();
  for (let round = 0; planted.length < count && exhausted.size < planters.length; round++) {
    const planter = planters[round % planters.length];
    if (!planter || exhausted.has(planter)) continue;
    const before = planted.length;
    for (let attempt = 0; attempt < 400; attempt++) {
      const key = candidates[random.below(candidates.length)];
      const node = key === undefined || context.used.has(key) ? undefined : context.space.own.nodes.get(key);
      if (!node || isNearUsed(context, node)) continue;
      const found = planter.plant(context, node);
      if (!found) continue;
      context.used.add(node.key);
      planted.push(found);
      break;
    }
    if (planted.length === before) exhausted.add(planter);
  }
  return { space: context.space, planted };
}

/** A planted owner would change the path or rating of what is planted below it. */
function isNearUsed(context: Context, node: Node): boolean {
  const parent = findParent(context.space, node.key);
  if (
    node.nodeClass === "Variable" &&
    /Arguments$|^Enum|^OptionSetValues$|^EngineeringUnits$|Range$|^Namespace|^ModelVersion$/.test(node.browseName.name)
  )
    return true;
  return parent !== undefined && !node.nodeClass.endsWith("Type") && context.used.has(parent);
}
