/**
 * The own layer of a model as plain contents: what merging and restoring work on. Edges are looked at apart from the
 * lists in which nodes declare them, since the same reference may be declared at either end or at both.
 */
import type { AddressSpace, Edge } from "../../address-space/address-space";
import { listMappingEntries, toMappingKey, type MappingEntry } from "../../address-space/mapping-entry";
import type { ModelHeader } from "../../address-space/model-header";
import type { DeclaredReference, Node } from "../../address-space/node";
import type { NodeKey } from "../../address-space/node-id";

export type ModelState = {
  readonly header: ModelHeader;
  readonly nodes: ReadonlyMap<NodeKey, Node>;
  /** By address, see `toMappingKey`. */
  readonly mapping: ReadonlyMap<string, MappingEntry>;
};

export function toState(space: AddressSpace): ModelState {
  return {
    header: space.own.header,
    nodes: new Map(space.listOwnNodes().map((node) => [node.key, node])),
    mapping: new Map(listMappingEntries(space.own.mapping).map((entry) => [toMappingKey(entry), entry])),
  };
}

/** An edge with the ends that declare it. */
export type PlacedEdge = { readonly edge: Edge; readonly atSource: boolean; readonly atTarget: boolean };

const SEPARATOR = "\u001f";

export function toEdgeId({ source, type, target }: Edge): string {
  return [source, type, target].join(SEPARATOR);
}

/** The edge that a node declares by a reference; undefined for one to another server, which is no edge of the graph. */
export function toEdge(key: NodeKey, { type, target, isForward, serverUri }: DeclaredReference): Edge | undefined {
  if (serverUri !== undefined) return undefined;
  return isForward ? { source: key, type, target } : { source: target, type, target: key };
}

/** All edges that the nodes declare, by id. */
export function listPlacedEdges(nodes: Iterable<Node>): Map<string, PlacedEdge> {
  const placed = new Map<string, PlacedEdge>();
  for (const node of nodes) {
    for (const reference of node.references) {
      const edge = toEdge(node.key, reference);
      if (!edge) continue;
      const id = toEdgeId(edge);
      const known = placed.get(id);
      placed.set(id, {
        edge,
        atSource: known?.atSource === true || reference.isForward,
        atTarget: known?.atTarget === true || !reference.isForward,
      });
    }
  }
  return placed;
}

/** Names of what may be set at a node by itself. */
export function listAttributeNames(...nodes: readonly (Node | undefined)[]): string[] {
  const names = new Set(nodes.flatMap((node) => (node ? Object.keys(node) : [])));
  for (const fixed of ["key", "nodeClass", "references"]) names.delete(fixed);
  return [...names];
}

export function readAttribute(node: Node | undefined, name: string): unknown {
  return node && (node as unknown as Readonly<Record<string, unknown>>)[name];
}

/** Equality of plain JSON, whatever the order of its members. */
export function isSameJson(a: unknown, b: unknown): boolean {
  if (a === b) return true;
  if (typeof a !== "object" || typeof b !== "object" || a === null || b === null) return false;
  if (Array.isArray(a) || Array.isArray(b)) {
    if (!Array.isArray(a) || !Array.isArray(b) || a.length !== b.length) return false;
    return a.every((item, i) => isSameJson(item, b[i]));
  }
  const [left, right] = [a as Record<string, unknown>, b as Record<string, unknown>];
  const names = Object.keys(left).filter((name) => left[name] !== undefined);
  if (names.length !== Object.keys(right).filter((name) => right[name] !== undefined).length) return false;
  return names.every((name) => isSameJson(left[name], right[name]));
}

/** References that are no edges, or carry more than one says: to other servers, with unknown attributes. */
export function listOddReferences(node: Node): DeclaredReference[] {
  return node.references.filter((r) => r.serverUri !== undefined || r.otherAttributes !== undefined);
}
