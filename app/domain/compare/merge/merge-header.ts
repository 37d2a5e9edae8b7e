/** The head of the model: each field by itself, the row of the model by its attributes, required models by URI. */
import type { ModelEntry, ModelHeader } from "../../address-space/model-header";
import { conflictId, formatSide, type ConflictList } from "./merge-conflict";
import { isSameJson } from "./model-state";

export function mergeHeaders(
  base: ModelHeader,
  ours: ModelHeader,
  theirs: ModelHeader,
  conflicts: ConflictList,
): ModelHeader {
  const merged = mergeFields(base, ours, theirs, ["namespaceUris", "models"], "header", conflicts);
  return {
    ...merged,
    namespaceUris: mergeLists(base.namespaceUris, ours.namespaceUris, theirs.namespaceUris),
    models: mergeModels(base.models, ours.models, theirs.models, conflicts),
  };
}

/** Every field but those in `apart`, three ways. */
function mergeFields<T extends object>(
  base: T,
  ours: T,
  theirs: T,
  apart: readonly string[],
  scope: string,
  conflicts: ConflictList,
): T {
  const read = (side: T, name: string): unknown => (side as Record<string, unknown>)[name];
  const merged: Record<string, unknown> = {};
  for (const name of new Set([...Object.keys(ours), ...Object.keys(theirs), ...Object.keys(base)])) {
    if (apart.includes(name)) continue;
    const value = mergeField(read(base, name), read(ours, name), read(theirs, name), scope, name, conflicts);
    if (value !== undefined) merged[name] = value;
  }
  return merged as T;
}

function mergeField(
  base: unknown,
  ours: unknown,
  theirs: unknown,
  scope: string,
  name: string,
  conflicts: ConflictList,
): unknown {
  if (isSameJson(ours, theirs) || isSameJson(base, theirs)) return ours;
  if (isSameJson(base, ours)) return theirs;
  // The time of the file's last change says nothing of its contents (OPC 10000-6 §F.2).
  if (name === "lastModified")
    return [formatSide(ours) ?? "", formatSide(theirs) ?? ""].sort().at(-1) === theirs ? theirs : ours;
  const sides = { base: formatSide(base), ours: formatSide(ours), theirs: formatSide(theirs) };
  const chosen = conflicts.decide({ id: conflictId(scope, name), path: "", what: name, ...sides });
  return chosen === "ours" ? ours : theirs;
}

/** What either side added comes in, what either took away goes; the order is ours. */
function mergeLists(base: readonly string[], ours: readonly string[], theirs: readonly string[]): string[] {
  const isKept = (item: string): boolean => (base.includes(item) ? ours.includes(item) && theirs.includes(item) : true);
  return [...ours.filter(isKept), ...theirs.filter((item) => isKept(item) && !ours.includes(item))];
}

function mergeModels(
  base: readonly ModelEntry[],
  ours: readonly ModelEntry[],
  theirs: readonly ModelEntry[],
  conflicts: ConflictList,
): ModelEntry[] {
  return mergeEntries(base, ours, theirs, (uri, b, o, t) => {
    const row = mergeFields(b, o, t, ["requiredModels"], conflictId("model", uri), conflicts);
    const required = mergeEntries(b.requiredModels, o.requiredModels, t.requiredModels, (model, before, left, right) =>
      mergeFields(before, left, right, [], conflictId("required", model), conflicts),
    );
    return { ...row, requiredModels: required };
  });
}

type MergeEntry = (uri: string, base: ModelEntry, ours: ModelEntry, theirs: ModelEntry) => ModelEntry;

function mergeEntries(
  base: readonly ModelEntry[],
  ours: readonly ModelEntry[],
  theirs: readonly ModelEntry[],
  merge: MergeEntry,
): ModelEntry[] {
  const uris = mergeLists(
    ...([base, ours, theirs].map((rows) => rows.map((r) => r.modelUri)) as [string[], string[], string[]]),
  );
  return uris.flatMap((uri) => {
    const [b, o, t] = [base, ours, theirs].map((rows) => rows.find((r) => r.modelUri === uri));
    if (o && t) return [merge(uri, b ?? o, o, t)];
    return o ? [o] : t ? [t] : [];
  });
}
