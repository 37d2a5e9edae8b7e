/** Text in edit, kept while the window goes to other screens and back. */
import type { AddressSpace } from "~/domain/address-space/address-space";

export type SourceDraft = {
  /** The model that the text was written from. */
  readonly base: AddressSpace;
  readonly text: string;
};

const drafts = new Map<string, SourceDraft>();

export function findDraft(modelId: string): SourceDraft | undefined {
  return drafts.get(modelId);
}

export function keepDraft(modelId: string, draft: SourceDraft | undefined): void {
  if (draft) drafts.set(modelId, draft);
  else drafts.delete(modelId);
}
