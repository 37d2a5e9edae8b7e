/** Releases, their deliveries, the readers of nodes, what an organisation asks of releases, and its signing keys. */
import { and, asc, desc, eq, inArray, isNull } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { model } from "../schema/models";
import { delivery, reader, release, releasePolicy, signingKey } from "../schema/reviews";
import { gateway } from "../schema/sources";

export type ReleaseRow = typeof release.$inferSelect;
export type DeliveryRow = typeof delivery.$inferSelect;
export type ReaderRow = typeof reader.$inferSelect;
export type SigningKeyRow = typeof signingKey.$inferSelect;

export async function findRelease(id: string): Promise<ReleaseRow | undefined> {
  const [row] = await getDatabase().select().from(release).where(eq(release.id, id));
  return row;
}

/** Newest first, withdrawn ones among them. */
export async function listReleases(modelId: string): Promise<ReleaseRow[]> {
  return getDatabase().select().from(release).where(eq(release.modelId, modelId)).orderBy(desc(release.at), desc(release.id));
}

export type ListedRelease = { readonly release: ReleaseRow; readonly model: string };

export async function listOrganizationReleases(organizationId: string): Promise<ListedRelease[]> {
  return getDatabase()
    .select({ release, model: model.name })
    .from(release)
    .innerJoin(model, eq(release.modelId, model.id))
    .where(eq(release.organizationId, organizationId))
    .orderBy(desc(release.at), desc(release.id));
}

export function addReleaseStatement(row: typeof release.$inferInsert) {
  return getDatabase().insert(release).values(row);
}

export function updateReleaseStatement(id: string, change: Partial<typeof release.$inferInsert>) {
  return getDatabase().update(release).set(change).where(eq(release.id, id));
}

/** Newest first. */
export async function listDeliveries(releaseIds: readonly string[]): Promise<DeliveryRow[]> {
  if (releaseIds.length === 0) return [];
  return getDatabase()
    .select()
    .from(delivery)
    .where(inArray(delivery.releaseId, [...releaseIds]))
    .orderBy(desc(delivery.sentAt), desc(delivery.id));
}

export async function findDelivery(id: string): Promise<DeliveryRow | undefined> {
  const [row] = await getDatabase().select().from(delivery).where(eq(delivery.id, id));
  return row;
}

export function addDeliveryStatement(row: typeof delivery.$inferInsert) {
  return getDatabase().insert(delivery).values(row);
}

export function updateDeliveryStatement(id: string, change: Partial<typeof delivery.$inferInsert>) {
  return getDatabase().update(delivery).set(change).where(eq(delivery.id, id));
}

export async function listGatewayNames(organizationId: string): Promise<{ id: string; name: string }[]> {
  return getDatabase()
    .select({ id: gateway.id, name: gateway.name })
    .from(gateway)
    .where(eq(gateway.organizationId, organizationId))
    .orderBy(asc(gateway.name));
}

export async function listReaders(organizationId: string): Promise<ReaderRow[]> {
  return getDatabase().select().from(reader).where(eq(reader.organizationId, organizationId)).orderBy(asc(reader.name));
}

export async function findReader(id: string): Promise<ReaderRow | undefined> {
  const [row] = await getDatabase().select().from(reader).where(eq(reader.id, id));
  return row;
}

export function saveReaderStatement(row: typeof reader.$inferInsert) {
  const { name, about, contact, nodeIds, updatedBy, updatedAt } = row;
  return getDatabase()
    .insert(reader)
    .values(row)
    .onConflictDoUpdate({ target: reader.id, set: { name, about, contact, nodeIds, updatedBy, updatedAt } });
}

export function removeReaderStatement(id: string) {
  return getDatabase().delete(reader).where(eq(reader.id, id));
}

const DEFAULT_APPROVALS = 1;

/** How many approvals a release needs. */
export async function findNeededApprovals(organizationId: string): Promise<number> {
  const [row] = await getDatabase().select().from(releasePolicy).where(eq(releasePolicy.organizationId, organizationId));
  return row?.approvals ?? DEFAULT_APPROVALS;
}

export function savePolicyStatement(row: typeof releasePolicy.$inferInsert) {
  const { approvals, updatedBy, updatedAt } = row;
  return getDatabase()
    .insert(releasePolicy)
    .values(row)
    .onConflictDoUpdate({ target: releasePolicy.organizationId, set: { approvals, updatedBy, updatedAt } });
}

/** The key that signs now. */
export async function findSigningKey(organizationId: string): Promise<SigningKeyRow | undefined> {
  const [row] = await getDatabase()
    .select()
    .from(signingKey)
    .where(and(eq(signingKey.organizationId, organizationId), isNull(signingKey.retiredAt)))
    .orderBy(desc(signingKey.createdAt));
  return row;
}

export async function findSigningKeyById(id: string): Promise<SigningKeyRow | undefined> {
  const [row] = await getDatabase().select().from(signingKey).where(eq(signingKey.id, id));
  return row;
}

export function addSigningKeyStatement(row: typeof signingKey.$inferInsert) {
  return getDatabase().insert(signingKey).values(row);
}
