/**
 * Applies operations to an address space. The old one is untouched; on failure there is no new one.
 *
 * Preconditions are strict, because the same code decides in the window, on the server and when a window rebases: an
 * operation that no longer means what its author meant fails with a problem instead of doing something else.
 */
import { hasEdge, listUses, type AddressSpace, type Edge } from "../address-space/address-space";
import type { ModelHeader } from "../address-space/model-header";
import type { DeclaredReference, Node } from "../address-space/node";
import { formatNodeId, type NodeId, type NodeKey } from "../address-space/node-id";
import { assertNever, fail, ok, problem, type Problem, type Result } from "../core/result";
import { hasAttribute, isRequiredAttribute } from "./attribute-names";
import type { AttributeName, Operation } from "./operation";

type Of<K extends Operation["kind"]> = Extract<Operation, { kind: K }>;

/**
 * The address space after one operation. Problems: `operation.node-exists`, `-missing`, `-foreign`, `-in-use`,
 * `operation.node-id-taken`, `operation.reference-exists`, `-missing`, `operation.attribute-class`, `-required`,
 * `operation.header-required`.
 */
export function applyOperation(space: AddressSpace, operation: Operation): Result<AddressSpace> {
  switch (operation.kind) {
    case "addNode":
      return addNode(space, operation);
    case "removeNode":
      return removeNode(space, operation.key);
    case "setAttribute":
      return setAttribute(space, operation);
    case "renumber":
      return renumber(space, operation);
    case "addReference":
      return addReference(space, operation);
    case "removeReference":
      return removeReference(space, operation);
    case "setHeader":
      return setHeader(space, operation);
    case "setMapping":
      return setMapping(space, operation);
    default:
      return assertNever(operation);
  }
}

/** All operations in order, or none: the first that fails fails the whole, with its index in `data.operation`. */
export function applyOperations(space: AddressSpace, operations: readonly Operation[]): Result<AddressSpace> {
  let current = space;
  for (const [index, operation] of operations.entries()) {
    const result = applyOperation(current, operation);
    if (!result.ok) return fail(...result.problems.map((p) => ({ ...p, data: { ...p.data, operation: index } })));
    current = result.value;
  }
  return ok(current);
}

function addNode(space: AddressSpace, { node, isDangling }: Of<"addNode">): Result<AddressSpace> {
  if (space.getNode(node.key)) return fail(about("operation.node-exists", node.key));
  const taken = findIdProblem(space, node.key, node.nodeId);
  if (taken) return fail(taken);
  if (!isDangling) {
    const missing = findDangling(space, node)[0];
    if (missing !== undefined) return fail(about("operation.node-missing", missing));
  }
  return ok(space.withNode(node));
}

/** Nodes that the references of `node` name and that are not loaded; a node may refer to itself. */
export function findDangling(space: AddressSpace, node: Node): NodeKey[] {
  const isLoaded = (key: NodeKey): boolean => key === node.key || space.getNode(key) !== undefined;
  const missing: NodeKey[] = [];
  for (const reference of node.references) {
    if (!isLoaded(reference.type)) missing.push(reference.type);
    if (reference.serverUri === undefined && !isLoaded(reference.target)) missing.push(reference.target);
  }
  return missing;
}

/**
 * No two nodes have one NodeId. That one which was given up is given to nobody else is the ledger's part and that of the
 * commands: an inverse must be able to put back what an explicit renumbering made.
 */
function findIdProblem(space: AddressSpace, key: NodeKey, nodeId: NodeId): Problem | undefined {
  const holder = space.findByNodeId(nodeId);
  if (!holder || holder.key === key) return undefined;
  return problem("operation.node-id-taken", { nodeId: formatNodeId(nodeId) }, { node: key });
}

function removeNode(space: AddressSpace, key: NodeKey): Result<AddressSpace> {
  const found = requireOwn(space, key);
  if (!found.ok) return found;
  const count = listUses(space.own, found.value).length;
  if (count > 0) return fail(problem("operation.node-in-use", { node: key, count }, { node: key }));
  return ok(space.withoutNode(key));
}

function setAttribute(space: AddressSpace, { key, attribute, value }: Of<"setAttribute">): Result<AddressSpace> {
  const found = requireOwn(space, key);
  if (!found.ok) return found;
  const node = found.value;
  const at = { node: key, attribute };
  if (!hasAttribute(node.nodeClass, attribute)) {
    return fail(problem("operation.attribute-class", { nodeClass: node.nodeClass, attribute }, at));
  }
  if (value === undefined && isRequiredAttribute(attribute))
    return fail(problem("operation.attribute-required", { attribute }, at));
  if (attribute === "nodeId") {
    const taken = findIdProblem(space, key, value as NodeId);
    if (taken) return fail(taken);
  }
  return ok(space.withNode(withAttribute(node, attribute, value)));
}

/** All at once: a NodeId is free when its holder gives it up in the same operation. */
function renumber(space: AddressSpace, { changes }: Of<"renumber">): Result<AddressSpace> {
  const moving = new Set(changes.map(({ key }) => key));
  const given = new Set<string>();
  let next = space;
  for (const { key, nodeId } of changes) {
    const found = requireOwn(space, key);
    if (!found.ok) return found;
    const text = formatNodeId(nodeId);
    const holder = space.findByNodeId(nodeId);
    const isTaken = given.has(text) || (holder !== undefined && !moving.has(holder.key));
    if (isTaken) return fail(problem("operation.node-id-taken", { nodeId: text }, { node: key }));
    given.add(text);
    next = next.withNode({ ...found.value, nodeId });
  }
  return ok(next);
}

function withAttribute(node: Node, attribute: AttributeName, value: unknown): Node {
  if (value !== undefined) return { ...node, [attribute]: value } as Node;
  return withoutMember(node, attribute) as Node;
}

function addReference(space: AddressSpace, operation: Of<"addReference">): Result<AddressSpace> {
  const { source, type, target, declaredAt } = operation;
  if (!operation.isDangling) {
    for (const key of [source, type, target])
      if (!space.getNode(key)) return fail(about("operation.node-missing", key));
  }
  const ends = listDeclaringEnds(space, operation);
  const wanted = declaredAt === "source" ? source : declaredAt === "target" ? target : undefined;
  if (ends.length === 0) return fail(about("operation.node-foreign", wanted ?? source));
  if (space.hasEdge(operation)) {
    return fail(problem("operation.reference-exists", { source, type, target }, { node: source }));
  }
  let next = space;
  for (const [key, places] of collectInsertions(ends)) {
    const node = next.own.nodes.get(key);
    if (node) next = next.withNode({ ...node, references: insertAll(node.references, places) });
  }
  return ok(next);
}

type Insertion = { readonly key: NodeKey; readonly reference: DeclaredReference; readonly at: number | undefined };

function listDeclaringEnds(space: AddressSpace, operation: Of<"addReference">): Insertion[] {
  const { source, type, target, declaredAt, sourceIndex, targetIndex, repeats } = operation;
  const { sourceAttributes, targetAttributes } = operation;
  const insertions: Insertion[] = [];
  if (declaredAt !== "target" && space.isOwn(source)) {
    const reference = withAttributes({ type, target, isForward: true }, sourceAttributes);
    for (const at of [sourceIndex, ...(repeats?.source ?? [])]) insertions.push({ key: source, reference, at });
  }
  if (declaredAt !== "source" && space.isOwn(target)) {
    const reference = withAttributes({ type, target: source, isForward: false }, targetAttributes);
    for (const at of [targetIndex, ...(repeats?.target ?? [])]) insertions.push({ key: target, reference, at });
  }
  return insertions;
}

function withAttributes(
  reference: DeclaredReference,
  otherAttributes: DeclaredReference["otherAttributes"],
): DeclaredReference {
  return otherAttributes ? { ...reference, otherAttributes } : reference;
}

function collectInsertions(insertions: readonly Insertion[]): Map<NodeKey, Insertion[]> {
  const byNode = new Map<NodeKey, Insertion[]>();
  for (const insertion of insertions) byNode.set(insertion.key, [...(byNode.get(insertion.key) ?? []), insertion]);
  return byNode;
}

/** Places are those of the resulting list, so they are filled from the front; one beyond the end means the end. */
function insertAll(references: readonly DeclaredReference[], insertions: readonly Insertion[]): DeclaredReference[] {
  const list = [...references];
  const ranked = [...insertions].sort((a, b) => (a.at ?? Infinity) - (b.at ?? Infinity));
  for (const { reference, at } of ranked) list.splice(at ?? list.length, 0, reference);
  return list;
}

function removeReference(space: AddressSpace, edge: Edge): Result<AddressSpace> {
  const { source, type, target } = edge;
  if (!hasEdge(space.own, edge)) {
    const code = space.hasEdge(edge) ? "operation.node-foreign" : "operation.reference-missing";
    return fail(problem(code, { source, type, target, node: source }, { node: source }));
  }
  let next = space;
  for (const key of source === target ? [source] : [source, target]) {
    const node = next.own.nodes.get(key);
    const kept = node?.references.filter((r) => !declaresEdge(key, r, edge));
    if (node && kept && kept.length < node.references.length) next = next.withNode({ ...node, references: kept });
  }
  return ok(next);
}

/** Whether a reference declared at the node `key` is the edge. */
export function declaresEdge(key: NodeKey, reference: DeclaredReference, edge: Edge): boolean {
  if (reference.serverUri !== undefined || reference.type !== edge.type) return false;
  return reference.isForward
    ? key === edge.source && reference.target === edge.target
    : key === edge.target && reference.target === edge.source;
}

function setHeader(space: AddressSpace, { field, value }: Of<"setHeader">): Result<AddressSpace> {
  if (value !== undefined) return ok(space.withHeader({ ...space.own.header, [field]: value }));
  if (field === "models" || field === "namespaceUris") return fail(problem("operation.header-required", { field }));
  return ok(space.withHeader(withoutMember(space.own.header, field) as ModelHeader));
}

function setMapping(space: AddressSpace, operation: Of<"setMapping">): Result<AddressSpace> {
  const { part, owner, id, value, isDangling } = operation;
  if (value === undefined) return ok(space.withoutMapping({ part, owner, id }));
  const found = requireOwn(space, owner);
  return found.ok || isDangling ? ok(space.withMapping({ part, owner, id, value })) : found;
}

function withoutMember(object: object, name: string): object {
  return Object.fromEntries(Object.entries(object).filter(([key]) => key !== name));
}

function requireOwn(space: AddressSpace, key: NodeKey): Result<Node> {
  const node = space.own.nodes.get(key);
  if (node) return ok(node);
  return fail(about(space.getNode(key) ? "operation.node-foreign" : "operation.node-missing", key));
}

function about(code: string, key: NodeKey): Problem {
  return problem(code, { node: key }, { node: key });
}
