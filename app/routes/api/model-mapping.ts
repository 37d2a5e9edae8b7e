import { requireModel } from "~/auth/require-model.server";
import { MAX_DOCUMENT_CHARACTERS } from "~/domain/deliver/mapping-document";
import { deliverMapping, importMappingDocument } from "~/services/deliver-mapping.server";
import { handleApi } from "~/utils/api-handler.server";
import { requireFields, requireMediaType, requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import { readFileBody } from "~/utils/read-file-body.server";
import { z } from "zod";
import type { Route } from "./+types/model-mapping";

const querySchema = z.object({ of: z.string().min(1).max(5_000).optional(), format: z.enum(["document", "csv", "thing-description"]).default("document") });

/** `GET /api/v1/models/{id}/mapping?of=&format=`: of a machine type, or of one machine with its NodeIds and addresses. */
export const loader = handleApi(async ({ request, params }: Route.LoaderArgs) => {
  const { model } = await requireModel(request, params.modelId, "read");
  const { of, format } = requireFields(querySchema, Object.fromEntries(new URL(request.url).searchParams));
  const made = await deliverMapping(model, { what: format, ...(of === undefined ? {} : { of }) });
  if (!made.ok) return problemResponse(422, made.problems);
  return new Response(made.value.content as string, { headers: { "content-type": made.value.type, "cache-control": "no-store" } });
});

/** `PUT /api/v1/models/{id}/mapping?of=` with a mapping document: the machine type then has that mapping, in one edit. */
export const action = handleApi(async ({ request, params }: Route.ActionArgs) => {
  const { caller, model } = await requireModel(request, params.modelId, "mapping.edit");
  requireMethod(request, "PUT");
  requireMediaType(request, "application/json");
  const file = await readFileBody(request, { name: "mapping.json", limit: MAX_DOCUMENT_CHARACTERS });
  if (!file.ok) return problemResponse(file.problems[0]?.code === "limit.file-size" ? 413 : 422, file.problems);
  const of = new URL(request.url).searchParams.get("of") ?? undefined;
  const imported = await importMappingDocument(caller, model, of, new TextDecoder().decode(file.value.bytes));
  return imported.ok ? Response.json(imported.value) : problemResponse(422, imported.problems);
});
