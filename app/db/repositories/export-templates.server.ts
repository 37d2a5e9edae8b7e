/** Text templates that a team writes for its gateways. */
import { asc, eq } from "drizzle-orm";
import { getDatabase } from "../client.server";
import { exportTemplate } from "../schema/sources";

export type ExportTemplateRow = typeof exportTemplate.$inferSelect;

export async function listExportTemplates(organizationId: string): Promise<ExportTemplateRow[]> {
  return getDatabase().select().from(exportTemplate).where(eq(exportTemplate.organizationId, organizationId)).orderBy(asc(exportTemplate.name));
}

export async function findExportTemplate(id: string): Promise<ExportTemplateRow | undefined> {
  const [row] = await getDatabase().select().from(exportTemplate).where(eq(exportTemplate.id, id));
  return row;
}

export function saveExportTemplateStatement(row: ExportTemplateRow) {
  const { name, gatewayType, fileName, template, cases, updatedBy, updatedAt } = row;
  return getDatabase()
    .insert(exportTemplate)
    .values(row)
    .onConflictDoUpdate({ target: exportTemplate.id, set: { name, gatewayType, fileName, template, cases, updatedBy, updatedAt } });
}

export function removeExportTemplateStatement(id: string) {
  return getDatabase().delete(exportTemplate).where(eq(exportTemplate.id, id));
}
