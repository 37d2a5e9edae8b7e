import { writeInTurn } from "../db/client.server";
import type { ModelRow } from "../db/repositories/models.server";
import { addLeaseStatement, findHighestIdentifier, HIGHEST_LEASED_IDENTIFIER, raiseLedgerStatement } from "../db/repositories/node-ids.server";
import { fail, ok, problem, type Result } from "../domain/core/result";

const LEASE_SIZE = 256;
/** Enough for the deepest instantiation in one go. */
export const MAX_LEASE_SIZE = 20_000;
/** People find their own nodes by round numbers; the first block of a namespace starts here. */
export const FIRST_IDENTIFIER = 1001;

export type IdBlock = { readonly from: number; readonly to: number };

/**
 * Leases a block of numeric identifiers to one editing window; both ends are included. No identifier is ever in two
 * blocks, nor one that the namespace has or had. Problem: `model.identifiers-used-up`.
 */
export function leaseNodeIds(model: ModelRow, clientId: string, userId: string, count = LEASE_SIZE): Promise<Result<IdBlock>> {
  const { organizationId, namespaceUri } = model;
  return writeInTurn(async (db) => {
    const highest = await findHighestIdentifier(organizationId, namespaceUri);
    const from = Math.max(highest + 1, FIRST_IDENTIFIER);
    const to = Math.min(from + count - 1, HIGHEST_LEASED_IDENTIFIER);
    if (from > to) return fail(problem("model.identifiers-used-up"));
    await db.batch([
      raiseLedgerStatement(organizationId, namespaceUri, to),
      addLeaseStatement({ organizationId, namespaceUri, clientId, userId, from, to, at: new Date() }),
    ]);
    return ok({ from, to });
  });
}
