/** Models and their working state as rows. Statements for writes are answered, so that a use case writes one batch. */
import { and, asc, desc, eq, gt, inArray, isNull, like, lt, lte, or, sql } from "drizzle-orm";
import { newId } from "../../utils/ids.server";
import type { NodeKey } from "../../domain/address-space/node-id";
import type { Transaction } from "../../domain/editing/operation";
import { getDatabase } from "../client.server";
import { model, revision, sheet, snapshot, transaction, type SheetLayout } from "../schema/models";
import { eventEntry } from "../schema/operations";

export type ModelRow = typeof model.$inferSelect;
export type RevisionRow = typeof revision.$inferSelect;
export type SheetRow = typeof sheet.$inferSelect;

export async function findModel(id: string): Promise<ModelRow | undefined> {
  const [row] = await getDatabase().select().from(model).where(eq(model.id, id));
  return row;
}

/** The model that stands for the namespace; its variants do not. */
export async function findModelByNamespace(organizationId: string, namespaceUri: string): Promise<ModelRow | undefined> {
  const [row] = await getDatabase()
    .select()
    .from(model)
    .where(and(eq(model.organizationId, organizationId), eq(model.namespaceUri, namespaceUri), isNull(model.variantOf)));
  return row;
}

/** The models of an organisation without their variants. */
export async function listModels(organizationId: string): Promise<ModelRow[]> {
  return getDatabase()
    .select()
    .from(model)
    .where(and(eq(model.organizationId, organizationId), isNull(model.variantOf)))
    .orderBy(asc(model.name), asc(model.id));
}

export async function listVariants(modelId: string): Promise<ModelRow[]> {
  return getDatabase().select().from(model).where(eq(model.variantOf, modelId)).orderBy(asc(model.name), asc(model.id));
}

export function addModelStatement(row: typeof model.$inferInsert) {
  return getDatabase().insert(model).values(row);
}

export function updateModelStatement(id: string, change: Partial<typeof model.$inferInsert>) {
  return getDatabase().update(model).set(change).where(eq(model.id, id));
}

export function removeModelStatement(id: string) {
  return getDatabase().delete(model).where(eq(model.id, id));
}

export function addRevisionStatement(row: Omit<typeof revision.$inferInsert, "id"> & { id?: string }) {
  return getDatabase()
    .insert(revision)
    .values({ ...row, id: row.id ?? newId() });
}

export async function listRevisions(modelId: string): Promise<RevisionRow[]> {
  return getDatabase().select().from(revision).where(eq(revision.modelId, modelId)).orderBy(desc(revision.number));
}

export async function findRevisionByNumber(modelId: string, number: number): Promise<RevisionRow | undefined> {
  const [row] = await getDatabase()
    .select()
    .from(revision)
    .where(and(eq(revision.modelId, modelId), eq(revision.number, number)));
  return row;
}

/** Whether a model of the organisation stands on these contents, at once or through what its revision was frozen on. */
export async function hasPinnedPack(organizationId: string, hash: string): Promise<boolean> {
  const [row] = await getDatabase()
    .select({ id: model.id })
    .from(model)
    .leftJoin(revision, eq(revision.modelId, model.id))
    .where(and(eq(model.organizationId, organizationId), or(like(model.pins, `%${hash}%`), like(revision.pinned, `%${hash}%`))))
    .limit(1);
  return row !== undefined;
}

/** The newest stored state at or before `seq`: a snapshot, or revision 0. */
export async function findStoredState(modelId: string, seq: number): Promise<{ seq: number; packHash: string } | undefined> {
  const db = getDatabase();
  const [kept] = await db
    .select({ seq: snapshot.seq, packHash: snapshot.packHash })
    .from(snapshot)
    .where(and(eq(snapshot.modelId, modelId), lte(snapshot.seq, seq)))
    .orderBy(desc(snapshot.seq))
    .limit(1);
  const [frozen] = await db
    .select({ seq: revision.seq, packHash: revision.packHash })
    .from(revision)
    .where(and(eq(revision.modelId, modelId), lte(revision.seq, seq)))
    .orderBy(desc(revision.seq))
    .limit(1);
  if (!kept || !frozen) return kept ?? frozen;
  return kept.seq > frozen.seq ? kept : frozen;
}

export function addSnapshotStatement(modelId: string, seq: number, packHash: string) {
  return getDatabase().insert(snapshot).values({ modelId, seq, packHash }).onConflictDoNothing();
}

/** Removes snapshots older than the newest two; blobs stay until nobody names them. */
export async function pruneSnapshots(modelId: string): Promise<void> {
  const kept = await getDatabase()
    .select({ seq: snapshot.seq })
    .from(snapshot)
    .where(eq(snapshot.modelId, modelId))
    .orderBy(desc(snapshot.seq));
  const old = kept.slice(2).map((row) => row.seq);
  if (old.length > 0) await getDatabase().delete(snapshot).where(and(eq(snapshot.modelId, modelId), inArray(snapshot.seq, old)));
}

type TransactionRow = typeof transaction.$inferSelect;

function toTransaction(row: TransactionRow): Transaction {
  const { seq, base, clientId, clientSeq, author, at, label, operations, inverse } = row;
  return { seq, base, clientId, clientSeq, author, at, label, operations, inverse };
}

/** Transactions after `since`, oldest first, at most `limit`. */
export async function listTransactions(modelId: string, since: number, limit: number): Promise<Transaction[]> {
  const rows = await getDatabase()
    .select()
    .from(transaction)
    .where(and(eq(transaction.modelId, modelId), gt(transaction.seq, since)))
    .orderBy(asc(transaction.seq))
    .limit(limit);
  return rows.map(toTransaction);
}

/** The newest transactions that gave nodes other NodeIds; the caller looks at the operations themselves. */
export async function listRenumberingTransactions(modelId: string, limit: number): Promise<Transaction[]> {
  const renumbers = or(
    like(transaction.operations, '%"kind":"renumber"%'),
    like(transaction.operations, '%"attribute":"nodeId"%'),
  );
  const rows = await getDatabase()
    .select()
    .from(transaction)
    .where(and(eq(transaction.modelId, modelId), renumbers))
    .orderBy(desc(transaction.seq))
    .limit(limit);
  return rows.map(toTransaction);
}

/** The newest transactions before `before` that name the node in what they did. */
export async function listNodeTransactions(
  modelId: string,
  key: NodeKey,
  before: number,
  limit: number,
): Promise<Transaction[]> {
  const named = sql`instr(${transaction.operations}, ${JSON.stringify(key)}) > 0`;
  const rows = await getDatabase()
    .select()
    .from(transaction)
    .where(and(eq(transaction.modelId, modelId), lt(transaction.seq, before), named))
    .orderBy(desc(transaction.seq))
    .limit(limit);
  return rows.map(toTransaction);
}

export async function findTransaction(modelId: string, seq: number): Promise<Transaction | undefined> {
  const [row] = await getDatabase()
    .select()
    .from(transaction)
    .where(and(eq(transaction.modelId, modelId), eq(transaction.seq, seq)));
  return row ? toTransaction(row) : undefined;
}

export type AcceptedTransaction = { readonly clientSeq: number; readonly seq: number; readonly at: string };

/** Which of these were accepted before: the answer to a resend. */
export async function findAccepted(modelId: string, clientId: string, clientSeqs: readonly number[]): Promise<AcceptedTransaction[]> {
  const found: AcceptedTransaction[] = [];
  for (let i = 0; i < clientSeqs.length; i += 500) {
    const rows = await getDatabase()
      .select({ clientSeq: transaction.clientSeq, seq: transaction.seq, at: transaction.at })
      .from(transaction)
      .where(
        and(
          eq(transaction.modelId, modelId),
          eq(transaction.clientId, clientId),
          inArray(transaction.clientSeq, clientSeqs.slice(i, i + 500)),
        ),
      );
    found.push(...rows);
  }
  return found;
}

export function addTransactionStatement(modelId: string, authorId: string, entry: Transaction) {
  return getDatabase()
    .insert(transaction)
    .values({ ...entry, modelId, authorId });
}

export function addEventStatement(topic: string, reference: number, at: Date) {
  return getDatabase().insert(eventEntry).values({ topic, reference, at }).returning({ seq: eventEntry.seq });
}

export async function listEventsAfter(topic: string, seq: number, limit: number) {
  return getDatabase()
    .select({ seq: eventEntry.seq, reference: eventEntry.reference })
    .from(eventEntry)
    .where(and(eq(eventEntry.topic, topic), gt(eventEntry.seq, seq)))
    .orderBy(asc(eventEntry.seq))
    .limit(limit);
}

/** The newest number of the global sequence; 0 before the first event. */
export async function findHighestEvent(): Promise<number> {
  const [row] = await getDatabase().select({ seq: eventEntry.seq }).from(eventEntry).orderBy(desc(eventEntry.seq)).limit(1);
  return row?.seq ?? 0;
}

export async function listAllEventsAfter(seq: number, limit: number) {
  return getDatabase()
    .select({ seq: eventEntry.seq, topic: eventEntry.topic, reference: eventEntry.reference })
    .from(eventEntry)
    .where(gt(eventEntry.seq, seq))
    .orderBy(asc(eventEntry.seq))
    .limit(limit);
}

export async function listSheets(modelId: string): Promise<SheetRow[]> {
  return getDatabase().select().from(sheet).where(eq(sheet.modelId, modelId)).orderBy(asc(sheet.position), asc(sheet.id));
}

export async function findSheet(modelId: string, id: string): Promise<SheetRow | undefined> {
  const [row] = await getDatabase()
    .select()
    .from(sheet)
    .where(and(eq(sheet.modelId, modelId), eq(sheet.id, id)));
  return row;
}

export function addSheetStatement(row: typeof sheet.$inferInsert) {
  return getDatabase().insert(sheet).values(row);
}

/** Saves a layout when the version is still the one that the window saw; answers whether it was. */
export async function saveSheet(
  id: string,
  seen: number,
  change: { name?: string; layout?: SheetLayout; updatedBy: string; updatedAt: Date },
): Promise<boolean> {
  const result = await getDatabase()
    .update(sheet)
    .set({ ...change, version: seen + 1 })
    .where(and(eq(sheet.id, id), eq(sheet.version, seen)));
  return result.rowsAffected === 1;
}

export function placeSheetStatement(id: string, position: number) {
  return getDatabase().update(sheet).set({ position }).where(eq(sheet.id, id));
}

export function removeSheetStatement(id: string) {
  return getDatabase().delete(sheet).where(eq(sheet.id, id));
}
