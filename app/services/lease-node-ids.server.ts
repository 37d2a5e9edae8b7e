/** Blocks of numeric identifiers for windows and for commands that run here, as the model's choice of NodeIds asks. */
import type { Caller } from "../auth/caller.server";
import { writeInTurn } from "../db/client.server";
import type { ModelRow } from "../db/repositories/models.server";
import {
  addLeaseStatement,
  findHighestIdentifier,
  HIGHEST_LEASED_IDENTIFIER,
  listLeases,
  listRetiredIdentifiers,
  listRetiredIds,
  raiseLedgerStatement,
} from "../db/repositories/node-ids.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import { getStockSize, NUMBERS, type IdRange } from "../domain/address-space/id-policy";
import type { NodeClass } from "../domain/address-space/node";
import { formatNodeId } from "../domain/address-space/node-id";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { CountingAllocator, findFree, type IdBlock, type NodeIdAllocator } from "../domain/editing/allocate-node-id";
import type { Edit } from "../domain/editing/edit-draft";
import { findRange, IdStock } from "../domain/editing/id-stock";

const LEASE_SIZE = 256;
/** The most that one window is given at a time. */
export const MAX_LEASE_SIZE = 20_000;
/** People find their own nodes by round numbers; the first block of a namespace starts here. */
export const FIRST_IDENTIFIER = 1001;

export type LeaseIntent = { readonly clientId: string; readonly userId: string; readonly count?: number };

/**
 * Leases a block of numeric identifiers, both ends included, for a class with a range of its own in the model or for all.
 * No identifier is ever in two blocks, nor one that the namespace has or had. Problem: `model.identifiers-used-up`.
 */
export function leaseNodeIds(
  model: ModelRow,
  space: AddressSpace,
  nodeClass: NodeClass | undefined,
  intent: LeaseIntent,
): Promise<Result<IdBlock>> {
  const { organizationId, namespaceUri } = model;
  const range = nodeClass && findRange(space.own.header.idPolicy ?? NUMBERS, nodeClass);
  const { count = range ? getStockSize(range) : LEASE_SIZE, ...holder } = intent;
  return writeInTurn(async (db) => {
    const free = range ? await findInRange(model, space, range, count) : await findNext(model, count);
    if (!free) return fail(problem("model.identifiers-used-up"));
    await db.batch([
      raiseLedgerStatement(organizationId, namespaceUri, free.to),
      addLeaseStatement({ organizationId, namespaceUri, ...holder, ...free, at: new Date() }),
    ]);
    return ok(free);
  });
}

/** Above all that was ever given or leased. */
async function findNext({ organizationId, namespaceUri }: ModelRow, count: number): Promise<IdRange | undefined> {
  const from = Math.max((await findHighestIdentifier(organizationId, namespaceUri)) + 1, FIRST_IDENTIFIER);
  const to = Math.min(from + count - 1, HIGHEST_LEASED_IDENTIFIER);
  return from <= to ? { from, to } : undefined;
}

/** The first run of the range that nobody has, had or may take. */
async function findInRange(
  model: ModelRow,
  space: AddressSpace,
  range: IdRange,
  count: number,
): Promise<IdRange | undefined> {
  const { organizationId, namespaceUri } = model;
  const leased = await listLeases(organizationId, namespaceUri, range);
  const numbers = await listRetiredIdentifiers(organizationId, namespaceUri, range);
  for (const { nodeId } of space.listOwnNodes()) {
    if (nodeId.namespaceUri === namespaceUri && typeof nodeId.identifier === "number") numbers.push(nodeId.identifier);
  }
  return findFree(range, [...leased, ...numbers.map((number) => ({ from: number, to: number }))], count);
}

/**
 * Runs a command here with as many identifiers as it takes: once to count them, then with what was leased. Problems: those
 * of the command, `model.identifiers-used-up`.
 */
export async function makeWithIds(
  author: Caller,
  model: ModelRow,
  clientId: string,
  space: AddressSpace,
  make: (ids: NodeIdAllocator, stock: IdStock) => Result<Edit>,
): Promise<Result<Edit>> {
  const stock = new IdStock(() => space, [], await listGivenPaths(model));
  const counter = new CountingAllocator(space);
  const tried = make(counter, stock);
  if (!tried.ok) return tried;
  const { idPolicy = NUMBERS } = space.own.header;
  for (const [nodeClass, count] of counter.counts) {
    const from = findRange(idPolicy, nodeClass) ? nodeClass : undefined;
    for (let missing = count; missing > 0;) {
      const lease = await leaseNodeIds(model, space, from, { clientId, userId: author.userId, count: missing });
      if (!lease.ok) return lease;
      stock.addBlock({ ...lease.value, ...(from ? { nodeClass: from } : {}) });
      missing -= lease.value.to - lease.value.from + 1;
    }
  }
  return make(stock, stock);
}

/** String identifiers that nodes of the namespace gave up: paths that are not given again. */
export function listGivenPaths({ organizationId, namespaceUri }: ModelRow): Promise<string[]> {
  return listRetiredIds(organizationId, formatNodeId({ namespaceUri, type: "s", identifier: "" }));
}
