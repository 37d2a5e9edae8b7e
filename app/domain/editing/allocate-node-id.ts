/**
 * New NodeIds. The server leases each window a block of numeric ids (`POST /models/:id/lease`), so that two windows never
 * choose the same. An id is taken from the front of the block and never put back, also when the command that took it
 * fails or is undone; gaps stay gaps. Ids that the model has meanwhile (an import may have brought them) are skipped.
 */
import type { AddressSpace } from "../address-space/address-space";
import { numericNodeId, toNodeKey, type NodeId, type NodeKey } from "../address-space/node-id";
import type { IdRange } from "../address-space/id-policy";
import { getOwnNamespace } from "../address-space/model-header";
import type { NodeClass } from "../address-space/node";
import { fail, ok, problem, type Result } from "../core/result";

/** A leased block; `to` is the last id that belongs to it. */
export type IdBlock = {
  readonly from: number;
  readonly to: number;
  /** The class that it was leased for, where classes have ranges of their own. */
  readonly nodeClass?: NodeClass;
};

/** Where the node will stand, for policies that make the id from it. */
export type NewNodePlace = {
  readonly space: AddressSpace;
  readonly parent: NodeKey | undefined;
  readonly name: string;
};

/** What commands take new NodeIds from. Class and place are told so that a policy may number by them; see id-policies.ts. */
export interface NodeIdAllocator {
  allocate(nodeClass: NodeClass, place?: NewNodePlace): Result<NodeId>;
}

/** Numbers that no lease reaches. */
export const FIRST_SCRATCH = 3_600_000_000;

/** For a trial of a command, whose edit is thrown away: gives scratch ids and counts how many of each class it takes. */
export class CountingAllocator implements NodeIdAllocator {
  readonly counts = new Map<NodeClass, number>();
  readonly #space: AddressSpace;
  #next = FIRST_SCRATCH;

  constructor(space: AddressSpace) {
    this.#space = space;
  }

  allocate(nodeClass: NodeClass): Result<NodeId> {
    this.counts.set(nodeClass, (this.counts.get(nodeClass) ?? 0) + 1);
    for (;;) {
      const nodeId = numericNodeId(getOwnNamespace(this.#space.own.header), this.#next++);
      if (!this.#space.findByNodeId(nodeId) && !this.#space.getNode(toNodeKey(nodeId))) return ok(nodeId);
    }
  }
}

/** Hands out the ids of leased blocks. It is the one thing here that remembers: ids are used up, whatever becomes of them. */
export class BlockAllocator implements NodeIdAllocator {
  #blocks: readonly IdBlock[];
  #isTaken: (id: NodeId) => boolean;
  #namespaceUri: string;

  constructor(namespaceUri: string, blocks: readonly IdBlock[], isTaken: (id: NodeId) => boolean = () => false) {
    this.#namespaceUri = namespaceUri;
    this.#blocks = blocks;
    this.#isTaken = isTaken;
  }

  /** For the namespace of a model; skips what `getSpace()` then has. */
  static forModel(getSpace: () => AddressSpace, blocks: readonly IdBlock[]): BlockAllocator {
    const isTaken = (id: NodeId): boolean =>
      getSpace().findByNodeId(id) !== undefined || getSpace().getNode(toNodeKey(id)) !== undefined;
    return new BlockAllocator(getOwnNamespace(getSpace().own.header), blocks, isTaken);
  }

  /** How many ids are left; a window leases the next block before they run out. */
  get remaining(): number {
    return this.#blocks.reduce((sum, block) => sum + Math.max(0, block.to - block.from + 1), 0);
  }

  addBlock(block: IdBlock): void {
    this.#blocks = [...this.#blocks, { from: block.from, to: block.to }];
  }

  /** Drops what stands outside of a range. */
  keepWithin({ from, to }: IdBlock): void {
    this.#blocks = this.#blocks
      .map((block) => ({ from: Math.max(block.from, from), to: Math.min(block.to, to) }))
      .filter((block) => block.from <= block.to);
  }

  /** The blocks as they are now, to be kept over a reload of the window. */
  listBlocks(): readonly IdBlock[] {
    return this.#blocks;
  }

  /** Problem: `node-id.block-empty`. */
  allocate(_nodeClass: NodeClass): Result<NodeId> {
    for (let block = this.#blocks[0]; block; block = this.#blocks[0]) {
      const rest = this.#blocks.slice(1);
      const next = { from: block.from + 1, to: block.to };
      this.#blocks = next.from > next.to ? rest : [next, ...rest];
      const nodeId = numericNodeId(this.#namespaceUri, block.from);
      if (block.from <= block.to && !this.#isTaken(nodeId)) return ok(nodeId);
    }
    return fail(problem("node-id.block-empty"));
  }
}

/** The first run of at most `count` numbers of the range that is in none of the others. */
export function findFree(range: IdRange, taken: readonly IdRange[], count: number): IdRange | undefined {
  let from = range.from;
  for (const other of [...taken].sort((a, b) => a.from - b.from)) {
    if (other.to < from) continue;
    if (other.from > from) return { from, to: Math.min(other.from - 1, from + count - 1, range.to) };
    from = other.to + 1;
  }
  return from <= range.to ? { from, to: Math.min(from + count - 1, range.to) } : undefined;
}
