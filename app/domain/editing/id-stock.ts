/**
 * The ids that a window or a server's command has in stock: blocks of numbers that the server leased, and the memory of
 * every string identifier that was given. New NodeIds are chosen by the policy that the model then has.
 */
import type { AddressSpace } from "../address-space/address-space";
import { getStockSize, NODE_CLASSES, NUMBERS, type IdPolicy, type IdRange } from "../address-space/id-policy";
import { getOwnNamespace } from "../address-space/model-header";
import type { NodeClass } from "../address-space/node";
import { toNodeKey, type NodeId } from "../address-space/node-id";
import { fail, problem, type Result } from "../core/result";
import { BlockAllocator, FIRST_SCRATCH, type IdBlock, type NewNodePlace, type NodeIdAllocator } from "./allocate-node-id";
import { NodeIdLedger, PathAllocator } from "./id-policies";
import type { Operation } from "./operation";

const SCRATCH_IDS = 10_000_000;

/** Which block is asked for: that of a class, or the one for all that has no range. */
export type BlockFor = NodeClass | undefined;

export class IdStock implements NodeIdAllocator {
  readonly ledger: NodeIdLedger;
  readonly #getSpace: () => AddressSpace;
  readonly #blocks = new Map<BlockFor, BlockAllocator>();
  readonly #usedUp = new Map<BlockFor, string>();

  /** `given`: NodeId texts that were given in the namespace and that the model does not have any more. */
  constructor(getSpace: () => AddressSpace, blocks: readonly IdBlock[], given: Iterable<string> = []) {
    this.#getSpace = getSpace;
    this.ledger = new NodeIdLedger(given);
    for (const block of blocks) this.addBlock(block);
  }

  /** For a trial of a command, whose edit is thrown away: numbers that no lease reaches, paths as they would be given. */
  static forTrial(space: AddressSpace): IdStock {
    const blocks = [undefined, ...NODE_CLASSES].map((nodeClass, i): IdBlock => {
      const from = FIRST_SCRATCH + i * SCRATCH_IDS;
      return { from, to: from + SCRATCH_IDS - 1, ...(nodeClass ? { nodeClass } : {}) };
    });
    return new IdStock(() => space, blocks);
  }

  /** Problems: `node-id.block-empty`, `node-id.range-used-up`, `node-id.path-used-up`. */
  allocate(nodeClass: NodeClass, place?: NewNodePlace): Result<NodeId> {
    const policy = this.#policy;
    const range = findRange(policy, nodeClass);
    if (range && this.#usedUp.get(nodeClass) === toText(range) && this.#remainingIn(nodeClass) === 0)
      return fail(problem("node-id.range-used-up", { nodeClass, ...range }));
    if (range) return this.#blockOf(nodeClass).allocate(nodeClass);
    const numbers = this.#blockOf(undefined);
    if (policy.kind !== "paths") return numbers.allocate(nodeClass);
    const { pattern, separator } = policy;
    return new PathAllocator(this.#namespaceUri, this.ledger, numbers, separator, pattern).allocate(nodeClass, place);
  }

  /** Takes note of what edits give, own and foreign: none of it is given again, also after it was taken away. */
  record(operations: readonly Operation[]): void {
    this.ledger.record(operations);
  }

  addGiven(given: Iterable<string>): void {
    for (const id of given) this.ledger.addText(id);
  }

  /** False where nothing was gained: the block lies outside of the range that its class has by now. */
  addBlock(block: IdBlock): boolean {
    const { nodeClass } = block;
    const range = nodeClass && findRange(this.#policy, nodeClass);
    const before = this.#remainingIn(nodeClass);
    this.#blockOf(nodeClass).addBlock(block);
    if (range) this.#blockOf(nodeClass).keepWithin(range);
    return this.#remainingIn(nodeClass) > before;
  }

  /** The server has no number left for it; that holds until the range is another one. */
  markUsedUp(wanted: BlockFor): void {
    const range = wanted && findRange(this.#policy, wanted);
    this.#usedUp.set(wanted, range ? toText(range) : "");
  }

  listBlocks(): readonly IdBlock[] {
    return [...this.#blocks].flatMap(([nodeClass, blocks]) =>
      blocks.listBlocks().map((block) => (nodeClass === undefined ? block : { ...block, nodeClass })),
    );
  }

  /**
   * What should be leased next: of a range less than a stock is left, or fewer ids than `below` of those for all others.
   * Blocks outside of a changed range are dropped.
   */
  findWanted(below: number): { readonly for: BlockFor } | undefined {
    const policy = this.#policy;
    let isComplete = true;
    for (const nodeClass of NODE_CLASSES) {
      const range = findRange(policy, nodeClass);
      isComplete &&= range !== undefined;
      if (!range) continue;
      this.#blockOf(nodeClass).keepWithin(range);
      const isUsedUp = this.#usedUp.get(nodeClass) === toText(range);
      if (!isUsedUp && this.#remainingIn(nodeClass) < getStockSize(range)) return { for: nodeClass };
    }
    const isEnough = isComplete || this.#remainingIn(undefined) >= below || this.#usedUp.has(undefined);
    return isEnough ? undefined : { for: undefined };
  }

  get #policy(): IdPolicy {
    return this.#getSpace().own.header.idPolicy ?? NUMBERS;
  }

  get #namespaceUri(): string {
    return getOwnNamespace(this.#getSpace().own.header);
  }

  #remainingIn(wanted: BlockFor): number {
    return this.#blocks.get(wanted)?.remaining ?? 0;
  }

  #blockOf(wanted: BlockFor): BlockAllocator {
    let blocks = this.#blocks.get(wanted);
    if (!blocks) {
      const isTaken = (id: NodeId): boolean =>
        this.ledger.has(id) ||
        this.#getSpace().findByNodeId(id) !== undefined ||
        this.#getSpace().getNode(toNodeKey(id)) !== undefined;
      blocks = new BlockAllocator(this.#namespaceUri, [], isTaken);
      this.#blocks.set(wanted, blocks);
    }
    return blocks;
  }
}

export function findRange(policy: IdPolicy, nodeClass: NodeClass): IdRange | undefined {
  return policy.kind === "ranges" ? policy.ranges[nodeClass] : undefined;
}

function toText({ from, to }: IdRange): string {
  return `${from}-${to}`;
}
