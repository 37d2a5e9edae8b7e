/**
 * Merges two states of a model that began as the same one, by meaning: attribute by attribute, edge by edge, node by node.
 * What only one side changed is taken; where both changed the same thing in different ways there is a conflict, and our
 * side holds until somebody chooses. Nothing that either side did is left out without being listed.
 */
import type { AddressSpace } from "../../address-space/address-space";
import { getPath } from "../../address-space/browse";
import type { DeclaredReference, Node } from "../../address-space/node";
import { formatNodeId, type NodeKey } from "../../address-space/node-id";
import { problem, type Problem } from "../../core/result";
import { ConflictList, conflictId, formatSide, type MergeChoices, type MergeConflict } from "./merge-conflict";
import { mergeEdges } from "./merge-edges";
import { mergeHeaders } from "./merge-header";
import { mergeMappings } from "./merge-mappings";
import { mergePresence, type MergeInput } from "./merge-presence";
import {
  isSameJson,
  listAttributeNames,
  readAttribute,
  toEdge,
  toEdgeId,
  toState,
  type ModelState,
  type PlacedEdge,
} from "./model-state";

export type MergedModel = {
  readonly state: ModelState;
  readonly conflicts: readonly MergeConflict[];
  /** `merge.node-id-twice`: both sides gave one NodeId to different nodes; one must be renumbered first. */
  readonly problems: readonly Problem[];
};

/** `base` is the state that both began with. Keys join the nodes: both sides must come from that state. */
export function mergeModels(
  base: AddressSpace,
  ours: AddressSpace,
  theirs: AddressSpace,
  choices: MergeChoices = new Map(),
): MergedModel {
  const conflicts = new ConflictList(choices);
  const input: MergeInput = {
    spaces: { base, ours, theirs },
    base: toState(base),
    ours: toState(ours),
    theirs: toState(theirs),
    conflicts,
    pathOf: (key) => getPath([ours, theirs, base].find((s) => s.isOwn(key)) ?? ours, key),
  };
  const presence = mergePresence(input);
  const edges = mergeEdges(input, presence);
  const byNode = groupByDeclaringNode(edges);
  const nodes = new Map<NodeKey, Node>();
  for (const key of presence.kept) {
    const remover = presence.overruled.get(key);
    nodes.set(key, mergeNode(input, key, remover, byNode.get(key) ?? []));
  }
  const header = mergeHeaders(input.base.header, input.ours.header, input.theirs.header, conflicts);
  const mapping = mergeMappings(input);
  return { state: { header, nodes, mapping }, conflicts: conflicts.found, problems: findTwice(nodes, input) };
}

function groupByDeclaringNode(edges: ReadonlyMap<string, PlacedEdge>): Map<NodeKey, Set<string>[]> {
  const groups = new Map<NodeKey, Set<string>[]>();
  const add = (key: NodeKey, id: string, isForward: boolean): void => {
    const sets = groups.get(key) ?? [new Set<string>(), new Set<string>()];
    sets[isForward ? 0 : 1]?.add(id);
    groups.set(key, sets);
  };
  for (const [id, { edge, atSource, atTarget }] of edges) {
    if (atSource) add(edge.source, id, true);
    if (atTarget) add(edge.target, id, false);
  }
  return groups;
}

function mergeNode(
  input: MergeInput,
  key: NodeKey,
  remover: "ours" | "theirs" | undefined,
  edges: readonly Set<string>[],
): Node {
  const base = input.base.nodes.get(key);
  const ours = input.ours.nodes.get(key) ?? (remover === "ours" ? base : undefined);
  const theirs = input.theirs.nodes.get(key) ?? (remover === "theirs" ? base : undefined);
  const only = ours && theirs ? undefined : (ours ?? theirs ?? base);
  const merged = only ?? mergeAttributes(input, key, base, ours as Node, theirs as Node);
  return { ...merged, references: mergeReferences(key, [ours, theirs, base], edges) };
}

function mergeAttributes(input: MergeInput, key: NodeKey, base: Node | undefined, ours: Node, theirs: Node): Node {
  // The class is part of a node's identity; a change of it in place comes from an import and counts as one.
  if (ours.nodeClass !== theirs.nodeClass) return chooseNode(input, key, base, ours, theirs);
  const merged: Record<string, unknown> = { key, nodeClass: ours.nodeClass };
  for (const name of listAttributeNames(ours, theirs, base)) {
    const value = mergeAttribute(input, key, name, base, ours, theirs);
    if (value !== undefined) merged[name] = value;
  }
  return { ...merged, references: [] } as unknown as Node;
}

function mergeAttribute(
  input: MergeInput,
  key: NodeKey,
  name: string,
  base: Node | undefined,
  ours: Node,
  theirs: Node,
): unknown {
  const [b, o, t] = [base, ours, theirs].map((node) => readAttribute(node, name));
  if (isSameJson(o, t) || isSameJson(b, t)) return o;
  if (isSameJson(b, o)) return t;
  // The place in the file is layout, and the owner is told with the reference that makes it one.
  if (name === "order") return o;
  const owner = name === "parent" ? input.conflicts.choiceOf(conflictId("reference", key, "owner")) : undefined;
  if (owner) return owner === "ours" ? o : t;
  const chosen = input.conflicts.decide({
    id: conflictId("attribute", key, name),
    key,
    path: input.pathOf(key),
    what: name,
    base: describe(name, b),
    ours: describe(name, o),
    theirs: describe(name, t),
  });
  return chosen === "ours" ? o : t;
}

function describe(name: string, value: unknown): string | null {
  if (name === "nodeId" && value !== undefined) return formatNodeId(value as Node["nodeId"]);
  return formatSide(value);
}

function chooseNode(input: MergeInput, key: NodeKey, base: Node | undefined, ours: Node, theirs: Node): Node {
  const chosen = input.conflicts.decide({
    id: conflictId("attribute", key, "nodeClass"),
    key,
    path: input.pathOf(key),
    what: "nodeClass",
    base: base?.nodeClass ?? null,
    ours: ours.nodeClass,
    theirs: theirs.nodeClass,
  });
  return chosen === "ours" ? ours : theirs;
}

/** The declarations that the merged edges ask for, in our order, theirs behind; those that are no edges as either has them. */
function mergeReferences(
  key: NodeKey,
  sources: readonly (Node | undefined)[],
  wanted: readonly Set<string>[],
): DeclaredReference[] {
  const [forward = new Set<string>(), inverse = new Set<string>()] = wanted;
  const [ours, theirs, base] = sources;
  const seen = new Set<string>();
  const merged: DeclaredReference[] = [];
  const first = sources.findIndex((node) => node !== undefined);
  for (const [index, node] of sources.entries()) {
    for (const reference of node?.references ?? []) {
      const edge = toEdge(key, reference);
      const id = edge ? toEdgeId(edge) : JSON.stringify(reference);
      const mark = `${reference.isForward ? ">" : "<"}${id}`;
      const isWanted = edge
        ? (reference.isForward ? forward : inverse).has(id)
        : isWantedElsewhere(reference, ours, theirs, base);
      if (!isWanted || (seen.has(mark) && index !== first)) continue;
      seen.add(mark);
      merged.push(reference);
    }
  }
  return merged;
}

/** A reference to another server, three ways. */
function isWantedElsewhere(reference: DeclaredReference, ...sides: readonly (Node | undefined)[]): boolean {
  const [ours, theirs, base] = sides.map((node) => node?.references.some((r) => isSameJson(r, reference)) === true);
  return base ? ours === true && theirs === true : ours === true || theirs === true;
}

function findTwice(nodes: ReadonlyMap<NodeKey, Node>, { pathOf }: MergeInput): Problem[] {
  const holders = new Map<string, NodeKey>();
  const problems: Problem[] = [];
  for (const node of nodes.values()) {
    const id = formatNodeId(node.nodeId);
    const first = holders.get(id);
    if (first === undefined) holders.set(id, node.key);
    else {
      const data = { nodeId: id, first: pathOf(first), second: pathOf(node.key) };
      problems.push(problem("merge.node-id-twice", data, { node: node.key }));
    }
  }
  return problems;
}
