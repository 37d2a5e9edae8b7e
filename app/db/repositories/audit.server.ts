import { and, desc, eq, lt } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { auditEntry } from "../schema/operations";

export type AuditRow = typeof auditEntry.$inferSelect;

export type NewAuditEntry = {
  readonly organizationId: string;
  readonly userId: string | null;
  readonly userName: string;
  /** `<subject>.<verb>`, for example `model.import`. */
  readonly action: string;
  readonly subject: { readonly kind: string; readonly id: string; readonly name: string };
  readonly details?: Readonly<Record<string, unknown>>;
};

/** The statement for the batch of the act itself, so that neither exists without the other. */
export function addAuditStatement(entry: NewAuditEntry, at = new Date()) {
  return getDatabase()
    .insert(auditEntry)
    .values({
      organizationId: entry.organizationId,
      at,
      userId: entry.userId,
      userName: entry.userName,
      action: entry.action,
      subjectKind: entry.subject.kind,
      subjectId: entry.subject.id,
      subjectName: entry.subject.name,
      details: entry.details ?? {},
    });
}

/** Newest first; `before` is the id of the last entry of the page before. */
export async function listAudit(organizationId: string, limit: number, before?: number): Promise<AuditRow[]> {
  return getDatabase()
    .select()
    .from(auditEntry)
    .where(and(eq(auditEntry.organizationId, organizationId), before === undefined ? undefined : lt(auditEntry.id, before)))
    .orderBy(desc(auditEntry.id))
    .limit(limit);
}
