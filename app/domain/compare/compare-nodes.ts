/** What differs between the two states of one matched node, its references aside. */
import type { AddressSpace } from "../address-space/address-space";
import { findModellingRule, findParent, findTypeDefinition } from "../address-space/browse";
import {
  getAccessLevel,
  getDataType,
  getValueRank,
  hasValueAttributes,
  isAbstract,
  type Node,
} from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { formatQualifiedName } from "../address-space/qualified-name";
import { StandardModellingRule, StandardReferenceType, StandardType } from "../address-space/standard-ids";
import { findSupertype, isSubtypeOf } from "../address-space/type-hierarchy";
import { listMembers } from "../address-space/browse";
import {
  compareArguments,
  compareDefinitions,
  isArgumentProperty,
  isDefinitionProperty,
  type Difference,
} from "./compare-data-types";
import { isSameXml } from "./compare-xml";
import { findRange, findUnit, formatTexts, formatUnit, formatValueText, nameOf } from "./describe-facts";
import type { NodeMatch, NodePair } from "./match-nodes";
import { ratings } from "./ratings";

export type Sides = { readonly before: AddressSpace; readonly after: AddressSpace; readonly match: NodeMatch };

/** Properties whose values are told as facts of their owner. */
const RANGES = ["EURange", "InstrumentRange"] as const;

export function isFactProperty(name: string): boolean {
  return (
    name === "EngineeringUnits" ||
    RANGES.some((r) => r === name) ||
    isDefinitionProperty(name) ||
    isArgumentProperty(name)
  );
}

export function compareNodes(sides: Sides, pair: NodePair): Difference[] {
  return [
    ...compareIdentity(sides, pair),
    ...compareTypes(sides, pair),
    ...compareValues(sides, pair),
    ...compareDefinitions(sides, pair),
    ...compareArguments(sides, pair),
    ...compareTexts(pair),
    ...compareRest(pair),
  ];
}

function compareIdentity(sides: Sides, { before: old, after: now }: NodePair): Difference[] {
  const found: Difference[] = [];
  if (old.nodeClass !== now.nodeClass) {
    found.push({ kind: "node-class-changed", rating: ratings.nodeClass, before: old.nodeClass, after: now.nodeClass });
  }
  const [oldId, newId] = [formatNodeId(old.nodeId), formatNodeId(now.nodeId)];
  if (oldId !== newId) found.push({ kind: "renumbered", rating: ratings.renumbered, before: oldId, after: newId });
  const [oldName, newName] = [formatQualifiedName(old.browseName), formatQualifiedName(now.browseName)];
  if (oldName !== newName) found.push({ kind: "renamed", rating: ratings.renamed, before: oldName, after: newName });
  if (!old.nodeClass.endsWith("Type")) {
    const [oldParent, newParent] = [findParent(sides.before, old.key), findParent(sides.after, now.key)];
    if (mapped(sides, oldParent) !== newParent) {
      found.push({
        kind: "moved",
        rating: ratings.moved,
        before: nameOf(sides.before, oldParent),
        after: nameOf(sides.after, newParent),
      });
    }
  }
  return found;
}

function mapped(sides: Sides, key: NodeKey | undefined): NodeKey | undefined {
  return key === undefined ? undefined : sides.match.toAfter(key);
}

function compareTypes(sides: Sides, { before: old, after: now }: NodePair): Difference[] {
  const found: Difference[] = [];
  const names = (a: NodeKey | undefined, b: NodeKey | undefined) => ({
    before: nameOf(sides.before, a),
    after: nameOf(sides.after, b),
  });
  if (old.nodeClass.endsWith("Type")) {
    const [a, b] = [findSupertype(sides.before, old.key), findSupertype(sides.after, now.key)];
    if (mapped(sides, a) !== b) found.push({ kind: "supertype-changed", rating: ratings.supertype, ...names(a, b) });
  }
  const [oldType, newType] = [findTypeDefinition(sides.before, old.key), findTypeDefinition(sides.after, now.key)];
  if (mapped(sides, oldType) !== newType) {
    const rating = isNarrower(sides, mapped(sides, oldType), newType)
      ? ratings.typeDefinitionNarrower
      : ratings.typeDefinition;
    found.push({ kind: "type-definition-changed", rating, ...names(oldType, newType) });
  }
  const [oldRule, newRule] = [findModellingRule(sides.before, old.key), findModellingRule(sides.after, now.key)];
  if (oldRule !== newRule) {
    const { Mandatory, MandatoryPlaceholder, Optional } = StandardModellingRule;
    const rating =
      newRule === Mandatory || newRule === MandatoryPlaceholder
        ? ratings.toMandatory
        : newRule === Optional && oldRule === Mandatory
          ? ratings.toOptional
          : ratings.otherRule;
    found.push({ kind: "modelling-rule-changed", rating, ...names(oldRule, newRule) });
  }
  if (isAbstract(old) !== isAbstract(now)) {
    const rating = isAbstract(now) ? ratings.toAbstract : ratings.toConcrete;
    found.push({ kind: "abstract-changed", rating, before: String(isAbstract(old)), after: String(isAbstract(now)) });
  }
  if (
    old.nodeClass === "ReferenceType" &&
    now.nodeClass === "ReferenceType" &&
    (old.symmetric ?? false) !== (now.symmetric ?? false)
  ) {
    found.push({
      kind: "symmetric-changed",
      rating: ratings.symmetric,
      before: String(old.symmetric ?? false),
      after: String(now.symmetric ?? false),
    });
  }
  return found;
}

/** Whether the new type is below the old one and asks for no further mandatory member (OPC 11030 §3.2.13). */
function isNarrower(sides: Sides, oldType: NodeKey | undefined, newType: NodeKey | undefined): boolean {
  if (oldType === undefined || newType === undefined || !isSubtypeOf(sides.after, newType, oldType)) return false;
  for (let at = newType; at !== oldType;) {
    const demands = listMembers(sides.after, at).some(
      (m) => findModellingRule(sides.after, m.key) === StandardModellingRule.Mandatory,
    );
    const next = findSupertype(sides.after, at);
    if (demands || next === undefined) return false;
    at = next;
  }
  return true;
}

function compareValues(sides: Sides, { before: old, after: now }: NodePair): Difference[] {
  if (!hasValueAttributes(old) || !hasValueAttributes(now)) return [];
  const found: Difference[] = [];
  const [oldData, newData] = [getDataType(old), getDataType(now)];
  if (mapped(sides, oldData) !== newData) {
    found.push({
      kind: "data-type-changed",
      rating: ratings.dataType,
      before: nameOf(sides.before, oldData),
      after: nameOf(sides.after, newData),
    });
  }
  const rankOf = (n: typeof old): string => `${getValueRank(n)}${n.arrayDimensions ? ` [${n.arrayDimensions}]` : ""}`;
  if (rankOf(old) !== rankOf(now)) {
    found.push({ kind: "value-rank-changed", rating: ratings.valueRank, before: rankOf(old), after: rankOf(now) });
  }
  found.push(...compareUnits(sides, old.key, now.key), ...compareRanges(sides, old.key, now.key));
  if (
    !isFactProperty(now.browseName.name) &&
    !isVersionProperty(sides.after, now) &&
    !isSameXml(old.value, now.value)
  ) {
    found.push({
      kind: "value-changed",
      rating: ratings.value,
      before: formatValueText(old),
      after: formatValueText(now),
    });
  }
  if (old.nodeClass === "Variable" && now.nodeClass === "Variable") {
    const [a, b] = [getAccessLevel(old), getAccessLevel(now)];
    // Bits 0 … 3: read, write, history read, history write (OPC 10000-3 §8.57); a bit that is gone refuses a client.
    const rating = a & ~b & 0x0f ? ratings.accessNarrowed : ratings.accessWidened;
    if (a !== b) found.push({ kind: "access-changed", rating, before: String(a), after: String(b) });
  }
  return found;
}

/** The metadata object repeats the version of the Models table (OPC 10000-5 §6.3.13); it is told once, there. */
function isVersionProperty(space: AddressSpace, node: Node): boolean {
  const names = ["NamespaceVersion", "NamespacePublicationDate", "ModelVersion"];
  const parent = names.includes(node.browseName.name) ? findParent(space, node.key) : undefined;
  return parent !== undefined && findTypeDefinition(space, parent) === StandardType.NamespaceMetadataType;
}

function compareUnits(sides: Sides, oldKey: NodeKey, newKey: NodeKey): Difference[] {
  const [old, now] = [findUnit(sides.before, oldKey), findUnit(sides.after, newKey)];
  if (formatUnit(old) === formatUnit(now) && old?.name === now?.name && old?.namespaceUri === now?.namespaceUri)
    return [];
  const isSameUnit = old?.unitId === now?.unitId && old?.namespaceUri === now?.namespaceUri;
  const rating = isSameUnit ? ratings.unitText : old === undefined ? ratings.unitAdded : ratings.unit;
  return [{ kind: "unit-changed", rating, before: formatUnit(old), after: formatUnit(now) }];
}

function compareRanges(sides: Sides, oldKey: NodeKey, newKey: NodeKey): Difference[] {
  return RANGES.flatMap((name): Difference[] => {
    const [old, now] = [findRange(sides.before, oldKey, name), findRange(sides.after, newKey, name)];
    if (old === now) return [];
    return [{ kind: "range-changed", detail: name, rating: ratings.range, before: old ?? null, after: now ?? null }];
  });
}

function compareTexts({ before: old, after: now }: NodePair): Difference[] {
  const found: Difference[] = [];
  const compare = (detail: string, a: string | null, b: string | null): void => {
    if (a !== b) found.push({ kind: "text-changed", detail, rating: ratings.text, before: a, after: b });
  };
  // A new BrowseName brings its DisplayName along; that is told once, as a new name.
  const isRenamed = formatQualifiedName(old.browseName) !== formatQualifiedName(now.browseName);
  if (!isRenamed) compare("DisplayName", formatTexts(old.displayName), formatTexts(now.displayName));
  compare("Description", formatTexts(old.description), formatTexts(now.description));
  compare("Documentation", old.documentation ?? null, now.documentation ?? null);
  if (old.nodeClass === "ReferenceType" && now.nodeClass === "ReferenceType") {
    compare("InverseName", formatTexts(old.inverseName), formatTexts(now.inverseName));
  }
  if (!isRenamed && old.symbolicName !== now.symbolicName) {
    found.push({
      kind: "symbolic-name-changed",
      rating: ratings.symbolicName,
      before: old.symbolicName ?? null,
      after: now.symbolicName ?? null,
    });
  }
  return found;
}

/** Attributes that no reader's program depends on, each by name. */
const PLAIN_ATTRIBUTES = [
  "category",
  "writeMask",
  "userWriteMask",
  "designToolOnly",
  "eventNotifier",
  "containsNoLoops",
  "minimumSamplingInterval",
  "historizing",
  "executable",
  "userExecutable",
  "methodDeclaration",
  "purpose",
] as const;

function compareRest({ before: old, after: now }: NodePair): Difference[] {
  const found: Difference[] = [];
  const textOf = (value: unknown): string | null =>
    value === undefined ? null : typeof value === "string" ? value : JSON.stringify(value);
  const compare = (
    kind: Difference["kind"],
    detail: string,
    a: unknown,
    b: unknown,
    rating: Difference["rating"],
  ): void => {
    const [left, right] = [textOf(a), textOf(b)];
    if (left !== right) found.push({ kind, detail, rating, before: left, after: right });
  };
  compare(
    "release-status-changed",
    "ReleaseStatus",
    old.releaseStatus ?? "Released",
    now.releaseStatus ?? "Released",
    ratings.releaseStatus,
  );
  compare(
    "permissions-changed",
    "AccessRestrictions",
    old.accessRestrictions,
    now.accessRestrictions,
    ratings.permissions,
  );
  compare("permissions-changed", "RolePermissions", old.rolePermissions, now.rolePermissions, ratings.permissions);
  for (const name of PLAIN_ATTRIBUTES)
    compare("attribute-changed", name, attribute(old, name), attribute(now, name), ratings.attribute);
  return found;
}

function attribute(node: Node, name: (typeof PLAIN_ATTRIBUTES)[number]): unknown {
  return (node as unknown as Readonly<Record<string, unknown>>)[name];
}

/** References told elsewhere: ownership, types and rules are facts of the node. */
export const toldElsewhere: ReadonlySet<NodeKey> = new Set([
  StandardReferenceType.HasTypeDefinition,
  StandardReferenceType.HasModellingRule,
  StandardReferenceType.HasSubtype,
]);
