/** Export templates of a team: kept, previewed on a machine, and tested like check cases. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { writeBatch } from "../db/client.server";
import { addAuditStatement } from "../db/repositories/audit.server";
import {
  findExportTemplate,
  listExportTemplates,
  removeExportTemplateStatement,
  saveExportTemplateStatement,
  type ExportTemplateRow,
} from "../db/repositories/export-templates.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { makeTemplateData } from "../domain/deliver/template-data";
import { newId } from "../utils/ids.server";
import { findOwnModel, makeDocument } from "./deliver-mapping.server";
import { renderTemplate, TEMPLATE_LIMITS } from "./render-template.server";
import { loadWorkingModel } from "./working-model.server";

const text = z.string().max(TEMPLATE_LIMITS.characters);
const modelId = z.string().min(1).max(50);
/** Key or name of a machine, or of a machine type. */
const of = z.string().min(1).max(5_000);

export const exportTemplateSchema = z.strictObject({
  id: z.string().max(50).optional(),
  name: z.string().trim().min(1).max(100),
  gatewayType: z.string().trim().max(100).default(""),
  /** `{name}` stands for the machine. */
  fileName: z.string().trim().min(1).max(200).default("{name}.txt"),
  template: text,
  cases: z.array(z.strictObject({ name: z.string().min(1).max(200), modelId, machineKey: of, expected: text })).max(50).default([]),
});
export type ExportTemplateIntent = z.infer<typeof exportTemplateSchema>;

export const templatePreviewSchema = z.strictObject({ template: text, modelId, of: of.optional() });

/** Problems: `template.name-taken`, `template.syntax`, `request.not-found`. */
export async function saveExportTemplate(caller: Caller, organizationId: string, intent: ExportTemplateIntent): Promise<Result<{ id: string }>> {
  const rows = await listExportTemplates(organizationId);
  const before = rows.find((row) => row.id === intent.id);
  if (intent.id !== undefined && !before) return fail(problem("request.not-found"));
  if (rows.some((row) => row.name === intent.name && row.id !== intent.id)) return fail(problem("template.name-taken", { name: intent.name }));
  const id = before?.id ?? newId();
  const { name, gatewayType, fileName, template, cases } = intent;
  await writeBatch([
    saveExportTemplateStatement({ id, organizationId, name, gatewayType, fileName, template, cases, updatedBy: caller.name, updatedAt: new Date() }),
    auditOf(caller, organizationId, before ? "template.change" : "template.add", id, name),
  ]);
  return ok({ id });
}

/** Problem: `request.not-found`. */
export async function removeExportTemplate(caller: Caller, organizationId: string, id: string): Promise<Result<null>> {
  const row = await findExportTemplate(id);
  if (row?.organizationId !== organizationId) return fail(problem("request.not-found"));
  await writeBatch([removeExportTemplateStatement(id), auditOf(caller, organizationId, "template.remove", id, row.name)]);
  return ok(null);
}

/** The text that a template makes, whether it is saved or not. Problems: those of the document and of the template. */
export async function previewTemplate(organizationId: string, intent: z.infer<typeof templatePreviewSchema>): Promise<Result<{ text: string }>> {
  const model = await findOwnModel(organizationId, intent.modelId);
  const working = model && (await loadWorkingModel(model.id));
  if (!model || !working) return fail(problem("request.not-found"));
  const document = await makeDocument(model, working.space, intent.of);
  if (!document.ok) return document;
  const rendered = await renderTemplate(intent.template, makeTemplateData(document.value));
  return rendered.ok ? ok({ text: rendered.value }) : rendered;
}

export type TemplateCaseResult = { readonly name: string; readonly holds: boolean; /** First line that differs, from 1; 0 where none does. */ readonly line: number; readonly message: string };

/** Runs the cases of a template: the text must be the expected one, line by line. Problem: `request.not-found`. */
export async function runTemplateCases(organizationId: string, id: string): Promise<Result<TemplateCaseResult[]>> {
  const row = await findExportTemplate(id);
  return row?.organizationId === organizationId ? ok(await runCases(row)) : fail(problem("request.not-found"));
}

async function runCases(row: ExportTemplateRow): Promise<TemplateCaseResult[]> {
  const results: TemplateCaseResult[] = [];
  for (const { name, modelId: id, machineKey, expected } of row.cases) {
    const made = await previewTemplate(row.organizationId, { template: row.template, modelId: id, of: machineKey });
    if (!made.ok) {
      results.push({ name, holds: false, line: made.problems[0]?.at?.line ?? 0, message: made.problems[0]?.code ?? "" });
      continue;
    }
    const [wanted, found] = [expected.split(/\r?\n/), made.value.text.split(/\r?\n/)];
    const line = wanted.findIndex((text, i) => text !== found[i]);
    const at = line >= 0 ? line : wanted.length === found.length ? -1 : wanted.length;
    results.push({ name, holds: at < 0, line: at + 1, message: at < 0 ? "" : (found[at] ?? "the text ends here") });
  }
  return results;
}

function auditOf(caller: Caller, organizationId: string, action: string, id: string, name: string) {
  return addAuditStatement({ organizationId, userId: caller.userId, userName: caller.name, action, subject: { kind: "export-template", id, name } });
}
