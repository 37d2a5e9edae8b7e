/** As-built reports that are made again and again. */
import { and, asc, eq, lte } from "drizzle-orm";
import { getDatabase, type Statement } from "../client.server";
import { asBuiltSchedule, endpoint } from "../schema/live";

export type ScheduleRow = typeof asBuiltSchedule.$inferSelect;

export async function listSchedules(modelId: string): Promise<(ScheduleRow & { readonly endpointName: string })[]> {
  const rows = await getDatabase()
    .select({ schedule: asBuiltSchedule, endpointName: endpoint.name })
    .from(asBuiltSchedule)
    .innerJoin(endpoint, eq(asBuiltSchedule.endpointId, endpoint.id))
    .where(eq(asBuiltSchedule.modelId, modelId))
    .orderBy(asc(endpoint.name));
  return rows.map(({ schedule, endpointName }) => ({ ...schedule, endpointName }));
}

export async function listDueSchedules(now: Date): Promise<ScheduleRow[]> {
  return getDatabase().select().from(asBuiltSchedule).where(lte(asBuiltSchedule.nextAt, now)).orderBy(asc(asBuiltSchedule.nextAt)).limit(20);
}

/** One schedule a model and endpoint: a second takes the place of the first. */
export function saveScheduleStatement(row: ScheduleRow): Statement {
  const { everyMinutes, nextAt, madeBy } = row;
  return getDatabase()
    .insert(asBuiltSchedule)
    .values(row)
    .onConflictDoUpdate({ target: [asBuiltSchedule.modelId, asBuiltSchedule.endpointId], set: { everyMinutes, nextAt, madeBy } });
}

export function updateScheduleStatement(id: string, change: Partial<Pick<ScheduleRow, "nextAt" | "lastVerdict" | "lastAt">>): Statement {
  return getDatabase().update(asBuiltSchedule).set(change).where(eq(asBuiltSchedule.id, id));
}

export function removeScheduleStatement(modelId: string, id: string): Statement {
  return getDatabase().delete(asBuiltSchedule).where(and(eq(asBuiltSchedule.modelId, modelId), eq(asBuiltSchedule.id, id)));
}
