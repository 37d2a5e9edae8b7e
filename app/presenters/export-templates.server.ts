/** Export templates as their page and data route show them. */
import { listExportTemplates } from "../db/repositories/export-templates.server";

export type ExportTemplateView = {
  readonly id: string;
  readonly name: string;
  readonly gatewayType: string;
  readonly fileName: string;
  readonly template: string;
  readonly cases: readonly { readonly name: string; readonly modelId: string; readonly machineKey: string; readonly expected: string }[];
  readonly updatedBy: string;
  readonly updatedAt: string;
};

export async function presentExportTemplates(organizationId: string): Promise<ExportTemplateView[]> {
  const rows = await listExportTemplates(organizationId);
  return rows.map(({ id, name, gatewayType, fileName, template, cases, updatedBy, updatedAt }) => ({
    id,
    name,
    gatewayType,
    fileName,
    template,
    cases,
    updatedBy,
    updatedAt: updatedAt.toISOString(),
  }));
}
