/** The ledger of numeric identifiers: what was given once is never given again, also after deletion and import. */
import { and, eq, gte, inArray, lt, lte, sql } from "drizzle-orm";
import { HIGHEST_ALLOCATED } from "../../domain/address-space/id-policy";
import { formatNodeId, numericNodeId } from "../../domain/address-space/node-id";
import { newId } from "../../utils/ids.server";
import { getDatabase } from "../client.server";
import { nodeIdLease, nodeIdLedger, retiredNodeId } from "../schema/models";

/**
 * Blocks are leased from the lower half of the 32-bit range. The upper half is left to identifiers that people or other
 * programs chose, so that one file with i=4294967295 does not use up the namespace.
 */
export const HIGHEST_LEASED_IDENTIFIER = HIGHEST_ALLOCATED;

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

const ROWS_PER_STATEMENT = 200;

/** The latest holder of each; there may be as many as a model has nodes. */
export function addRetiredStatements(organizationId: string, retired: readonly RetiredNodeId[]) {
  const statements: ReturnType<typeof addRetiredRows>[] = [];
  for (let i = 0; i < retired.length; i += ROWS_PER_STATEMENT) {
    statements.push(addRetiredRows(organizationId, retired.slice(i, i + ROWS_PER_STATEMENT)));
  }
  return statements;
}

function addRetiredRows(organizationId: string, retired: readonly RetiredNodeId[]) {
  return getDatabase()
    .insert(retiredNodeId)
    .values(retired.map((row) => ({ organizationId, ...row })))
    .onConflictDoUpdate({
      target: [retiredNodeId.organizationId, retiredNodeId.nodeId],
      set: {
        nodeKey: sql`excluded.node_key`,
        nodeClass: sql`excluded.node_class`,
        browseName: sql`excluded.browse_name`,
      },
    });
}

type Range = { readonly from: number; readonly to: number };

/** Blocks that reach into a range. */
export function listLeases(organizationId: string, namespaceUri: string, range: Range): Promise<Range[]> {
  return getDatabase()
    .select({ from: nodeIdLease.from, to: nodeIdLease.to })
    .from(nodeIdLease)
    .where(
      and(
        eq(nodeIdLease.organizationId, organizationId),
        eq(nodeIdLease.namespaceUri, namespaceUri),
        lte(nodeIdLease.from, range.to),
        gte(nodeIdLease.to, range.from),
      ),
    );
}

/** NodeId texts that begin with `head` and that some node has given up. */
export async function listRetiredIds(organizationId: string, head: string): Promise<string[]> {
  const rows = await getDatabase()
    .select({ nodeId: retiredNodeId.nodeId })
    .from(retiredNodeId)
    .where(
      and(
        eq(retiredNodeId.organizationId, organizationId),
        gte(retiredNodeId.nodeId, head),
        lt(retiredNodeId.nodeId, `${head}\u{10ffff}`),
      ),
    );
  return rows.map((row) => row.nodeId);
}

/** Numbers of a range that some node of the namespace has given up. */
export async function listRetiredIdentifiers(organizationId: string, namespaceUri: string, range: Range): Promise<number[]> {
  const head = formatNodeId(numericNodeId(namespaceUri, 0)).slice(0, -1);
  const numbers = (await listRetiredIds(organizationId, head)).map((id) => Number(id.slice(head.length)));
  return numbers.filter((number) => number >= range.from && number <= range.to);
}
