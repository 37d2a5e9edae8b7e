/** The model of a route together with who asks; what is not theirs does not exist. */
import { findModel, findSheet, type ModelRow, type SheetRow } from "../db/repositories/models.server";
import { assertMay, requireCaller, requireUser, type Caller } from "./caller.server";
import type { Action } from "./permissions";

export type ModelAccess = { readonly caller: Caller; readonly model: ModelRow };

/** For data routes and the API: 401, 404 or 403 are thrown as problem documents. */
export async function requireModel(request: Request, modelId: string | undefined, action: Action): Promise<ModelAccess> {
  return accessModel(await requireCaller(request), modelId, action);
}

/** For pages: the same, but whoever is not signed in is led to the sign-in page and back. */
export async function requireModelForPage(request: Request, modelId: string | undefined, action: Action): Promise<ModelAccess> {
  return accessModel(await requireUser(request), modelId, action);
}

/** The model that a form names, when the caller may do this with it; 404 or 403 is thrown otherwise. */
export async function findModelOf(caller: Caller, modelId: string, action: Action): Promise<ModelRow> {
  return (await accessModel(caller, modelId, action)).model;
}

async function accessModel(caller: Caller, modelId: string | undefined, action: Action): Promise<ModelAccess> {
  const model = modelId === undefined ? undefined : await findModel(modelId);
  assertMay(caller, action, model?.organizationId);
  return { caller, model: model as ModelRow };
}

export function findModelSheet(model: ModelRow, sheetId: string | undefined): Promise<SheetRow | undefined> {
  return sheetId === undefined ? Promise.resolve(undefined) : findSheet(model.id, sheetId);
}
