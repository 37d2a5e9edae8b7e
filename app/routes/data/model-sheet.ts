import { z } from "zod";
import { findModelSheet, requireModel } from "~/auth/require-model.server";
import { layoutSchema, moveSheet, removeSheet, renameSheet, saveSheetLayout, sheetNameSchema } from "~/services/save-sheet.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import { failWith, problemResponse } from "~/utils/problem-response.server";
import type { Route } from "./+types/model-sheet";

const changeSchema = z.strictObject({ name: sheetNameSchema.optional(), place: z.int().min(0).max(10_000).optional() });

/** `GET /models/:modelId/sheets/:sheetId`: the layout; its version is the entity tag. */
export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  const sheet = await findModelSheet(model, params.sheetId);
  if (!sheet) throw failWith(404, "request.not-found");
  return Response.json(sheet.layout, { headers: { etag: `"${sheet.version}"`, "cache-control": "no-cache" } });
}

/** `PUT` saves the layout (409 when `If-Match` names an older version), `PATCH {name?, place?}` renames and moves it among the others, `DELETE` removes. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "PUT", "PATCH", "DELETE");
  const sheet = await findModelSheet(model, params.sheetId);
  if (!sheet) throw failWith(404, "request.not-found");
  if (request.method === "DELETE") {
    const removed = await removeSheet(sheet);
    return removed.ok ? new Response(null, { status: 204 }) : problemResponse(409, removed.problems);
  }
  if (request.method === "PATCH") {
    const { name, place } = await requireJson(request, changeSchema);
    if (name !== undefined) await renameSheet(caller, sheet, name);
    if (place !== undefined) await moveSheet(caller, sheet, place);
    return Response.json({ id: sheet.id, name: name ?? sheet.name });
  }
  const layout = await requireJson(request, layoutSchema);
  const saved = await saveSheetLayout(caller, sheet, layout, readEntityTag(request.headers.get("if-match")));
  if (!saved.ok) return problemResponse(409, saved.problems);
  return Response.json(saved.value, { headers: { etag: `"${saved.value.version}"` } });
}

function readEntityTag(text: string | null): number | undefined {
  const digits = /^"?(\d{1,12})"?$/.exec(text ?? "")?.[1];
  return digits === undefined ? undefined : Number(digits);
}
