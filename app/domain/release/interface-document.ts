/**
 * The interface of a model as those see it who read its machines: for each type and machine the members with path,
 * NodeId, data type, unit, range, access and meaning; methods with arguments; events. Contents only; how they look is
 * `interface-html.ts`.
 */
import { type AddressSpace } from "../address-space/address-space";
import { findMember, findTypeDefinition, listEdgesFrom, listMembers } from "../address-space/browse";
import { listInstanceDeclarations, listTypeSources } from "../address-space/instance-declarations";
import {
  getAccessLevel,
  getDataType,
  getValueRank,
  hasValueAttributes,
  type DataTypeNode,
  type Node,
} from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import type { LocalizedText } from "../address-space/qualified-name";
import { StandardDataType, StandardReferenceType } from "../address-space/standard-ids";
import { isSubtypeOf } from "../address-space/type-hierarchy";
import { findRange, findUnit, nameOf } from "../compare/describe-facts";
import { listMachines } from "../instantiation/list-machines";
import { SpaceDataTypes } from "../nodeset/values/data-type-shapes";
import { readValue } from "../nodeset/values/read-value";
import { findArguments, findEnumValues } from "../nodeset/values/standard-values";

type Texts = readonly LocalizedText[];

export type InterfaceMeaning = {
  readonly value: number;
  readonly name: string;
  readonly texts: Texts;
  readonly description: Texts;
};

export type InterfaceArgument = { readonly name: string; readonly dataType: string; readonly description: Texts };

export type InterfaceMember = {
  /** BrowseNames below the type or machine, joined by `/`. */
  readonly path: string;
  readonly nodeId: string;
  readonly nodeClass: Node["nodeClass"];
  readonly displayName: Texts;
  readonly description: Texts;
  readonly isOptional: boolean;
  readonly typeDefinition: string | null;
  readonly dataType: string | null;
  readonly unit: string | null;
  readonly range: string | null;
  /** `read`, `read and write`, `write`, `none`; null for what has no value. */
  readonly access: "read" | "write" | "read-write" | "none" | null;
  readonly meanings: readonly InterfaceMeaning[];
  readonly input: readonly InterfaceArgument[];
  readonly output: readonly InterfaceArgument[];
};

export type InterfaceOwner = {
  readonly kind: "type" | "machine";
  readonly name: string;
  readonly nodeId: string;
  /** The supertype of a type, the type of a machine. */
  readonly basedOn: string | null;
  readonly displayName: Texts;
  readonly description: Texts;
  readonly members: readonly InterfaceMember[];
  readonly events: readonly string[];
};

export type InterfaceDocument = {
  readonly namespaceUri: string;
  /** Languages of the texts, the most used first; `en` where the texts say none. */
  readonly languages: readonly string[];
  readonly owners: readonly InterfaceOwner[];
  readonly enumerations: readonly {
    readonly name: string;
    readonly nodeId: string;
    readonly description: Texts;
    readonly meanings: readonly InterfaceMeaning[];
  }[];
};

export function makeInterfaceDocument(space: AddressSpace): InterfaceDocument {
  const own = space.listOwnNodes();
  const types = own.filter((node) => node.nodeClass === "ObjectType" || node.nodeClass === "VariableType");
  const machines = listMachines(space).map(({ key }) => space.requireNode(key));
  const enumerations = own.filter(
    (node): node is DataTypeNode =>
      node.nodeClass === "DataType" && isSubtypeOf(space, node.key, StandardDataType.Enumeration),
  );
  return {
    namespaceUri: space.own.header.models[0]?.modelUri ?? "",
    languages: listLanguages(own),
    owners: [
      ...types.map((node) => describeType(space, node)),
      ...machines.map((node) => describeMachine(space, node)),
    ],
    enumerations: enumerations.map((node) => ({
      name: node.browseName.name,
      nodeId: formatNodeId(node.nodeId),
      description: node.description ?? [],
      meanings: listMeaningsOfType(space, node.key),
    })),
  };
}

function listLanguages(nodes: readonly Node[]): string[] {
  const counts = new Map<string, number>();
  for (const node of nodes) {
    for (const { locale } of [...node.displayName, ...(node.description ?? [])]) {
      const language = (locale ?? "").split("-")[0] || "en";
      counts.set(language, (counts.get(language) ?? 0) + 1);
    }
  }
  return [...counts].sort((a, b) => b[1] - a[1] || (a[0] < b[0] ? -1 : 1)).map(([language]) => language);
}

function describeType(space: AddressSpace, node: Node): InterfaceOwner {
  const members = [...listInstanceDeclarations(space, node.key).values()].map((declaration) =>
    describeMember(
      space,
      declaration.node,
      declaration.path.map((name) => name.name).join("/"),
      isOptionalRule(space, declaration.rule),
    ),
  );
  const supertype = space.edgesTo(node.key).find((e) => e.type === StandardReferenceType.HasSubtype)?.source;
  const events = new Set(listTypeSources(space, node.key).flatMap(({ key }) => listEvents(space, key)));
  return {
    kind: "type",
    ...describeOwner(space, node, supertype),
    members: members.filter(isShown),
    events: [...events],
  };
}

function isOptionalRule(space: AddressSpace, rule: NodeKey): boolean {
  return nameOf(space, rule)?.startsWith("Optional") === true;
}

function describeMachine(space: AddressSpace, node: Node): InterfaceOwner {
  const members: InterfaceMember[] = [];
  const seen = new Set<NodeKey>([node.key]);
  const visit = (at: NodeKey, path: string): void => {
    for (const member of listMembers(space, at)) {
      if (seen.has(member.key) || !space.isOwn(member.key)) continue;
      seen.add(member.key);
      const below = path === "" ? member.browseName.name : `${path}/${member.browseName.name}`;
      members.push(describeMember(space, member, below, false));
      visit(member.key, below);
    }
  };
  visit(node.key, "");
  const type = findTypeDefinition(space, node.key);
  const events = type === undefined ? [] : listTypeSources(space, type).flatMap(({ key }) => listEvents(space, key));
  return {
    kind: "machine",
    ...describeOwner(space, node, type),
    members: members.filter(isShown),
    events: [...new Set(events)],
  };
}

function describeOwner(space: AddressSpace, node: Node, basedOn: NodeKey | undefined) {
  return {
    name: node.browseName.name,
    nodeId: formatNodeId(node.nodeId),
    basedOn: nameOf(space, basedOn),
    displayName: node.displayName,
    description: node.description ?? [],
  };
}

function listEvents(space: AddressSpace, key: NodeKey): string[] {
  return listEdgesFrom(space, key, StandardReferenceType.GeneratesEvent).flatMap((e) => nameOf(space, e.target) ?? []);
}

/** Properties that are told with their owner: the reader of a table looks for the value, not for its unit's node. */
const TOLD_WITH_OWNER: ReadonlySet<string> = new Set([
  "EURange",
  "InstrumentRange",
  "EngineeringUnits",
  "EnumStrings",
  "EnumValues",
  "ValueAsText",
  "InputArguments",
  "OutputArguments",
]);

function isShown({ path }: InterfaceMember): boolean {
  return !TOLD_WITH_OWNER.has(path.slice(path.lastIndexOf("/") + 1));
}

function describeMember(space: AddressSpace, node: Node, path: string, isOptional: boolean): InterfaceMember {
  const unit = findUnit(space, node.key);
  return {
    path,
    nodeId: formatNodeId(node.nodeId),
    nodeClass: node.nodeClass,
    displayName: node.displayName,
    description: node.description ?? [],
    isOptional,
    typeDefinition: nameOf(space, findTypeDefinition(space, node.key)),
    dataType: hasValueAttributes(node) ? formatDataType(space, getDataType(node), getValueRank(node)) : null,
    unit: unit ? unit.symbol || unit.name : null,
    range: findRange(space, node.key, "EURange")?.replaceAll("-", "−") ?? null,
    access: node.nodeClass === "Variable" ? describeAccess(getAccessLevel(node)) : null,
    meanings: node.nodeClass === "Variable" ? listMeanings(space, node) : [],
    input: node.nodeClass === "Method" ? listArguments(space, node.key, "InputArguments") : [],
    output: node.nodeClass === "Method" ? listArguments(space, node.key, "OutputArguments") : [],
  };
}

function formatDataType(space: AddressSpace, dataType: NodeKey, rank: number): string {
  const name = nameOf(space, dataType) ?? dataType;
  return rank >= 1 ? name + "[]".repeat(rank) : rank === -1 ? name : `${name} (rank ${rank})`;
}

/** Bits 0 and 1 of AccessLevel (OPC 10000-3 §8.57). */
function describeAccess(level: number): InterfaceMember["access"] {
  return (["none", "read", "write", "read-write"] as const)[level & 3] ?? "none";
}

/** EnumValues or EnumStrings at the Variable (OPC 10000-8 §5.3.3), else what its enumeration says. */
function listMeanings(space: AddressSpace, node: Node): InterfaceMeaning[] {
  const atVariable = listMeaningsOfProperties(space, node.key);
  if (atVariable.length > 0 || !hasValueAttributes(node)) return atVariable;
  const dataType = getDataType(node);
  return isSubtypeOf(space, dataType, StandardDataType.Enumeration) ? listMeaningsOfType(space, dataType) : [];
}

function listMeaningsOfType(space: AddressSpace, dataType: NodeKey): InterfaceMeaning[] {
  const type = space.getNode(dataType);
  const fields = type?.nodeClass === "DataType" ? (type.definition?.fields ?? []) : [];
  const defined = fields.flatMap(({ value, name, displayName, description }) =>
    value === undefined ? [] : [{ value, name, texts: displayName ?? [], description: description ?? [] }],
  );
  return defined.length > 0 ? defined : listMeaningsOfProperties(space, dataType);
}

function listMeaningsOfProperties(space: AddressSpace, key: NodeKey): InterfaceMeaning[] {
  const values = findEnumValues(readProperty(space, key, "EnumValues"));
  if (values) {
    return values.map(({ value, displayName, description }) => ({
      value: Number(value),
      name: displayName.text,
      texts: [displayName],
      description: toTexts(description),
    }));
  }
  const strings = readProperty(space, key, "EnumStrings");
  if (strings?.type !== "LocalizedText" || strings.shape !== "array") return [];
  return strings.values.flatMap((text, value) =>
    text ? [{ value, name: text.text, texts: [text], description: [] }] : [],
  );
}

function listArguments(space: AddressSpace, method: NodeKey, name: string): InterfaceArgument[] {
  return (findArguments(readProperty(space, method, name)) ?? []).map(
    ({ name: argument, dataType, valueRank, description }) => ({
      name: argument,
      dataType: formatDataType(
        space,
        (space.findByNodeId(dataType)?.key ?? formatNodeId(dataType)) as NodeKey,
        valueRank,
      ),
      description: toTexts(description),
    }),
  );
}

function toTexts(text: LocalizedText | undefined): Texts {
  return text === undefined || text.text === "" ? [] : [text];
}

function readProperty(space: AddressSpace, key: NodeKey, name: string) {
  const property = findMember(space, key, name, "http://opcfoundation.org/UA/");
  if (!property || !hasValueAttributes(property) || !property.value) return undefined;
  const read = readValue(property.value, new SpaceDataTypes(space));
  return read.ok ? read.value : undefined;
}
