import { assertMay, requireCaller } from "~/auth/caller.server";
import { chooseOrganization } from "~/presenters/chosen-organization.server";
import { presentExportTemplates } from "~/presenters/export-templates.server";
import { exportTemplateSchema, previewTemplate, removeExportTemplate, runTemplateCases, saveExportTemplate, templatePreviewSchema } from "~/services/export-templates.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import { z } from "zod";
import type { Route } from "./+types/export-templates";

const bodySchema = z.discriminatedUnion("act", [
  z.strictObject({ act: z.literal("save"), ...exportTemplateSchema.shape }),
  z.strictObject({ act: z.literal("preview"), ...templatePreviewSchema.shape }),
  z.strictObject({ act: z.literal("run-cases"), id: z.string().max(50) }),
  z.strictObject({ act: z.literal("remove"), id: z.string().max(50) }),
]);

/** `GET /export-templates`: those of the chosen organisation. */
export async function loader({ request }: Route.LoaderArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return Response.json(await presentExportTemplates(organizationId), { headers: { "cache-control": "no-store" } });
}

/** `POST /export-templates` `{act: "save" | "preview" | "run-cases" | "remove", …}`. */
export async function action({ request }: Route.ActionArgs): Promise<Response> {
  const caller = await requireCaller(request);
  const { organizationId } = chooseOrganization(request, caller);
  assertMay(caller, "mapping.edit", organizationId);
  requireMethod(request, "POST");
  const body = await requireJson(request, bodySchema);
  switch (body.act) {
    case "save": {
      const { act: _act, ...intent } = body;
      const saved = await saveExportTemplate(caller, organizationId, intent);
      return saved.ok ? Response.json(saved.value, { status: 201 }) : problemResponse(422, saved.problems);
    }
    case "preview": {
      const made = await previewTemplate(organizationId, body);
      return made.ok ? Response.json(made.value) : problemResponse(422, made.problems);
    }
    case "run-cases": {
      const run = await runTemplateCases(organizationId, body.id);
      return run.ok ? Response.json({ cases: run.value }) : problemResponse(404, run.problems);
    }
    case "remove": {
      const removed = await removeExportTemplate(caller, organizationId, body.id);
      return removed.ok ? new Response(null, { status: 204 }) : problemResponse(404, removed.problems);
    }
  }
}
