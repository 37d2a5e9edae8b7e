import { requireModel } from "~/auth/require-model.server";
import { MAX_DOCUMENT_CHARACTERS } from "~/domain/deliver/mapping-document";
import { importMappingDocument } from "~/services/deliver-mapping.server";
import { requireMethod } from "~/utils/parse-request.server";
import { problemResponse } from "~/utils/problem-response.server";
import { readFileBody } from "~/utils/read-file-body.server";
import type { Route } from "./+types/mapping-import";

/** `POST /models/:modelId/mapping-document?type=` with a mapping document: the type then has that mapping, in one edit. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "mapping.edit");
  requireMethod(request, "POST");
  const file = await readFileBody(request, { name: "mapping.json", limit: MAX_DOCUMENT_CHARACTERS });
  if (!file.ok) return problemResponse(file.problems[0]?.code === "limit.file-size" ? 413 : 422, file.problems);
  const type = new URL(request.url).searchParams.get("type") ?? undefined;
  const imported = await importMappingDocument(caller, model, type, new TextDecoder().decode(file.value.bytes));
  return imported.ok ? Response.json(imported.value) : problemResponse(422, imported.problems);
}
