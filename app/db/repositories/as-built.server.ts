/** As-built reports and point checks. */
import { and, desc, eq, max } from "drizzle-orm";
import { getDatabase, type Statement } from "../client.server";
import { asBuiltReport, pointCheck } from "../schema/live";

export type AsBuiltRow = typeof asBuiltReport.$inferSelect;
export type PointCheckRow = typeof pointCheck.$inferSelect;

export async function listAsBuiltReports(modelId: string, limit = 200): Promise<AsBuiltRow[]> {
  return getDatabase().select().from(asBuiltReport).where(eq(asBuiltReport.modelId, modelId)).orderBy(desc(asBuiltReport.number)).limit(limit);
}

export async function findAsBuiltReport(id: string): Promise<AsBuiltRow | undefined> {
  return getDatabase().query.asBuiltReport.findFirst({ where: eq(asBuiltReport.id, id) });
}

export async function findHighestReportNumber(modelId: string): Promise<number> {
  const [row] = await getDatabase().select({ highest: max(asBuiltReport.number) }).from(asBuiltReport).where(eq(asBuiltReport.modelId, modelId));
  return row?.highest ?? 0;
}

export function addAsBuiltStatement(row: typeof asBuiltReport.$inferInsert): Statement {
  return getDatabase().insert(asBuiltReport).values(row);
}

/** Newest first; of one machine when it is named. */
export async function listPointChecks(modelId: string, machineKey?: string): Promise<PointCheckRow[]> {
  return getDatabase()
    .select()
    .from(pointCheck)
    .where(and(eq(pointCheck.modelId, modelId), machineKey === undefined ? undefined : eq(pointCheck.machineKey, machineKey)))
    .orderBy(desc(pointCheck.at))
    .limit(2_000);
}

export function addPointCheckStatement(row: typeof pointCheck.$inferInsert): Statement {
  return getDatabase().insert(pointCheck).values(row);
}
