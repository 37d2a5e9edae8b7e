/** The ledger of numeric identifiers: what was given once is never given again, also after deletion and import. */
import { and, eq, inArray, sql } from "drizzle-orm";
import { newId } from "../../utils/ids.server";
import { getDatabase } from "../client.server";
import { nodeIdLease, nodeIdLedger, retiredNodeId } from "../schema/models";

/**
 * Blocks are leased from the lower half of the 32-bit range. The upper half is left to identifiers that people or other
 * programs chose, so that one file with i=4294967295 does not use up the namespace.
 */
export const HIGHEST_LEASED_IDENTIFIER = 0x7fffffff;

export async function findHighestIdentifier(organizationId: string, namespaceUri: string): Promise<number> {
  const [row] = await getDatabase()
    .select({ highest: nodeIdLedger.highest })
    .from(nodeIdLedger)
    .where(and(eq(nodeIdLedger.organizationId, organizationId), eq(nodeIdLedger.namespaceUri, namespaceUri)));
  return row?.highest ?? 0;
}

/** Raises the ledger to `highest`; it never falls. */
export function raiseLedgerStatement(organizationId: string, namespaceUri: string, highest: number) {
  return getDatabase()
    .insert(nodeIdLedger)
    .values({ organizationId, namespaceUri, highest })
    .onConflictDoUpdate({
      target: [nodeIdLedger.organizationId, nodeIdLedger.namespaceUri],
      set: { highest: sql`max(${nodeIdLedger.highest}, excluded.highest)` },
    });
}

export function addLeaseStatement(row: Omit<typeof nodeIdLease.$inferInsert, "id">) {
  return getDatabase()
    .insert(nodeIdLease)
    .values({ ...row, id: newId() });
}

export type RetiredNodeId = Omit<typeof retiredNodeId.$inferSelect, "organizationId">;

/** Which of these NodeIds somebody has given up. */
export async function findRetired(organizationId: string, nodeIds: readonly string[]): Promise<RetiredNodeId[]> {
  const found: RetiredNodeId[] = [];
  for (let i = 0; i < nodeIds.length; i += 500) {
    const rows = await getDatabase()
      .select()
      .from(retiredNodeId)
      .where(and(eq(retiredNodeId.organizationId, organizationId), inArray(retiredNodeId.nodeId, nodeIds.slice(i, i + 500))));
    found.push(...rows);
  }
  return found;
}

export function addRetiredStatement(organizationId: string, retired: RetiredNodeId) {
  const { nodeKey, nodeClass, browseName } = retired;
  return getDatabase()
    .insert(retiredNodeId)
    .values({ organizationId, ...retired })
    .onConflictDoUpdate({
      target: [retiredNodeId.organizationId, retiredNodeId.nodeId],
      set: { nodeKey, nodeClass, browseName },
    });
}
