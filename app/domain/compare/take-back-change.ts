/** The edit that takes one change back and leaves the others: what a reviewer suggests when the change should not go out. */
import type { AddressSpace } from "../address-space/address-space";
import { listChildren } from "../address-space/browse";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import type { Operation } from "../editing/operation";
import type { Change } from "./change";
import { isFactProperty } from "./compare-nodes";
import { toState } from "./merge/model-state";
import { listStateOperations } from "./merge/state-operations";

/** Empty where the change is not one of a node that could be put back (the model's version, a number that was used again). */
export function takeBackChange(before: AddressSpace, after: AddressSpace, { key, kind }: Pick<Change, "key" | "kind">): Operation[] {
  if (key === undefined || kind === "id-reused") return [];
  const [old, now] = [toState(before), toState(after)];
  const nodes = new Map(now.nodes);
  if (kind.startsWith("mapping-")) return takeBackMapping(before, after, key);
  if (!old.nodes.has(key)) for (const gone of collectBelow(after, key)) nodes.delete(gone);
  else for (const kept of old.nodes.has(key) && now.nodes.has(key) ? listFacts(before, after, key) : collectBelow(before, key)) putBack(nodes, old.nodes.get(kept), kept);
  return listStateOperations(after, { ...now, nodes: withEdgesOf(nodes, old.nodes, key) });
}

function putBack(nodes: Map<NodeKey, Node>, node: Node | undefined, key: NodeKey): void {
  if (node) nodes.set(key, node);
  else nodes.delete(key);
}

/** The node with the Properties that are told as facts of it, of either state. */
function listFacts(before: AddressSpace, after: AddressSpace, key: NodeKey): NodeKey[] {
  const facts = [before, after].flatMap((space) => listChildren(space, key).filter((n) => space.isOwn(n.key) && isFactProperty(n.browseName.name)));
  return [...new Set([key, ...facts.map((n) => n.key)])];
}

function collectBelow(space: AddressSpace, key: NodeKey): NodeKey[] {
  const found = new Set<NodeKey>([key]);
  for (const at of found) for (const child of listChildren(space, at)) if (space.isOwn(child.key)) found.add(child.key);
  return [...found];
}

/** Others name the node as they did before: a node that went is named by nobody, one that comes back by its owner again. */
function withEdgesOf(nodes: Map<NodeKey, Node>, old: ReadonlyMap<NodeKey, Node>, key: NodeKey): Map<NodeKey, Node> {
  const isThere = nodes.has(key);
  for (const node of nodes.values()) {
    if (node.key === key) continue;
    const before = old.get(node.key)?.references.filter((r) => r.target === key) ?? [];
    const others = node.references.filter((r) => r.target !== key);
    const wanted = isThere ? before : [];
    if (node.references.length !== others.length || wanted.length > 0) nodes.set(node.key, { ...node, references: [...others, ...wanted] });
  }
  return nodes;
}

function takeBackMapping(before: AddressSpace, after: AddressSpace, key: NodeKey): Operation[] {
  const [old, now] = [toState(before), toState(after)];
  const mapping = new Map(now.mapping);
  const isAbout = (id: string): boolean => id.includes(key);
  for (const id of now.mapping.keys()) if (isAbout(id)) mapping.delete(id);
  for (const [id, entry] of old.mapping) if (isAbout(id)) mapping.set(id, entry);
  return listStateOperations(after, { ...now, mapping });
}
