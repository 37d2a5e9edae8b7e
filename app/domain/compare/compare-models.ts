/**
 * The comparison of two states of a model by meaning. Both are address spaces, so that each resolves names and types in
 * its own required models. What was added or removed as a whole is told once, at its topmost node.
 */
import type { AddressSpace, Edge } from "../address-space/address-space";
import { findModellingRule, findParent, getPath, listEdgesFrom } from "../address-space/browse";
import type { ModelEntry } from "../address-space/model-header";
import { isTypeNode, type Node } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { StandardModellingRule, StandardReferenceType } from "../address-space/standard-ids";
import { collectSubtypes, isHierarchical } from "../address-space/type-hierarchy";
import type { Change, ChangeKind, ChangeRating, Comparison } from "./change";
import type { Difference } from "./compare-data-types";
import { compareMappings } from "./compare-mappings";
import { compareNodes, isFactProperty, toldElsewhere, type Sides } from "./compare-nodes";
import { nameOf } from "./describe-facts";
import { findTouched } from "./find-touched";
import { matchNodes, type NodePair } from "./match-nodes";
import { proposeVersion } from "./propose-version";
import { ratings, type Rating } from "./ratings";

export function compareModels(before: AddressSpace, after: AddressSpace): Comparison {
  const match = matchNodes(before, after);
  const sides: Sides = { before, after, match };
  const changes: Change[] = [];
  const tell = (space: AddressSpace, node: Node, difference: Difference): void => {
    changes.push(toChange(space, node, difference));
  };

  const addedKeys = new Set(match.added.map((n) => n.key));
  const removedKeys = new Set(match.removed.map((n) => n.key));
  for (const { before: old, after: now } of match.reused) {
    const [left, right] = [getPath(before, old.key), getPath(after, now.key)];
    tell(after, now, { kind: "id-reused", rating: ratings.idReused, before: left, after: right });
  }
  const replaced = new Set(match.reused.flatMap((pair) => [pair.before, pair.after]));
  for (const node of match.removed) {
    if (replaced.has(node) || isPartOf(before, node, removedKeys) || isFactOf(before, node)) continue;
    const count = countBelow(before, node.key, removedKeys);
    tell(before, node, {
      kind: removedKind(before, node),
      rating: ratings.removed,
      before: describe(before, node, count),
      after: null,
    });
  }
  for (const node of match.added) {
    if (replaced.has(node) || isPartOf(after, node, addedKeys) || isFactOf(after, node)) continue;
    const count = countBelow(after, node.key, addedKeys);
    tell(after, node, { ...rateAddition(after, node), before: null, after: describe(after, node, count) });
  }
  const touched = findTouched(before, after, match);
  const pairs = touched ? match.pairs.filter((pair) => touched.has(pair.after.key)) : match.pairs;
  for (const pair of pairs) {
    for (const difference of compareNodes(sides, pair)) tell(after, pair.after, difference);
  }
  compareReferences(sides, pairs, addedKeys, removedKeys, tell);
  changes.push(...compareHeaders(before, after), ...compareMappings(before, after, match.toAfter));
  changes.sort(byRatingThenPath);
  const rating = changes[0]?.rating;
  const entry = before.own.header.models[0];
  return { changes, rating, proposedVersion: proposeVersion(entry?.modelVersion ?? entry?.version, rating) };
}

function toChange(space: AddressSpace, node: Node, { rating, ...difference }: Difference): Change {
  return { ...difference, ...rating, key: node.key, nodeId: formatNodeId(node.nodeId), path: getPath(space, node.key) };
}

const RANK: Readonly<Record<ChangeRating, number>> = { breaking: 0, additive: 1, neutral: 2 };

function byRatingThenPath(a: Change, b: Change): number {
  return (
    RANK[a.rating] - RANK[b.rating] ||
    compareTexts(a.path, b.path) ||
    compareTexts(a.kind, b.kind) ||
    compareTexts(a.detail ?? "", b.detail ?? "")
  );
}

function compareTexts(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}

/** Whether the owner came or went too; then the owner tells it. A subtype stands for itself. */
function isPartOf(space: AddressSpace, node: Node, keys: ReadonlySet<NodeKey>): boolean {
  if (isTypeNode(node)) return false;
  const parent = findParent(space, node.key);
  if (parent !== undefined) return keys.has(parent);
  return space.edgesTo(node.key).some((e) => e.type === StandardReferenceType.HasEncoding && keys.has(e.source));
}

/** EURange, units, arguments and the like are told as facts of their owner. */
function isFactOf(space: AddressSpace, node: Node): boolean {
  if (node.nodeClass !== "Variable" || !isFactProperty(node.browseName.name)) return false;
  return space.edgesTo(node.key).some((e) => e.type === StandardReferenceType.HasProperty);
}

function countBelow(space: AddressSpace, key: NodeKey, keys: ReadonlySet<NodeKey>): number {
  const found = new Set<NodeKey>([key]);
  for (const at of found) {
    for (const edge of listEdgesFrom(space, at, StandardReferenceType.HierarchicalReferences)) {
      if (edge.type !== StandardReferenceType.HasSubtype && keys.has(edge.target)) found.add(edge.target);
    }
  }
  return found.size - 1;
}

function describe(space: AddressSpace, node: Node, below: number): string {
  const rule = nameOf(space, findModellingRule(space, node.key));
  return [node.nodeClass, rule ?? "", below > 0 ? `with ${below} below it` : ""].filter(Boolean).join(", ");
}

function isBelowType(space: AddressSpace, node: Node): boolean {
  const seen = new Set<NodeKey>();
  for (let at = findParent(space, node.key); at !== undefined && !seen.has(at); at = findParent(space, at)) {
    seen.add(at);
    const owner = space.getNode(at);
    if (owner && isTypeNode(owner)) return true;
  }
  return false;
}

function removedKind(space: AddressSpace, node: Node): ChangeKind {
  if (isTypeNode(node)) return "type-removed";
  return isBelowType(space, node) ? "member-removed" : "instance-removed";
}

function rateAddition(space: AddressSpace, node: Node): { kind: ChangeKind; rating: Rating } {
  if (node.nodeClass === "DataType") return { kind: "type-added", rating: ratings.dataTypeAdded };
  if (node.nodeClass === "ReferenceType") return { kind: "type-added", rating: ratings.referenceTypeAdded };
  if (isTypeNode(node)) return { kind: "type-added", rating: ratings.typeAdded };
  if (!isBelowType(space, node)) return { kind: "instance-added", rating: ratings.instanceAdded };
  const rule = findModellingRule(space, node.key);
  const { Mandatory, MandatoryPlaceholder } = StandardModellingRule;
  if (rule === Mandatory || rule === MandatoryPlaceholder)
    return { kind: "member-added", rating: ratings.mandatoryAdded };
  return { kind: "member-added", rating: rule === undefined ? ratings.declaredAdded : ratings.optionalAdded };
}

type Tell = (space: AddressSpace, node: Node, difference: Difference) => void;

/** References between nodes that both states have; ownership is told as "moved", the rest by reference type. */
function compareReferences(sides: Sides, pairs: readonly NodePair[], added: ReadonlySet<NodeKey>, removed: ReadonlySet<NodeKey>, tell: Tell): void {
  const { before, after, match } = sides;
  const events = collectSubtypes(after, StandardReferenceType.GeneratesEvent);
  for (const { before: old, after: now } of pairs) {
    const isTold = (space: AddressSpace, edge: Edge, gone: ReadonlySet<NodeKey>): boolean =>
      toldElsewhere.has(edge.type) || gone.has(edge.target) || gone.has(edge.type) || isOwnership(space, edge);
    const left = before.edgesFrom(old.key).filter((e) => !isTold(before, e, removed));
    const right = after.edgesFrom(now.key).filter((e) => !isTold(after, e, added));
    const idOf = (type: NodeKey, target: NodeKey): string => `${type}\n${target}`;
    const leftIds = new Set(left.map((e) => idOf(match.toAfter(e.type), match.toAfter(e.target))));
    const rightIds = new Set(right.map((e) => idOf(e.type, e.target)));
    for (const edge of left) {
      if (rightIds.has(idOf(match.toAfter(edge.type), match.toAfter(edge.target)))) continue;
      const rating = events.has(edge.type) ? ratings.eventRemoved : ratings.referenceRemoved;
      tell(after, now, {
        kind: "reference-removed",
        ...describeEdge(before, edge),
        rating,
        before: nameOf(before, edge.target),
        after: null,
      });
    }
    for (const edge of right) {
      if (leftIds.has(idOf(edge.type, edge.target))) continue;
      const rating =
        edge.type === StandardReferenceType.HasInterface
          ? rateInterface(after, now.key, edge.target)
          : ratings.referenceAdded;
      tell(after, now, {
        kind: "reference-added",
        ...describeEdge(after, edge),
        rating,
        before: null,
        after: nameOf(after, edge.target),
      });
    }
  }
}

function isOwnership(space: AddressSpace, edge: Edge): boolean {
  return isHierarchical(space, edge.type) && findParent(space, edge.target) === edge.source;
}

function describeEdge(space: AddressSpace, edge: Edge): { detail: string } {
  return { detail: `${nameOf(space, edge.type) ?? edge.type} → ${nameOf(space, edge.target) ?? edge.target}` };
}

/** An interface is additive only where the type has all its mandatory members as mandatory ones (OPC 11030 §3.2.3). */
function rateInterface(space: AddressSpace, type: NodeKey, interfaceType: NodeKey): Rating {
  const mandatoryNames = (owner: NodeKey): Set<string> =>
    new Set(
      listEdgesFrom(space, owner, StandardReferenceType.Aggregates)
        .filter((e) => findModellingRule(space, e.target) === StandardModellingRule.Mandatory)
        .map((e) => space.getNode(e.target)?.browseName.name ?? e.target),
    );
  const own = mandatoryNames(type);
  return [...mandatoryNames(interfaceType)].every((name) => own.has(name))
    ? ratings.interfaceAdded
    : ratings.interfaceIncomplete;
}

function compareHeaders(before: AddressSpace, after: AddressSpace): Change[] {
  const [old, now] = [before.own.header.models[0], after.own.header.models[0]];
  const path = now?.modelUri ?? old?.modelUri ?? "";
  const changes: Change[] = [];
  const tell = (kind: ChangeKind, detail: string, rating: Rating, a: string | null, b: string | null): void => {
    if (a !== b) changes.push({ kind, path, detail, ...rating, before: a, after: b });
  };
  tell("model-version-changed", "Version", ratings.modelVersion, versionOf(old), versionOf(now));
  const requiredUris = new Set([...(old?.requiredModels ?? []), ...(now?.requiredModels ?? [])].map((m) => m.modelUri));
  for (const uri of requiredUris) {
    const find = (entry: ModelEntry | undefined): ModelEntry | undefined =>
      entry?.requiredModels.find((m) => m.modelUri === uri);
    const [a, b] = [find(old), find(now)];
    const rating = !a
      ? ratings.requiredModelAdded
      : !b
        ? ratings.requiredModelDropped
        : isLater(a, b)
          ? ratings.requiredModelRaised
          : ratings.requiredModelLowered;
    tell("required-model-changed", uri, rating, versionOf(a), versionOf(b));
  }
  return changes;
}

function versionOf(entry: ModelEntry | undefined): string | null {
  if (!entry) return null;
  return (
    [entry.modelVersion ?? entry.version ?? "", entry.publicationDate?.slice(0, 10) ?? ""]
      .filter(Boolean)
      .join(" of ") || "no version"
  );
}

function isLater(a: ModelEntry, b: ModelEntry): boolean {
  return (b.publicationDate ?? "") >= (a.publicationDate ?? "");
}
