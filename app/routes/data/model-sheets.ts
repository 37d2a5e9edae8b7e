import { requireModel } from "~/auth/require-model.server";
import { presentSheets } from "~/presenters/sheets.server";
import { addSheet, newSheetSchema } from "~/services/save-sheet.server";
import { requireJson, requireMethod } from "~/utils/parse-request.server";
import type { Route } from "./+types/model-sheets";

export async function loader({ request, params }: Route.LoaderArgs): Promise<Response> {
  const { model } = await requireModel(request, params.modelId, "read");
  return Response.json(await presentSheets(model.id), { headers: { "cache-control": "no-store" } });
}

/** `POST /models/:modelId/sheets` `{name, layout?}`: a new sheet, empty unless it is said what it shows. */
export async function action({ request, params }: Route.ActionArgs): Promise<Response> {
  const { caller, model } = await requireModel(request, params.modelId, "model.edit");
  requireMethod(request, "POST");
  const sheet = await addSheet(caller, model.id, await requireJson(request, newSheetSchema));
  return Response.json({ id: sheet.id, name: sheet.name, version: sheet.version }, { status: 201 });
}
