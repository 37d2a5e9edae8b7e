/** Accepted findings. */
import { and, asc, eq } from "drizzle-orm";
import type { Waiver } from "../../domain/checks/waivers";
import { getDatabase } from "../client.server";
import { findingWaiver } from "../schema/models";

type WaiverRow = typeof findingWaiver.$inferSelect;

/** A waiver with the id by which it can be taken back. */
export type StoredWaiver = Waiver & { readonly id: string };

export async function listWaivers(modelId: string): Promise<StoredWaiver[]> {
  const rows = await getDatabase()
    .select()
    .from(findingWaiver)
    .where(eq(findingWaiver.modelId, modelId))
    .orderBy(asc(findingWaiver.at), asc(findingWaiver.id));
  return rows.map(({ id, rule, nodeId, attribute, reason, person, at, fingerprint }) => ({
    id,
    rule,
    nodeId,
    ...(attribute === "" ? {} : { attribute }),
    reason,
    person,
    date: at.toISOString(),
    fingerprint,
  }));
}

export function listWaiverRows(modelId: string): Promise<WaiverRow[]> {
  return getDatabase().select().from(findingWaiver).where(eq(findingWaiver.modelId, modelId));
}

export async function findWaiver(modelId: string, id: string): Promise<WaiverRow | undefined> {
  const [row] = await getDatabase()
    .select()
    .from(findingWaiver)
    .where(and(eq(findingWaiver.modelId, modelId), eq(findingWaiver.id, id)));
  return row;
}

/** A waiver for the same place is renewed. */
export function saveWaiverStatement(row: WaiverRow) {
  const { id, reason, person, at, fingerprint } = row;
  return getDatabase()
    .insert(findingWaiver)
    .values(row)
    .onConflictDoUpdate({
      target: [findingWaiver.modelId, findingWaiver.rule, findingWaiver.nodeId, findingWaiver.attribute],
      set: { id, reason, person, at, fingerprint },
    });
}

export function removeWaiverStatement(id: string) {
  return getDatabase().delete(findingWaiver).where(eq(findingWaiver.id, id));
}
