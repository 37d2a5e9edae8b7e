/** Whether two lists of nodes are one graph: the quick answer for the usual case that nothing differs at all. */
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";

/** Places in a file say nothing about a server. */
const PLACES: ReadonlySet<string> = new Set(["order", "references", "parent"]);

/** References count once, at whichever end they are declared; all else of a node has to be equal. */
export function isSameGraph(a: readonly Node[], b: readonly Node[]): boolean {
  if (a.length !== b.length) return false;
  const others = new Map<NodeKey, Node>(b.map((node) => [node.key, node]));
  if (!a.every((node) => isSameNode(node, others.get(node.key)))) return false;
  const [left, right] = [listEdges(a), listEdges(b)];
  if (left.size !== right.size) return false;
  for (const edge of left) if (!right.has(edge)) return false;
  return true;
}

function isSameNode(a: Node, b: Node | undefined): boolean {
  if (!b) return false;
  const other = b as unknown as Readonly<Record<string, unknown>>;
  let count = 0;
  for (const [name, value] of Object.entries(a)) {
    if (PLACES.has(name)) continue;
    count++;
    if (!isSameValue(value, other[name])) return false;
  }
  return count === Object.keys(b).filter((name) => !PLACES.has(name)).length;
}

function isSameValue(a: unknown, b: unknown): boolean {
  return a === b || (typeof a === "object" && typeof b === "object" && JSON.stringify(a) === JSON.stringify(b));
}

function listEdges(nodes: readonly Node[]): ReadonlySet<string> {
  const edges = new Set<string>();
  for (const { key, references } of nodes) {
    for (const { type, target, isForward, serverUri } of references) {
      edges.add(`${isForward ? key : target} ${type} ${isForward ? target : key} ${serverUri ?? ""}`);
    }
  }
  return edges;
}
