/** Edits that the server has not acknowledged outlive a reload of the page: they are kept for this tab and sent again. */
import type { UnsavedEdits } from "~/editor/editor-state";

export type KeptEdits = UnsavedEdits & { readonly clientId: string };

const keyOf = (modelId: string): string => `ferrule-unsaved:${modelId}`;

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

export function keepUnsaved(modelId: string, edits: KeptEdits): void {
  if (edits.pending.length === 0) sessionStorage.removeItem(keyOf(modelId));
  else sessionStorage.setItem(keyOf(modelId), JSON.stringify(edits));
}
