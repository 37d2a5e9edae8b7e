/**
 * NodeIds as paths of names (`B1.Gearbox.Vibration`) for the nodes of machines. `NodeIdLedger` remembers every NodeId that was ever given in a
 * namespace, so that no policy gives one twice, also after deletion, renumbering or import.
 */
import { PATH_PLACE } from "../address-space/id-policy";
import { formatNodeId, toNodeKey, type NodeId } from "../address-space/node-id";
import { findModellingRule } from "../address-space/browse";
import { isTypeNode, type NodeClass } from "../address-space/node";
import { fail, ok, problem, type Result } from "../core/result";
import type { NewNodePlace, NodeIdAllocator } from "./allocate-node-id";
import { listGivenNodeIds } from "./given-node-ids";
import type { Operation } from "./operation";

/** All NodeIds ever given. Grows only. */
export class NodeIdLedger {
  readonly #given: Set<string>;

  constructor(given: Iterable<string> = []) {
    this.#given = new Set(given);
  }

  has(id: NodeId): boolean {
    return this.#given.has(formatNodeId(id));
  }

  /** Takes note of what operations give; what they take away stays given. */
  record(operations: readonly Operation[]): void {
    for (const operation of operations) for (const { nodeId } of listGivenNodeIds(operation)) this.add(nodeId);
  }

  add(id: NodeId): void {
    this.#given.add(formatNodeId(id));
  }

  addText(nodeId: string): void {
    this.#given.add(nodeId);
  }

  /** NodeId texts, to be kept. */
  list(): string[] {
    return [...this.#given];
  }
}

/** More nodes of one path than anybody makes; ends the search for a free one. */
const MAX_SUFFIX = 10_000;

/**
 * String ids along the path: the parent's own string id, a separator, the name. Types and what stands in them are numbered,
 * since their members are found by browse path. A path that was given before gets `_2`, `_3` …
 * Problem: `node-id.path-used-up`.
 */
export class PathAllocator implements NodeIdAllocator {
  readonly #namespaceUri: string;
  readonly #separator: string;
  readonly #ledger: NodeIdLedger;
  readonly #numbers: NodeIdAllocator;
  readonly #pattern: string;

  constructor(
    namespaceUri: string,
    ledger: NodeIdLedger,
    numbers: NodeIdAllocator,
    separator = ".",
    pattern: string = PATH_PLACE,
  ) {
    this.#namespaceUri = namespaceUri;
    this.#ledger = ledger;
    this.#numbers = numbers;
    this.#separator = separator;
    this.#pattern = pattern;
  }

  allocate(nodeClass: NodeClass, place?: NewNodePlace): Result<NodeId> {
    if (!place || nodeClass.endsWith("Type") || isInType(place)) return this.#numbers.allocate(nodeClass, place);
    const parent = place.parent === undefined ? undefined : place.space.getNode(place.parent)?.nodeId;
    const isOwnPath = parent?.type === "s" && parent.namespaceUri === this.#namespaceUri;
    const path = isOwnPath
      ? `${parent.identifier}${this.#separator}${place.name}`
      : this.#pattern.replace(PATH_PLACE, () => place.name);
    for (let suffix = 1; suffix <= MAX_SUFFIX; suffix++) {
      const identifier = suffix === 1 ? path : `${path}_${suffix}`;
      const nodeId: NodeId = { namespaceUri: this.#namespaceUri, type: "s", identifier };
      const isTaken = place.space.findByNodeId(nodeId) ?? place.space.getNode(toNodeKey(nodeId));
      // What a command takes is recorded when its edit is made: one that fails uses no path up.
      if (!isTaken && !this.#ledger.has(nodeId)) return ok(nodeId);
    }
    return fail(problem("node-id.path-used-up", { path }));
  }
}

function isInType({ space, parent }: NewNodePlace): boolean {
  const node = parent === undefined ? undefined : space.getNode(parent);
  return node !== undefined && (isTypeNode(node) || findModellingRule(space, node.key) !== undefined);
}
