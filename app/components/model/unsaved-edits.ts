/** Edits that the server has not acknowledged outlive a reload of the page: they are kept for this tab and sent again. */
import { operationsSchema } from "~/domain/editing/operation-schema";
import type { UnsavedEdits } from "~/editor/editor-state";

export type KeptEdits = UnsavedEdits & { readonly clientId: string };

const keyOf = (modelId: string): string => `ferrule-unsaved:${modelId}`;

/** Undefined where nothing was left behind, or where it cannot be read. */
export function takeUnsaved(modelId: string): KeptEdits | undefined {
  const text = sessionStorage.getItem(keyOf(modelId));
  sessionStorage.removeItem(keyOf(modelId));
  if (text === null) return undefined;
  const stored = JSON.parse(text) as KeptEdits;
  const isWhole = stored.pending.every((edit) => operationsSchema.safeParse(edit.operations).success);
  return isWhole ? stored : undefined;
}

export function keepUnsaved(modelId: string, edits: KeptEdits): void {
  if (edits.pending.length === 0) sessionStorage.removeItem(keyOf(modelId));
  else sessionStorage.setItem(keyOf(modelId), JSON.stringify(edits));
}
