/**
 * Edits that the server has not acknowledged outlive a reload of the page: they are kept for this tab and sent again. So do
 * the ids that it leased and did not use, which would be lost otherwise.
 */
import type { IdBlock } from "~/domain/editing/allocate-node-id";
import type { UnsavedEdits } from "~/editor/editor-state";

export type KeptEdits = UnsavedEdits & { readonly clientId: string };

const keyOf = (modelId: string): string => `ferrule-unsaved:${modelId}`;
const blocksKeyOf = (modelId: string): string => `ferrule-ids:${modelId}`;

/** Brings what reading them needs; the answered function then takes them, once. Without any nothing is brought. */
export async function prepareUnsaved(modelId: string): Promise<() => KeptEdits | undefined> {
  if (sessionStorage.getItem(keyOf(modelId)) === null) return () => undefined;
  const { areOperations } = await import("./transaction-schemas");
  return () => takeUnsaved(modelId, areOperations);
}

/** Undefined where nothing was left behind, or where it cannot be read. */
function takeUnsaved(modelId: string, areOperations: (value: unknown) => boolean): KeptEdits | undefined {
  const text = sessionStorage.getItem(keyOf(modelId));
  sessionStorage.removeItem(keyOf(modelId));
  if (text === null) return undefined;
  const stored = JSON.parse(text) as KeptEdits;
  return stored.pending.every((edit) => areOperations(edit.operations)) ? stored : undefined;
}

/** The ids that this tab had in stock for the model when it left it; each of them is taken once. */
export function takeBlocks(modelId: string): readonly IdBlock[] {
  const text = sessionStorage.getItem(blocksKeyOf(modelId));
  sessionStorage.removeItem(blocksKeyOf(modelId));
  return text === null ? [] : (JSON.parse(text) as readonly IdBlock[]);
}

export function keepUnsaved(modelId: string, edits: KeptEdits): void {
  const isSaved = edits.pending.length === 0;
  if (isSaved) sessionStorage.removeItem(keyOf(modelId));
  else sessionStorage.setItem(keyOf(modelId), JSON.stringify(edits));
  // Unsaved edits bring their ids with them.
  if (isSaved && edits.blocks.length > 0) sessionStorage.setItem(blocksKeyOf(modelId), JSON.stringify(edits.blocks));
  else sessionStorage.removeItem(blocksKeyOf(modelId));
}
