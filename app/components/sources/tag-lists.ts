/** Tag lists of controllers as the pages ask for them. */
import type { ShownProblem } from "../models/problem-list";
import type { Tag } from "~/domain/mapping/tag";
import type { TagImportIntent, TagListSummary, TagPreview } from "~/services/import-tags.server";

export type Answer<T> =
  { readonly ok: true; readonly value: T } | { readonly ok: false; readonly problems: readonly ShownProblem[] };

export function previewTagFile(file: File): Promise<Answer<TagPreview>> {
  return send(file, new URLSearchParams({ act: "preview", name: file.name }));
}

export function importTagFile(file: File, intent: TagImportIntent): Promise<Answer<{ id: string; count: number }>> {
  return send(file, new URLSearchParams({ act: "import", name: file.name, intent: JSON.stringify(intent) }));
}

export async function fetchTagLists(): Promise<readonly TagListSummary[]> {
  const response = await fetch("/tag-lists").catch(() => undefined);
  return response?.ok ? ((await response.json()) as readonly TagListSummary[]) : [];
}

export async function fetchTags(id: string): Promise<readonly Tag[]> {
  const response = await fetch(`/tag-lists?id=${encodeURIComponent(id)}`).catch(() => undefined);
  return response?.ok ? ((await response.json()) as readonly Tag[]) : [];
}

async function send<T>(file: File, query: URLSearchParams): Promise<Answer<T>> {
  try {
    const response = await fetch(`/tag-lists?${query.toString()}`, {
      method: "POST",
      headers: { "content-type": "application/octet-stream" },
      body: file,
    });
    const answer = (await response.json()) as T & { problems?: readonly ShownProblem[] };
    return response.ok ? { ok: true, value: answer } : { ok: false, problems: answer.problems ?? [] };
  } catch (error) {
    const message = error instanceof Error ? error.message : String(error);
    return { ok: false, problems: [{ code: "", severity: "error", message: `The server did not answer: ${message}` }] };
  }
}
