/** The mapping of a merged model, entry by entry: a role, a row, a binding is one thing that both sides may have changed. */
import type { MappingEntry } from "../../address-space/mapping-entry";
import { conflictId, formatSide } from "./merge-conflict";
import type { MergeInput } from "./merge-presence";
import { isSameJson } from "./model-state";

export function mergeMappings(input: MergeInput): Map<string, MappingEntry> {
  const { base, ours, theirs } = input;
  const merged = new Map<string, MappingEntry>();
  for (const id of new Set([...ours.mapping.keys(), ...theirs.mapping.keys(), ...base.mapping.keys()])) {
    const entry = mergeEntry(input, id);
    if (entry) merged.set(id, entry);
  }
  return merged;
}

function mergeEntry({ base, ours, theirs, conflicts, pathOf }: MergeInput, id: string): MappingEntry | undefined {
  const [b, o, t] = [base.mapping.get(id), ours.mapping.get(id), theirs.mapping.get(id)];
  if (isSameJson(o?.value, t?.value) || isSameJson(b?.value, t?.value)) return o;
  if (isSameJson(b?.value, o?.value)) return t;
  const known = (o ?? t ?? b) as MappingEntry;
  const chosen = conflicts.decide({
    id: conflictId("mapping", id),
    key: known.owner,
    path: pathOf(known.owner),
    what: `mapping: ${known.part} ${known.id}`,
    base: formatSide(b?.value),
    ours: formatSide(o?.value),
    theirs: formatSide(t?.value),
  });
  return chosen === "ours" ? o : t;
}
