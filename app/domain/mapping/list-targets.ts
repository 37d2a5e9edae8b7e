/**
 * What a mapping can feed: the Variables of a machine type, with the facts that mapping them needs.
 *
 * A target is named by the key of its instance declaration, which stays when the Variable is renamed or moved. A member
 * that only the type of another member declares has no declaration of its own here (the elements of a stack light); it is
 * named by the key of the nearest member that has one and the browse path below it. For people, documents and gateways a
 * target is its path from the type: `Process/SpindleSpeed`, reserved characters escaped by `&` (OPC 10000-4 §A.2).
 */
import type { AddressSpace } from "../address-space/address-space";
import { findProperty, getDisplayName } from "../address-space/browse";
import {
  isMandatory,
  isPlaceholder,
  listMemberDeclarations,
  listMemberSources,
  listTypeSources,
  type DeclarationSource,
  type MemberDeclaration,
} from "../address-space/instance-declarations";
import { getDataType, hasValueAttributes, type Node, type VariableNode } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { findText, formatQualifiedName, type QualifiedName } from "../address-space/qualified-name";
import { StandardDataType, StandardReferenceType } from "../address-space/standard-ids";
import { getReferenceTypes, isSubtypeOf } from "../address-space/type-hierarchy";
import { SpaceDataTypes } from "../nodeset/values/data-type-shapes";
import { readValue } from "../nodeset/values/read-value";
import {
  findEnumValues,
  findEuInformation,
  findRange,
  type EUInformation,
  type Range,
} from "../nodeset/values/standard-values";
import type { BuiltInType, Variant } from "../nodeset/values/variant";
import { fromEuInformation } from "../units/units";

export type TargetUnit = { readonly code: string; readonly unitId: number; readonly symbol: string };

export type TargetState = { readonly value: number; readonly text: string };

export type Target = {
  /** The name that rows carry; opaque. */
  readonly target: string;
  /** Further names under which rows may know it: declarations that it overrides. */
  readonly aliases: readonly string[];
  readonly key: NodeKey;
  /** From the type down, as text and as names. */
  readonly path: string;
  readonly names: readonly QualifiedName[];
  readonly displayName: string;
  /** The first step of the path: Process, Energy … */
  readonly group: string;
  readonly dataType: NodeKey;
  readonly dataTypeName: string;
  readonly builtInType: BuiltInType;
  readonly isArray: boolean;
  /** `code` is empty for a unit outside UN/CEFACT's. */
  readonly unit: TargetUnit | undefined;
  readonly range: Range | undefined;
  readonly instrumentRange: Range | undefined;
  /** It and all members above it are mandatory: every machine has it. */
  readonly isMandatory: boolean;
  readonly isProperty: boolean;
  /** The values of an enumeration or a multi-state Variable with their texts. */
  readonly states: readonly TargetState[];
  readonly isWritable: boolean;
  readonly description: string;
};

const MAX_DEPTH = 12;
const MAX_TARGETS = 5_000;
const CURRENT_WRITE = 2;

const caches = new WeakMap<AddressSpace, Map<NodeKey, readonly Target[]>>();

/** The Variables of a type in the order of declaration, parents before children; at most 5 000. */
export function listTargets(space: AddressSpace, type: NodeKey): readonly Target[] {
  const cache = caches.get(space) ?? new Map<NodeKey, readonly Target[]>();
  caches.set(space, cache);
  let targets = cache.get(type);
  if (!targets) {
    targets = new TargetWalk(space).list(type);
    cache.set(type, targets);
  }
  return targets;
}

/** The target that a row means; undefined when the type has no such member any more. */
export function findTarget(space: AddressSpace, type: NodeKey, target: string): Target | undefined {
  return getNames(listTargets(space, type)).byTarget.get(target);
}

export function findTargetByPath(space: AddressSpace, type: NodeKey, path: string): Target | undefined {
  return getNames(listTargets(space, type)).byPath.get(path);
}

type Names = { readonly byTarget: ReadonlyMap<string, Target>; readonly byPath: ReadonlyMap<string, Target> };

const knownNames = new WeakMap<readonly Target[], Names>();

function getNames(targets: readonly Target[]): Names {
  let names = knownNames.get(targets);
  if (!names) {
    const aliases = targets.flatMap((t) => t.aliases.map((alias) => [alias, t] as const));
    const byTarget = new Map([...aliases, ...targets.map((t) => [t.target, t] as const)]);
    names = { byTarget, byPath: new Map(targets.map((t) => [t.path, t] as const)) };
    knownNames.set(targets, names);
  }
  return names;
}

/** ObjectTypes of the own model that have Variables to feed. */
export function listMachineTypes(space: AddressSpace): Node[] {
  return space
    .listOwnNodes()
    .filter((node) => node.nodeClass === "ObjectType" && listTargets(space, node.key).some((t) => !t.isProperty));
}

type Anchor = { readonly key: NodeKey; readonly below: readonly string[] };

/** Declarations of the type and its supertypes; everything else is given by the type of a member. */
const DIRECT = "";
const OF_TYPE = "of type";

class TargetWalk {
  readonly #space: AddressSpace;
  readonly #types: SpaceDataTypes;
  readonly #properties: ReadonlySet<NodeKey>;
  readonly #found: Target[] = [];

  constructor(space: AddressSpace) {
    this.#space = space;
    this.#types = new SpaceDataTypes(space);
    this.#properties = getReferenceTypes(space, StandardReferenceType.HasProperty);
  }

  list(type: NodeKey): readonly Target[] {
    this.#visit(listTypeSources(this.#space, type, DIRECT), { names: [], path: [] }, undefined, []);
    return this.#found;
  }

  #visit(
    sources: readonly DeclarationSource[],
    at: { names: readonly QualifiedName[]; path: readonly string[] },
    anchor: Anchor | undefined,
    above: readonly NodeKey[],
    isOfVariable = false,
    isAlways = true,
  ): void {
    if (at.names.length >= MAX_DEPTH) return;
    const members = listMemberDeclarations(this.#space, sources);
    for (const member of members) {
      if (this.#found.length >= MAX_TARGETS) return;
      const isBusy = member.node.nodeClass === "Method" || isPlaceholder(member.rule) || above.includes(member.node.key);
      // Properties of a Variable describe it; its components may be values of their own.
      if (isBusy || (isOfVariable && this.#isProperty(member))) continue;
      const segment = toSegment(member, members);
      const here = { names: [...at.names, member.browseName], path: [...at.path, segment] };
      const isDirect = member.declared[0]?.scope === DIRECT;
      const next: Anchor = isDirect || !anchor ? { key: member.node.key, below: [] } : { ...anchor, below: [...anchor.below, segment] };
      const { node } = member;
      const isHere = isAlways && isMandatory(member.rule);
      if (node.nodeClass === "Variable") this.#found.push(this.#toTarget(member, node, here, next, isHere));
      const inner = listMemberSources(this.#space, member, OF_TYPE);
      this.#visit(inner, here, next, [...above, node.key], node.nodeClass === "Variable", isHere);
    }
  }

  #toTarget(
    member: MemberDeclaration,
    node: VariableNode,
    here: { names: readonly QualifiedName[]; path: readonly string[] },
    anchor: Anchor,
    isAlways: boolean,
  ): Target {
    const dataType = getDataType(node);
    const typeNode = this.#space.getNode(dataType);
    const information = this.#readProperty(member, "EngineeringUnits", findEuInformation);
    const range = this.#readProperty(member, "EURange", findRange);
    const instrumentRange = this.#readProperty(member, "InstrumentRange", findRange);
    return {
      target: formatAnchor(anchor),
      aliases: anchor.below.length > 0 ? [] : member.declared.map((d) => d.key).filter((key) => key !== anchor.key),
      key: node.key,
      path: here.path.join("/"),
      names: here.names,
      displayName: getDisplayName(node),
      group: here.path.length > 1 ? (here.path[0] ?? "") : "",
      dataType,
      dataTypeName: typeNode ? typeNode.browseName.name : dataType,
      builtInType: this.#types.findBuiltInType(dataType) ?? "Variant",
      isArray: (node.valueRank ?? -1) >= 0,
      unit: information && toTargetUnit(information),
      range,
      instrumentRange,
      isMandatory: isAlways,
      isProperty: this.#isProperty(member),
      states: this.#listStates(member, dataType),
      isWritable: ((node.accessLevel ?? 1) & CURRENT_WRITE) !== 0,
      description: findText(node.description ?? []) ?? "",
    };
  }

  #isProperty(member: MemberDeclaration): boolean {
    return member.referenceTypes.some((type) => this.#properties.has(type));
  }

  /** A Property of the declaration, or of one that it overrides, where it has a value that can be read. */
  #readProperty<T>(member: MemberDeclaration, name: string, find: (variant: Variant | undefined) => T | undefined): T | undefined {
    for (const { key } of member.declared) {
      const found = find(this.#readValue(findProperty(this.#space, key, name)));
      if (found !== undefined) return found;
    }
    return undefined;
  }

  #readValue(node: Node | undefined): Variant | undefined {
    if (!node || !hasValueAttributes(node) || !node.value) return undefined;
    const read = readValue(node.value, this.#types);
    return read.ok ? read.value : undefined;
  }

  #listStates(member: MemberDeclaration, dataType: NodeKey): TargetState[] {
    const values = this.#readProperty(member, "EnumValues", findEnumValues);
    if (values) return values.map(({ value, displayName }) => ({ value: Number(value), text: displayName.text }));
    const strings = this.#readProperty(member, "EnumStrings", readTexts);
    if (strings) return strings.map((text, value) => ({ value, text }));
    return isSubtypeOf(this.#space, dataType, StandardDataType.Enumeration) ? this.#listEnumeration(dataType) : [];
  }

  #listEnumeration(dataType: NodeKey): TargetState[] {
    const node = this.#space.getNode(dataType);
    if (node?.nodeClass !== "DataType") return [];
    const fields = node.definition?.fields ?? [];
    if (fields.length > 0) return fields.map((f) => ({ value: f.value ?? -1, text: findText(f.displayName ?? []) ?? f.name }));
    const strings = readTexts(this.#readValue(findProperty(this.#space, dataType, "EnumStrings")));
    const values = findEnumValues(this.#readValue(findProperty(this.#space, dataType, "EnumValues")));
    if (values) return values.map(({ value, displayName }) => ({ value: Number(value), text: displayName.text }));
    return (strings ?? []).map((text, value) => ({ value, text }));
  }
}

function readTexts(variant: Variant | undefined): string[] | undefined {
  if (variant?.type !== "LocalizedText" || variant.shape !== "array") return undefined;
  return variant.values.map((text) => text?.text ?? "");
}

/** A name as a step of a path; siblings of one name are told apart by their namespaces. */
function toSegment(member: MemberDeclaration, siblings: readonly MemberDeclaration[]): string {
  const { browseName } = member;
  const isUnique = siblings.filter((s) => s.browseName.name === browseName.name).length < 2;
  return escapeStep(isUnique ? browseName.name : formatQualifiedName(browseName));
}

function escapeStep(name: string): string {
  return name.replace(/[/&]/g, "&$&");
}

function formatAnchor({ key, below }: Anchor): string {
  return below.length === 0 ? key : `${key}\n${below.join("/")}`;
}

function toTargetUnit(information: EUInformation): TargetUnit {
  const unit = fromEuInformation(information);
  return { code: unit?.code ?? "", unitId: information.unitId, symbol: information.displayName.text };
}

/** The Variable of a machine that a target of its type means; undefined when the machine lacks it. */
export function findMachineNode(space: AddressSpace, machine: NodeKey, target: Target): Node | undefined {
  let at: Node | undefined = space.getNode(machine);
  const hierarchical = getReferenceTypes(space, StandardReferenceType.HierarchicalReferences);
  for (const name of target.names) {
    const edges: readonly { type: NodeKey; target: NodeKey }[] = at ? space.edgesFrom(at.key) : [];
    at = undefined;
    for (const edge of edges) {
      const child = hierarchical.has(edge.type) ? space.getNode(edge.target) : undefined;
      if (child?.browseName.name === name.name && child.browseName.namespaceUri === name.namespaceUri) at = child;
    }
    if (!at) return undefined;
  }
  return at;
}

