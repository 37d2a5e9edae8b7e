/**
 * The machines of a model: objects that stand directly below an object of another model (the Machines object of OPC
 * 40001-1, the Objects folder) or below folders of the own model, each with the groups of its type and how many of the
 * declared members it has. Grouping by sub-objects of the type is common practice for retrofitted machines, no source.
 */
import type { AddressSpace } from "../address-space/address-space";
import {
  findMember,
  findProperty,
  findTypeDefinition,
  getDisplayName,
  listChildren,
  listEdgesFrom,
  listEdgesTo,
} from "../address-space/browse";
import { hasValueAttributes, isTypeNode, type Node, type XmlText } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName } from "../address-space/qualified-name";
import { StandardDataType, StandardReferenceType, StandardType } from "../address-space/standard-ids";
import { isSubtypeOf, listSupertypes } from "../address-space/type-hierarchy";
import { readRange } from "../simulation/read-range";

const DI_NAMESPACE = "http://opcfoundation.org/UA/DI/";

export type MachineGroup = {
  readonly name: string;
  /** One entry a declared member, in the order of the type: whether the machine has it. */
  readonly members: readonly {
    readonly name: string;
    /** BrowseNames below the machine: `Process/SpindleSpeed`. */
    readonly path: string;
    readonly isPresent: boolean;
  }[];
};

export type MachineFigure = {
  readonly key: NodeKey;
  readonly name: string;
  /** Display name of the EngineeringUnits, "" where there are none. */
  readonly unit: string;
  readonly range: { readonly low: number; readonly high: number } | null;
};

export type Machine = {
  readonly key: NodeKey;
  readonly nodeId: string;
  readonly name: string;
  readonly typeName: string;
  readonly typeKey: NodeKey | undefined;
  readonly groups: readonly MachineGroup[];
  /** Values of the Identification add-in (OPC 40001-1 §8) that are given, by BrowseName, as written. */
  readonly identification: Readonly<Record<string, string>>;
  /** The Variable that tells what the machine does: the first whose data type is an enumeration. */
  readonly state: NodeKey | undefined;
  /** The analog value that tells it best: a speed where there is one, else the first. */
  readonly figure: MachineFigure | undefined;
};

export function listMachines(space: AddressSpace): Machine[] {
  return space
    .listOwnNodes()
    .filter((node) => isMachine(space, node))
    .map((node) => toMachine(space, node));
}

function isMachine(space: AddressSpace, node: Node): boolean {
  if (node.nodeClass !== "Object" || !hasMachineType(space, node.key)) return false;
  const owners = listEdgesTo(space, node.key, StandardReferenceType.HierarchicalReferences).map((e) =>
    space.getNode(e.source),
  );
  return (
    owners.length > 0 &&
    owners.every((owner) => owner?.nodeClass === "Object" && (!space.isOwn(owner.key) || isFolder(space, owner.key)))
  );
}

function isFolder(space: AddressSpace, key: NodeKey): boolean {
  const type = findTypeDefinition(space, key);
  return type !== undefined && isSubtypeOf(space, type, StandardType.FolderType);
}

function hasMachineType(space: AddressSpace, key: NodeKey): boolean {
  const type = findTypeDefinition(space, key);
  if (type === undefined || type === StandardType.BaseObjectType || isFolder(space, key)) return false;
  return !isSubtypeOf(space, type, StandardType.NamespaceMetadataType);
}

function toMachine(space: AddressSpace, node: Node): Machine {
  const typeKey = findTypeDefinition(space, node.key);
  const type = typeKey === undefined ? undefined : space.getNode(typeKey);
  const variables = listVariables(space, node.key);
  return {
    key: node.key,
    nodeId: formatNodeId(node.nodeId),
    name: getDisplayName(node),
    typeName: type ? getDisplayName(type) : "",
    typeKey,
    groups: typeKey === undefined ? [] : listGroups(space, node.key, typeKey),
    identification: readIdentification(space, node.key),
    state: variables.find(
      (v) =>
        hasValueAttributes(v) &&
        v.dataType !== undefined &&
        isSubtypeOf(space, v.dataType, StandardDataType.Enumeration),
    )?.key,
    figure: findFigure(space, variables),
  };
}

/** Components of the type and its supertypes that are Objects with components: each is a group. */
function listGroups(space: AddressSpace, machine: NodeKey, type: NodeKey): MachineGroup[] {
  const groups: MachineGroup[] = [];
  for (const declared of listDeclaredComponents(space, type)) {
    if (declared.nodeClass !== "Object") continue;
    const members = listDeclaredComponents(space, declared.key);
    const ofType = findTypeDefinition(space, declared.key);
    const inherited = ofType === undefined ? [] : listDeclaredComponents(space, ofType);
    const names = new Map([...members, ...inherited].map((m) => [formatQualifiedName(m.browseName), m] as const));
    if (names.size === 0) continue;
    const own = findMember(space, machine, declared.browseName.name, declared.browseName.namespaceUri);
    const present = new Set(own ? listComponents(space, own.key).map((m) => formatQualifiedName(m.browseName)) : []);
    groups.push({
      name: getDisplayName(declared),
      members: [...names].map(([name, member]) => ({
        name: getDisplayName(member),
        path: `${declared.browseName.name}/${member.browseName.name}`,
        isPresent: present.has(name),
      })),
    });
  }
  return groups;
}

/** Components of a node and, for a type, of its supertypes; placeholders are no members that a machine must have. */
function listDeclaredComponents(space: AddressSpace, key: NodeKey): Node[] {
  const node = space.getNode(key);
  const owners = node && isTypeNode(node) ? [...listSupertypes(space, key)].reverse().concat(key) : [key];
  return owners
    .flatMap((owner) => listComponents(space, owner))
    .filter((m) => !m.browseName.name.startsWith("<") && m.nodeClass !== "Method");
}

function listComponents(space: AddressSpace, key: NodeKey): Node[] {
  return listEdgesFrom(space, key, StandardReferenceType.HasComponent).flatMap(
    (edge) => space.getNode(edge.target) ?? [],
  );
}

/** Variables below the machine, no Properties, depth first; a visited set ends cycles. */
function listVariables(space: AddressSpace, key: NodeKey): Node[] {
  const found: Node[] = [];
  const seen = new Set<NodeKey>([key]);
  const visit = (at: NodeKey): void => {
    for (const member of listComponents(space, at)) {
      if (seen.has(member.key)) continue;
      seen.add(member.key);
      if (member.nodeClass === "Variable") found.push(member);
      else if (member.nodeClass === "Object") visit(member.key);
    }
  };
  visit(key);
  return found;
}

/** UNECE common codes of speeds as unit ids (OPC 10000-8 §5.6.3.4: the code's characters as bytes): r/min, m/s, m/min. */
const SPEED_UNITS: ReadonlySet<string> = new Set(
  ["RPM", "MTS", "2X"].map((code) => String([...code].reduce((id, c) => id * 256 + c.charCodeAt(0), 0))),
);

function findFigure(space: AddressSpace, variables: readonly Node[]): MachineFigure | undefined {
  const analog = variables.filter((v) => {
    const type = findTypeDefinition(space, v.key);
    return type !== undefined && isSubtypeOf(space, type, StandardType.BaseAnalogType);
  });
  const node = analog.find((v) => SPEED_UNITS.has(readUnitId(space, v.key) ?? "")) ?? analog[0];
  if (!node) return undefined;
  const range = findPropertyValue(space, node.key, "EURange");
  return {
    key: node.key,
    name: getDisplayName(node),
    unit: readText(findPropertyValue(space, node.key, "EngineeringUnits")?.xml) ?? "",
    range: (range && readRange(range)) ?? null,
  };
}

/** A Property of namespace 0 by BrowseName. */
function findPropertyValue(space: AddressSpace, key: NodeKey, name: string): XmlText | undefined {
  const property = findProperty(space, key, name);
  return property && hasValueAttributes(property) ? property.value : undefined;
}

function readUnitId(space: AddressSpace, key: NodeKey): string | undefined {
  return /<(?:[\w.-]+:)?UnitId>\s*(-?\d+)\s*</.exec(findPropertyValue(space, key, "EngineeringUnits")?.xml ?? "")?.[1];
}

function readIdentification(space: AddressSpace, machine: NodeKey): Record<string, string> {
  const addIn = findMember(space, machine, "Identification", DI_NAMESPACE);
  if (!addIn) return {};
  const values: Record<string, string> = {};
  for (const property of listChildren(space, addIn.key)) {
    if (!hasValueAttributes(property)) continue;
    const text = readText(property.value?.xml);
    if (text !== undefined) values[property.browseName.name] = text;
  }
  return values;
}

/** The text of a scalar or of a LocalizedText; undefined for structures and lists. */
function readText(xml: string | undefined): string | undefined {
  const text =
    /<(?:[\w.-]+:)?Text>([^<]*)</.exec(xml ?? "")?.[1] ??
    /^\s*<(?!(?:[\w.-]+:)?ListOf)[^>]*>([^<]+)<\/[^>]*>\s*$/.exec(xml ?? "")?.[1];
  const trimmed = text?.trim();
  return trimmed ? decodeEntities(trimmed) : undefined;
}

const entities: Readonly<Record<string, string>> = { amp: "&", lt: "<", gt: ">", quot: '"', apos: "'" };

function decodeEntities(text: string): string {
  return text.replace(/&(amp|lt|gt|quot|apos);/g, (_, name: string) => entities[name] ?? "");
}
