/**
 * Other NodeIds for nodes that have one already, by a rule, before anybody renumbers: `proposeNodeIds`; what stands against
 * them: `checkProposals`; and where a NodeId is used beside references, which name keys: `listNodeIdUses`.
 */
import type { AddressSpace } from "../address-space/address-space";
import { findModellingRule, findParent } from "../address-space/browse";
import { hasValueAttributes, isTypeNode, type Node, type NodeClass } from "../address-space/node";
import {
  formatNodeId,
  isNullNodeId,
  MAX_NUMERIC_IDENTIFIER,
  numericNodeId,
  toNodeKey,
  type NodeId,
  type NodeKey,
} from "../address-space/node-id";
import { getOwnNamespace } from "../address-space/model-header";
import type { IdRange, PathSeparator } from "../address-space/id-policy";
import { problem, type Problem } from "../core/result";
import { escapeText } from "../nodeset/xml/escape";

export type ProposalRule =
  | { readonly kind: "numbers"; readonly from: number }
  /** Each class from the start of its own range; classes without one stay. */
  | { readonly kind: "ranges"; readonly ranges: Readonly<Partial<Record<NodeClass, IdRange>>> }
  /** The names from the topmost own node down; types and what stands in them stay. */
  | { readonly kind: "paths"; readonly separator: PathSeparator };

/** In the order of `nodes`; NodeIds of nodes outside of them are left out. Nodes for which the rule has none are missing. */
export function proposeNodeIds(
  space: AddressSpace,
  nodes: readonly Node[],
  rule: ProposalRule,
): ReadonlyMap<NodeKey, NodeId> {
  const moving = new Set(nodes.map((node) => node.key));
  const given = new Set<string>();
  const isFree = (id: NodeId, key: NodeKey): boolean => {
    const holder = space.findByNodeId(id) ?? space.getNode(toNodeKey(id));
    return !given.has(formatNodeId(id)) && (!holder || holder.key === key || moving.has(holder.key));
  };
  const counters = new Map<string, number>();
  const proposals = new Map<NodeKey, NodeId>();
  for (const node of nodes) {
    const id =
      rule.kind === "paths"
        ? findPath(space, node, rule.separator, isFree)
        : findNumber(space, node, rule, counters, isFree);
    if (!id) continue;
    given.add(formatNodeId(id));
    proposals.set(node.key, id);
  }
  return proposals;
}

type IsFree = (id: NodeId, key: NodeKey) => boolean;

function findNumber(
  space: AddressSpace,
  node: Node,
  rule: Exclude<ProposalRule, { kind: "paths" }>,
  counters: Map<string, number>,
  isFree: IsFree,
): NodeId | undefined {
  const range = rule.kind === "numbers" ? { from: rule.from, to: MAX_NUMERIC_IDENTIFIER } : rule.ranges[node.nodeClass];
  if (!range) return undefined;
  const counter = rule.kind === "numbers" ? "" : node.nodeClass;
  for (let next = counters.get(counter) ?? range.from; next <= range.to; next++) {
    const id = numericNodeId(getOwnNamespace(space.own.header), next);
    if (!isFree(id, node.key)) continue;
    counters.set(counter, next + 1);
    return id;
  }
  counters.set(counter, range.to + 1);
  return undefined;
}

const MAX_SUFFIX = 10_000;

function findPath(space: AddressSpace, node: Node, separator: string, isFree: IsFree): NodeId | undefined {
  const names: string[] = [];
  const seen = new Set<NodeKey>();
  for (let at: Node | undefined = node; at && space.isOwn(at.key) && !seen.has(at.key);) {
    if (isTypeNode(at) || findModellingRule(space, at.key) !== undefined) return undefined;
    seen.add(at.key);
    names.unshift(at.browseName.name);
    const parent: NodeKey | undefined = findParent(space, at.key);
    at = parent === undefined ? undefined : space.getNode(parent);
  }
  // Nodes that the standard names, such as encodings, stand below a type in their own way.
  if (names.length === 0) return undefined;
  const path = names.join(separator);
  for (let suffix = 1; suffix <= MAX_SUFFIX; suffix++) {
    const identifier = suffix === 1 ? path : `${path}_${suffix}`;
    const id: NodeId = { namespaceUri: getOwnNamespace(space.own.header), type: "s", identifier };
    if (isFree(id, node.key)) return id;
  }
  return undefined;
}

/** OPC 10000-3 §8.2.4: a String identifier has at most 4096 characters. */
const MAX_IDENTIFIER = 4096;

/** What stands against each change. Problems: `operation.node-id-taken`, `renumber.twice`, `renumber.null`, `renumber.length`. */
export function checkProposals(
  space: AddressSpace,
  changes: ReadonlyMap<NodeKey, NodeId>,
): ReadonlyMap<NodeKey, Problem> {
  const found = new Map<NodeKey, Problem>();
  const first = new Map<string, NodeKey>();
  for (const [key, id] of changes) {
    const text = formatNodeId(id);
    const holder = space.findByNodeId(id) ?? space.getNode(toNodeKey(id));
    const other = first.get(text);
    if (isNullNodeId(id) || id.identifier === 0 || id.identifier === "")
      found.set(key, problem("renumber.null", undefined, { node: key }));
    else if (typeof id.identifier === "string" && id.identifier.length > MAX_IDENTIFIER)
      found.set(key, problem("renumber.length", { limit: MAX_IDENTIFIER }, { node: key }));
    else if (other !== undefined) found.set(key, problem("renumber.twice", { node: other }, { node: key }));
    else if (holder && holder.key !== key && !changes.has(holder.key))
      found.set(key, problem("operation.node-id-taken", { nodeId: text }, { node: holder.key }));
    first.set(text, key);
  }
  return found;
}

/** Own nodes whose value names the NodeId of each of the nodes; nodes that no value names are missing. */
export function listNodeIdUses(space: AddressSpace, keys: Iterable<NodeKey>): ReadonlyMap<NodeKey, readonly NodeKey[]> {
  const byText = new Map<string, NodeKey>();
  for (const key of keys) {
    const node = space.getNode(key);
    if (node) byText.set(escapeText(formatNodeId(node.nodeId)), key);
  }
  const uses = new Map<NodeKey, NodeKey[]>();
  for (const node of space.listOwnNodes()) {
    if (!hasValueAttributes(node) || !node.value?.xml.includes("Identifier")) continue;
    for (const [, text] of node.value.xml.matchAll(/<(?:[\w.-]+:)?Identifier(?:\s[^<>]*)?>([^<]*)</g)) {
      const used = byText.get((text ?? "").trim());
      if (used === undefined) continue;
      const list = uses.get(used) ?? [];
      if (!list.includes(node.key)) uses.set(used, [...list, node.key]);
    }
  }
  return uses;
}
