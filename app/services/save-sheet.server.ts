/** Sheets: which nodes lie where. Layout is not part of the model, so it has a version of its own instead of transactions. */
import { z } from "zod";
import type { Caller } from "../auth/caller.server";
import { getDatabase, writeBatch, writeInTurn } from "../db/client.server";
import { addSheetStatement, findSheet, listSheets, placeSheetStatement, removeSheetStatement, saveSheet, type SheetRow } from "../db/repositories/models.server";
import { fail, ok, problem, type Result } from "../domain/core/result";
import { newId } from "../utils/ids.server";
import { publish } from "./event-hub.server";

const coordinate = z.number().min(-10_000_000).max(10_000_000);
const positionSchema = z.object({ x: coordinate, y: coordinate });

/** Positions by node key; what else a sheet keeps (frames, shown nodes, view) is the editor's and stored as it is. */
export const layoutSchema = z.looseObject({ positions: z.record(z.string().max(4000), positionSchema) });
export const newSheetSchema = z.strictObject({ name: z.string().trim().min(1).max(100), layout: layoutSchema.optional() });
export const sheetNameSchema = z.string().trim().min(1).max(100);

/** Saves the whole layout. `seen` is the version that the window started from, undefined to overwrite. Problem: `sheet.stale`. */
export async function saveSheetLayout(
  author: Caller,
  sheet: SheetRow,
  layout: z.infer<typeof layoutSchema>,
  seen: number | undefined,
): Promise<Result<{ version: number }>> {
  const result = await writeInTurn(async () => {
    const present = await findSheet(sheet.modelId, sheet.id);
    if (!present || (seen !== undefined && seen !== present.version)) return fail(problem("sheet.stale"));
    await saveSheet(sheet.id, present.version, { layout, updatedBy: author.name, updatedAt: new Date() });
    return ok({ version: present.version + 1 });
  });
  if (result.ok) {
    publish(`sheet:${sheet.modelId}`, { sheetId: sheet.id, version: result.value.version, layout, author: author.name });
  }
  return result;
}

export async function renameSheet(author: Caller, sheet: SheetRow, name: string): Promise<void> {
  await saveSheet(sheet.id, sheet.version, { name, updatedBy: author.name, updatedAt: new Date() });
  publish(`sheet:${sheet.modelId}`, { sheetId: sheet.id, name, author: author.name });
}

/** A new last sheet, empty or with what it shows. */
export async function addSheet(author: Caller, modelId: string, { name, layout }: z.infer<typeof newSheetSchema>): Promise<SheetRow> {
  const sheets = await listSheets(modelId);
  const empty = makeSheet(modelId, name, (sheets.at(-1)?.position ?? -1) + 1, author.name);
  const row: SheetRow = layout ? { ...empty, layout } : empty;
  await writeBatch([addSheetStatement(row)]);
  publish(`sheet:${modelId}`, { sheetId: row.id, name, author: author.name });
  return row;
}

export function makeSheet(modelId: string, name: string, position: number, author: string): SheetRow {
  return { id: newId(), modelId, name, position, layout: { positions: {} }, version: 1, updatedAt: new Date(), updatedBy: author };
}

/** Puts a sheet at a place among the others, counted from 0; what lies beyond the ends means the ends. */
export async function moveSheet(author: Caller, sheet: SheetRow, place: number): Promise<void> {
  const others = (await listSheets(sheet.modelId)).filter((other) => other.id !== sheet.id);
  const ordered = [...others.slice(0, place), sheet, ...others.slice(place)];
  const [first, ...rest] = ordered.map((row, position) => placeSheetStatement(row.id, position));
  if (first) await writeBatch([first, ...rest]);
  publish(`sheet:${sheet.modelId}`, { sheetId: sheet.id, place, author: author.name });
}

/** Removes a sheet; the last one of a model stays. */
export async function removeSheet(sheet: SheetRow): Promise<Result<null>> {
  if ((await listSheets(sheet.modelId)).length < 2) return fail(problem("sheet.last"));
  await writeInTurn(() => getDatabase().batch([removeSheetStatement(sheet.id)]));
  publish(`sheet:${sheet.modelId}`, { sheetId: sheet.id, removed: true });
  return ok(null);
}
