import { listSheets } from "../db/repositories/models.server";

export type SheetSummary = { readonly id: string; readonly name: string; readonly version: number };

export async function presentSheets(modelId: string): Promise<SheetSummary[]> {
  return (await listSheets(modelId)).map(({ id, name, version }) => ({ id, name, version }));
}
