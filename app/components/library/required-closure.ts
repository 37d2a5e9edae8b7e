/** Which models come along with those that were chosen. Pure; the library's entries are small enough to send whole. */
import type { LibraryChoice } from "~/services/list-library-choices.server";

export type RequiredRow = {
  readonly modelUri: string;
  readonly choice: LibraryChoice | undefined;
  /** Model URIs that ask for it; empty for what was chosen by hand. */
  readonly askedBy: readonly string[];
};

export const baseModelUri = "http://opcfoundation.org/UA/";

/** The chosen models and all that they require, the base model first; what is missing has no `choice`. */
export function listRequired(choices: readonly LibraryChoice[], chosen: readonly string[]): RequiredRow[] {
  const byUri = new Map<string, LibraryChoice>();
  for (const choice of choices) {
    const known = byUri.get(choice.modelUri);
    if (!known || (choice.publicationDate ?? "") > (known.publicationDate ?? "")) byUri.set(choice.modelUri, choice);
  }
  const askedBy = new Map<string, Set<string>>();
  const visit = (uri: string, by: string | undefined) => {
    const known = askedBy.get(uri);
    const asking = known ?? new Set<string>();
    if (by !== undefined) asking.add(by);
    if (known) return;
    askedBy.set(uri, asking);
    for (const required of byUri.get(uri)?.required ?? []) visit(required.modelUri, uri);
  };
  visit(baseModelUri, undefined);
  for (const uri of chosen) visit(uri, undefined);
  return [...askedBy].map(([modelUri, by]) => ({ modelUri, choice: byUri.get(modelUri), askedBy: [...by] }));
}

/** Entries whose title or URI contains all words, best first: a title that begins with the text wins. */
export function searchChoices(choices: readonly LibraryChoice[], query: string): LibraryChoice[] {
  const words = query.toLowerCase().split(/\s+/u).filter(Boolean);
  const found = choices.filter((choice) => {
    const text = `${choice.title} ${choice.modelUri}`.toLowerCase();
    return words.every((word) => text.includes(word));
  });
  const rank = (choice: LibraryChoice) => (choice.title.toLowerCase().startsWith(query.trim().toLowerCase()) ? 0 : 1);
  return found.sort((a, b) => rank(a) - rank(b) || a.title.localeCompare(b.title, "en"));
}
