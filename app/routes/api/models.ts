import { z } from "zod";
import { assertMay, requireCaller, requireOrganization } from "~/auth/caller.server";
import { presentModels } from "~/presenters/api-models.server";
import { toModelJson } from "~/utils/api-schemas";
import { importModel } from "~/services/import-model.server";
import { MAX_UPLOAD_BYTES, readUpload } from "~/services/read-upload.server";
import { toFileName } from "~/services/export-model.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireFields, requireMediaType, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import { readBody } from "~/utils/read-body.server";
import type { Route } from "./+types/models";

const querySchema = z.object({ name: z.string().trim().min(1).max(100).optional(), kind: z.enum(["types", "machines"]).optional() });

/** `GET /api/v1/models` */
export const loader = handleApi(async ({ request }: Route.LoaderArgs) => {
  const caller = await requireCaller(request);
  const { organizationId } = requireOrganization(request, caller);
  assertMay(caller, "read", organizationId);
  return Response.json(await presentModels(organizationId), { headers: { "cache-control": "no-store" } });
});

/** `POST /api/v1/models?name=` with a NodeSet2 file as the body. */
export const action = handleApi(async ({ request }: Route.ActionArgs) => {
  const caller = await requireCaller(request);
  requireMethod(request, "POST");
  const { organizationId } = requireOrganization(request, caller);
  assertMay(caller, "model.edit", organizationId);
  requireMediaType(request, "application/xml", "text/xml");
  const { name, kind } = requireFields(querySchema, Object.fromEntries(new URL(request.url).searchParams));
  const body = await readBody(request, MAX_UPLOAD_BYTES, "limit.file-size");
  if (!body.ok) return problemResponse(body.problems[0]?.code === "limit.file-size" ? 413 : 422, body.problems);
  const upload = await readUpload(body.value, `${name === undefined ? "upload" : toFileName(name)}.xml`, { signal: request.signal });
  if (!upload.ok) return problemResponse(422, upload.problems);
  const intent = { ...(name === undefined ? {} : { name }), ...(kind === undefined ? {} : { kind }) };
  const imported = await importModel(caller, organizationId, upload.value, intent);
  if (!imported.ok) {
    const isTaken = imported.problems.every((p) => p.code === "model.namespace-taken");
    return problemResponse(isTaken ? 409 : 422, imported.problems);
  }
  const model = toModelJson(imported.value);
  return Response.json(model, { status: 201, headers: { location: `/api/v1/models/${model.id}` } });
});
