/**
 * The way back from source text: the operations that make the own model what an edited NodeSet2 text says.
 *
 * Both sides of the comparison have been through writer and reader, so that nothing differs but what was edited. Nodes are
 * told by their NodeId and keep their keys; another NodeId is another node. The order of nodes and of references in the text
 * is not taken over: it means nothing (OPC 10000-6 §F.1).
 */
import { listUses, type AddressSpace, type Edge } from "../address-space/address-space";
import type { ModelHeader } from "../address-space/model-header";
import type { DeclaredReference, Node } from "../address-space/node";
import { formatNodeId, parseNodeKey, type NodeKey } from "../address-space/node-id";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import type { NodeSetContent } from "../nodeset/nodeset-content";
import { readNodeSet } from "../nodeset/read-nodeset";
import { writeNodeSet } from "../nodeset/write-nodeset";
import { applyOperation } from "./apply-operation";
import type { AttributeName, DeclaredAt, Operation } from "./operation";

export type TextDifference = {
  readonly operations: readonly Operation[];
  readonly added: readonly NodeKey[];
  readonly removed: readonly NodeKey[];
  readonly changed: readonly NodeKey[];
  /** The model as the text says it. */
  readonly space: AddressSpace;
};

type Content = Pick<NodeSetContent, "header" | "nodes">;

/**
 * Operations in an order in which each applies; none when nothing was edited. Problems: `source-text.class-changed`,
 * `source-text.reference-kind`, `source-text.node-twice`, and those of the operations, at the node that they concern.
 */
export function diffToOperations(space: AddressSpace, content: Content): Result<TextDifference> {
  const written = readNodeSet(
    writeNodeSet(
      { header: space.own.header, nodes: space.listOwnNodes() },
      { findNodeId: (key) => space.getNode(key)?.nodeId },
    ).xml,
  );
  if (!written.ok) return written;
  const keys = new KeyMap(space);
  const before = indexNodes(written.value.nodes.map((node) => keys.toSpace(node)));
  const after = indexNodes(content.nodes.map((node) => keys.toSpace(node)));
  const problems = [...findTwins(content.nodes), ...findChangedClasses(before, after)];
  if (problems.length > 0) return fail(...problems);
  const plan = new Plan(space);
  const added = [...after.values()].filter((node) => !before.has(node.key));
  const removed = [...before.values()].filter((node) => !after.has(node.key));
  diffHeader(plan, written.value.header, content.header, keys);
  const edges = diffEdges(before, after);
  for (const node of added) plan.addNode(node, edges);
  for (const node of after.values()) diffAttributes(plan, before.get(node.key), node);
  for (const edge of edges) if (edge.isThere) plan.removeEdge(edge, after);
  for (const edge of edges) if (edge.places) plan.addEdge(edge);
  plan.removeNodes(removed.map((node) => node.key));
  if (plan.problems.length > 0) return fail(...plan.problems);
  const isNew = new Set(added.map((node) => node.key));
  return ok({
    operations: plan.operations,
    added: [...isNew],
    removed: removed.map((node) => node.key),
    changed: [...plan.touched].filter((key) => !isNew.has(key) && after.has(key)),
    space: plan.space,
  });
}

/** A text names nodes by NodeIds; the model knows some of them under other keys. */
class KeyMap {
  readonly #space: AddressSpace;
  readonly #known = new Map<NodeKey, NodeKey>();

  constructor(space: AddressSpace) {
    this.#space = space;
  }

  find(key: NodeKey): NodeKey {
    let found = this.#known.get(key);
    if (found === undefined) {
      found = this.#space.findByNodeId(parseNodeKey(key))?.key ?? key;
      this.#known.set(key, found);
    }
    return found;
  }

  toSpace(node: Node): Node {
    return replaceKeys(
      {
        ...node,
        references: node.references.map((r) => ({ ...r, type: this.find(r.type), target: this.find(r.target) })),
      },
      this,
    );
  }
}

/** Every attribute that names nodes. */
function replaceKeys(node: Node, keys: KeyMap): Node {
  const changed: Record<string, unknown> = { ...node, key: keys.find(node.key) };
  for (const name of ["parent", "dataType", "methodDeclaration"]) {
    if (typeof changed[name] === "string") changed[name] = keys.find(changed[name] as NodeKey);
  }
  if (node.rolePermissions)
    changed.rolePermissions = node.rolePermissions.map((r) => ({ ...r, role: keys.find(r.role) }));
  if (node.nodeClass === "DataType" && node.definition) {
    const fields = node.definition.fields.map((field) =>
      field.dataType === undefined ? field : { ...field, dataType: keys.find(field.dataType) },
    );
    changed.definition = { ...node.definition, fields };
  }
  return changed as unknown as Node;
}

function indexNodes(nodes: readonly Node[]): Map<NodeKey, Node> {
  return new Map(nodes.map((node) => [node.key, node]));
}

function findTwins(nodes: readonly Node[]): Problem[] {
  const seen = new Set<NodeKey>();
  return nodes.flatMap(({ key, nodeId }) => {
    if (seen.has(key)) return [problem("source-text.node-twice", { nodeId: formatNodeId(nodeId) }, { node: key })];
    seen.add(key);
    return [];
  });
}

function findChangedClasses(before: ReadonlyMap<NodeKey, Node>, after: ReadonlyMap<NodeKey, Node>): Problem[] {
  return [...after.values()].flatMap((node) => {
    const old = before.get(node.key);
    if (!old || old.nodeClass === node.nodeClass) return [];
    const data = { name: node.browseName.name, from: old.nodeClass, to: node.nodeClass };
    return [problem("source-text.class-changed", data, { node: node.key })];
  });
}

/** What is identity, place or told by edges. */
const NOT_ATTRIBUTES = new Set(["key", "nodeId", "nodeClass", "order", "references"]);

function diffAttributes(plan: Plan, old: Node | undefined, node: Node): void {
  if (!old) return;
  const [left, right] = [old, node] as unknown as Readonly<Record<string, unknown>>[];
  for (const name of new Set([...Object.keys(old), ...Object.keys(node)])) {
    if (NOT_ATTRIBUTES.has(name) || isSame(left?.[name], right?.[name])) continue;
    const value = right?.[name];
    plan.do(node.key, {
      kind: "setAttribute",
      key: node.key,
      attribute: name as AttributeName,
      ...(value === undefined ? {} : { value }),
    });
  }
  if (!isSame(listOdd(old), listOdd(node))) {
    plan.problems.push(problem("source-text.reference-kind", { name: node.browseName.name }, { node: node.key }));
  }
}

function diffHeader(plan: Plan, old: ModelHeader, header: ModelHeader, keys: KeyMap): void {
  for (const field of new Set([...Object.keys(old), ...Object.keys(header)]) as Set<keyof ModelHeader>) {
    if (isSame(old[field], header[field])) continue;
    const value = field === "aliases" ? header.aliases?.map(([alias, key]) => [alias, keys.find(key)]) : header[field];
    plan.do(undefined, { kind: "setHeader", field, ...(value === undefined ? {} : { value }) });
  }
}

function isSame(a: unknown, b: unknown): boolean {
  return a === b || JSON.stringify(sorted(a)) === JSON.stringify(sorted(b));
}

/** Members of records in one order; lists keep theirs. */
function sorted(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(sorted);
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([name, member]) => [name, sorted(member)]),
  );
}

/** References that no edge stands for: those to another server. */
function isOdd(reference: DeclaredReference): boolean {
  return reference.serverUri !== undefined;
}

function listOdd(node: Node): readonly DeclaredReference[] {
  return node.references.filter(isOdd);
}

type Attributes = DeclaredReference["otherAttributes"];

/** Where an edge is declared: places in the lists of its ends, and what the schema does not know of it there. */
type Places = {
  readonly source: readonly number[];
  readonly target: readonly number[];
  readonly sourceAttributes: Attributes;
  readonly targetAttributes: Attributes;
};
type EdgeChange = Edge & { readonly id: string; readonly isThere: boolean; readonly places: Places | undefined };

function toEdgeId({ source, type, target }: Edge): string {
  return `${source}\n${type}\n${target}`;
}

type Declared = {
  edge: Edge;
  source: number[];
  target: number[];
  sourceAttributes: Attributes;
  targetAttributes: Attributes;
};

function indexEdges(nodes: ReadonlyMap<NodeKey, Node>): Map<string, Declared> {
  const found = new Map<string, Declared>();
  for (const node of nodes.values()) {
    node.references.forEach((reference, index) => {
      if (isOdd(reference)) return;
      const { type, target, isForward } = reference;
      const edge = isForward ? { source: node.key, type, target } : { source: target, type, target: node.key };
      const id = toEdgeId(edge);
      const entry: Declared = found.get(id) ?? { edge, source: [], target: [], sourceAttributes: undefined, targetAttributes: undefined };
      const end = isForward ? "source" : "target";
      if (entry[end].length === 0) entry[`${end}Attributes`] = reference.otherAttributes;
      entry[end].push(index);
      found.set(id, entry);
    });
  }
  return found;
}

/** Edges that are declared otherwise than before: gone, new, or at other ends. */
function diffEdges(before: ReadonlyMap<NodeKey, Node>, after: ReadonlyMap<NodeKey, Node>): EdgeChange[] {
  const [old, now] = [indexEdges(before), indexEdges(after)];
  const changes: EdgeChange[] = [];
  for (const [id, { edge, ...places }] of now) {
    const was = old.get(id);
    if (was && isSamePlaces(was, places)) continue;
    changes.push({ ...edge, id, isThere: was !== undefined, places });
  }
  for (const [id, { edge }] of old) if (!now.has(id)) changes.push({ ...edge, id, isThere: true, places: undefined });
  // A place is one in the finished list, so each list is filled from its front.
  return changes.sort((a, b) => firstPlace(a) - firstPlace(b));
}

function isSamePlaces(a: Places, b: Places): boolean {
  if (a.source.length !== b.source.length || a.target.length !== b.target.length) return false;
  return isSame(a.sourceAttributes, b.sourceAttributes) && isSame(a.targetAttributes, b.targetAttributes);
}

function firstPlace({ places }: EdgeChange): number {
  return Math.min(...(places?.source ?? []), ...(places?.target ?? []), Number.MAX_SAFE_INTEGER);
}

class Plan {
  readonly operations: Operation[] = [];
  readonly problems: Problem[] = [];
  readonly touched = new Set<NodeKey>();
  readonly #done = new Set<string>();
  space: AddressSpace;

  constructor(space: AddressSpace) {
    this.space = space;
  }

  do(key: NodeKey | undefined, operation: Operation): boolean {
    const applied = applyOperation(this.space, operation);
    if (!applied.ok) {
      // Told at the node whose text asked for it; what is missing is named in the sentence.
      this.problems.push(
        ...applied.problems.map((found) => (key === undefined ? found : { ...found, at: { ...found.at, node: key } })),
      );
      return false;
    }
    this.operations.push(operation);
    this.space = applied.value;
    if (key !== undefined) this.touched.add(key);
    return true;
  }

  /** With the references that can stand at once; those to nodes that come later follow as edges. */
  addNode(node: Node, edges: readonly EdgeChange[]): void {
    const bothEnds = new Set(
      edges.filter(({ places }) => places && places.source.length > 0 && places.target.length > 0).map(({ id }) => id),
    );
    const references = node.references.filter((reference) => {
      if (isOdd(reference)) return true;
      const { type, target, isForward } = reference;
      const id = toEdgeId(isForward ? { source: node.key, type, target } : { source: target, type, target: node.key });
      const isLoaded = [type, target].every((key) => key === node.key || this.space.getNode(key) !== undefined);
      if (!isLoaded || bothEnds.has(id)) return false;
      this.#done.add(id);
      return true;
    });
    this.do(node.key, { kind: "addNode", node: { ...node, order: this.space.own.nextOrder, references } });
  }

  /** Edges that a removed node declares itself go with it. */
  removeEdge(edge: EdgeChange, after: ReadonlyMap<NodeKey, Node>): void {
    const { source, type, target } = edge;
    const { own } = this.space;
    const lasting = [source, target].filter((key) => after.has(key) && own.nodes.has(key));
    const isDeclaredByLasting = lasting.some((key) => {
      const node = own.nodes.get(key);
      return node !== undefined && declares(node, edge);
    });
    if (edge.places || isDeclaredByLasting)
      this.do(lasting[0] ?? source, { kind: "removeReference", source, type, target });
  }

  addEdge({ source, type, target, places, id }: EdgeChange): void {
    if (!places || this.#done.has(id)) return;
    const [sourceIndex, ...moreSource] = places.source;
    const [targetIndex, ...moreTarget] = places.target;
    const declaredAt: DeclaredAt = targetIndex === undefined ? "source" : sourceIndex === undefined ? "target" : "both";
    const repeats =
      moreSource.length + moreTarget.length > 0 ? { repeats: { source: moreSource, target: moreTarget } } : {};
    this.do(this.space.isOwn(source) ? source : target, {
      kind: "addReference",
      source,
      type,
      target,
      declaredAt,
      ...(sourceIndex === undefined ? {} : { sourceIndex }),
      ...(targetIndex === undefined ? {} : { targetIndex }),
      ...(places.sourceAttributes ? { sourceAttributes: places.sourceAttributes } : {}),
      ...(places.targetAttributes ? { targetAttributes: places.targetAttributes } : {}),
      ...repeats,
    });
  }

  /** Nodes that declare edges at each other go in the order that lets each go; what still holds one is told. */
  removeNodes(keys: readonly NodeKey[]): void {
    let left = keys;
    for (;;) {
      const free = left.filter((key) => listUses(this.space.own, this.space.requireNode(key)).length === 0);
      for (const key of free) this.do(key, { kind: "removeNode", key });
      left = left.filter((key) => !free.includes(key));
      if (left.length === 0) return;
      if (free.length === 0 && !this.#cutBetween(left)) break;
    }
    for (const key of left) this.do(key, { kind: "removeNode", key });
  }

  /** Removes the edges between nodes that all go; false when there are none. */
  #cutBetween(keys: readonly NodeKey[]): boolean {
    const going = new Set(keys);
    const edges = new Map<string, Edge>();
    for (const key of keys) {
      for (const edge of listUses(this.space.own, this.space.requireNode(key))) {
        if (going.has(edge.source) && going.has(edge.target)) edges.set(toEdgeId(edge), edge);
      }
    }
    for (const { source, type, target } of edges.values())
      this.do(undefined, { kind: "removeReference", source, type, target });
    return edges.size > 0;
  }
}

function declares(node: Node, edge: Edge): boolean {
  return node.references.some(
    (r) =>
      !isOdd(r) &&
      r.type === edge.type &&
      (r.isForward
        ? node.key === edge.source && r.target === edge.target
        : node.key === edge.target && r.target === edge.source),
  );
}
