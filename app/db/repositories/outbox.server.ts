/** Queued e-mails and webhook calls. */
import { and, asc, desc, eq, inArray, lte } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { mail, webhook, webhookDelivery } from "../schema/outbox";
import { mailRefusal } from "../schema/reviews";

export type MailRow = typeof mail.$inferSelect;
export type WebhookRow = typeof webhook.$inferSelect;
export type WebhookDeliveryRow = typeof webhookDelivery.$inferSelect;

export function addMailStatement(row: typeof mail.$inferInsert) {
  return getDatabase().insert(mail).values(row);
}

export async function listDueMail(now: Date, limit: number): Promise<MailRow[]> {
  return getDatabase()
    .select()
    .from(mail)
    .where(and(eq(mail.state, "waiting"), lte(mail.nextAttemptAt, now)))
    .orderBy(asc(mail.nextAttemptAt))
    .limit(limit);
}

export function updateMailStatement(id: string, change: Partial<typeof mail.$inferInsert>) {
  return getDatabase().update(mail).set(change).where(eq(mail.id, id));
}

/** Takes a mail for sending; false when somebody else was quicker. */
export async function claimMail({ id, nextAttemptAt }: MailRow, until: Date): Promise<boolean> {
  const result = await getDatabase()
    .update(mail)
    .set({ nextAttemptAt: until })
    .where(and(eq(mail.id, id), eq(mail.state, "waiting"), eq(mail.nextAttemptAt, nextAttemptAt)));
  return result.rowsAffected === 1;
}

/** Newest first. */
export async function listMail(organizationId: string, limit: number): Promise<MailRow[]> {
  return getDatabase().select().from(mail).where(eq(mail.organizationId, organizationId)).orderBy(desc(mail.createdAt), desc(mail.id)).limit(limit);
}

export async function findMail(id: string): Promise<MailRow | undefined> {
  const [row] = await getDatabase().select().from(mail).where(eq(mail.id, id));
  return row;
}

/** Users among these who do not want mails of the kind. */
export async function listRefusing(userIds: readonly string[], kind: string): Promise<Set<string>> {
  if (userIds.length === 0) return new Set();
  const rows = await getDatabase()
    .select({ userId: mailRefusal.userId })
    .from(mailRefusal)
    .where(and(inArray(mailRefusal.userId, [...userIds]), eq(mailRefusal.kind, kind)));
  return new Set(rows.map((row) => row.userId));
}

export async function listRefusals(userId: string): Promise<string[]> {
  const rows = await getDatabase().select({ kind: mailRefusal.kind }).from(mailRefusal).where(eq(mailRefusal.userId, userId));
  return rows.map((row) => row.kind);
}

export function addRefusalStatement(userId: string, kind: string, at: Date) {
  return getDatabase().insert(mailRefusal).values({ userId, kind, at }).onConflictDoNothing();
}

export function removeRefusalStatement(userId: string, kind: string) {
  return getDatabase().delete(mailRefusal).where(and(eq(mailRefusal.userId, userId), eq(mailRefusal.kind, kind)));
}

export async function listWebhooks(organizationId: string): Promise<WebhookRow[]> {
  return getDatabase().select().from(webhook).where(eq(webhook.organizationId, organizationId)).orderBy(asc(webhook.createdAt), asc(webhook.id));
}

export async function findWebhook(id: string): Promise<WebhookRow | undefined> {
  const [row] = await getDatabase().select().from(webhook).where(eq(webhook.id, id));
  return row;
}

export function addWebhookStatement(row: typeof webhook.$inferInsert) {
  return getDatabase().insert(webhook).values(row);
}

export function removeWebhookStatement(id: string) {
  return getDatabase().delete(webhook).where(eq(webhook.id, id));
}

export function addWebhookDeliveryStatement(row: typeof webhookDelivery.$inferInsert) {
  return getDatabase().insert(webhookDelivery).values(row);
}

export async function listDueWebhookDeliveries(now: Date, limit: number): Promise<WebhookDeliveryRow[]> {
  return getDatabase()
    .select()
    .from(webhookDelivery)
    .where(and(eq(webhookDelivery.state, "waiting"), lte(webhookDelivery.nextAttemptAt, now)))
    .orderBy(asc(webhookDelivery.nextAttemptAt))
    .limit(limit);
}

export async function claimWebhookDelivery({ id, nextAttemptAt }: WebhookDeliveryRow, until: Date): Promise<boolean> {
  const result = await getDatabase()
    .update(webhookDelivery)
    .set({ nextAttemptAt: until })
    .where(and(eq(webhookDelivery.id, id), eq(webhookDelivery.state, "waiting"), eq(webhookDelivery.nextAttemptAt, nextAttemptAt)));
  return result.rowsAffected === 1;
}

export function updateWebhookDeliveryStatement(id: string, change: Partial<typeof webhookDelivery.$inferInsert>) {
  return getDatabase().update(webhookDelivery).set(change).where(eq(webhookDelivery.id, id));
}

/** Newest first. */
export async function listWebhookDeliveries(webhookIds: readonly string[], limit: number): Promise<WebhookDeliveryRow[]> {
  if (webhookIds.length === 0) return [];
  return getDatabase()
    .select()
    .from(webhookDelivery)
    .where(inArray(webhookDelivery.webhookId, [...webhookIds]))
    .orderBy(desc(webhookDelivery.createdAt), desc(webhookDelivery.id))
    .limit(limit);
}
