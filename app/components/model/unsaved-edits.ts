/** Edits that the server has not acknowledged outlive a reload of the page: they are kept for this tab and sent again. */
import { operationsSchema } from "~/domain/editing/operation-schema";
import type { IdBlock } from "~/domain/editing/allocate-node-id";
import type { OutgoingTransaction } from "~/editor/sync-transport";

export type UnsavedEdits = { readonly clientId: string; readonly pending: readonly OutgoingTransaction[]; readonly blocks: readonly IdBlock[] };

const keyOf = (modelId: string): string => `ferrule-unsaved:${modelId}`;

/** Undefined where nothing was left behind, or where it cannot be read. */
export function takeUnsaved(modelId: string): UnsavedEdits | undefined {
  const text = sessionStorage.getItem(keyOf(modelId));
  sessionStorage.removeItem(keyOf(modelId));
  if (text === null) return undefined;
  const stored = JSON.parse(text) as UnsavedEdits;
  const isWhole = stored.pending.every((edit) => operationsSchema.safeParse(edit.operations).success);
  return isWhole ? stored : undefined;
}

export function keepUnsaved(modelId: string, edits: UnsavedEdits): void {
  if (edits.pending.length === 0) sessionStorage.removeItem(keyOf(modelId));
  else sessionStorage.setItem(keyOf(modelId), JSON.stringify(edits));
}
