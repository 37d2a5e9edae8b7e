/**
 * Which NodeSets a model needs, and in which order. Pure.
 *
 * A required model is satisfied by the same or a newer one: namespaces are meant to stay compatible upwards, and a model
 * URI is loaded in one version only (OPC 10000-6 §F.5). Of several candidates the newest is taken.
 */
import type { ModelEntry } from "../domain/address-space/model-header";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import { problem, type Problem } from "../domain/core/result";
import type { LibraryEntry } from "./library-entry";

export type Choice = {
  /** Required models before those that require them, the base NodeSet first. */
  readonly entries: readonly LibraryEntry[];
  /** `library.model-missing` (error), `library.only-older` (warning), `library.required-cycle` (error). */
  readonly problems: readonly Problem[];
};

type Versioned = Pick<ModelEntry, "version" | "modelVersion" | "publicationDate">;

/** `requiredBy` is the URI of the model that asks; it is never chosen itself. Earlier lists of `sources` win between equally new entries. */
export function chooseModels(
  required: readonly ModelEntry[],
  sources: readonly (readonly LibraryEntry[])[],
  requiredBy: string,
): Choice {
  const candidates = groupByUri(sources.flat());
  const entries: LibraryEntry[] = [];
  const problems: Problem[] = [];
  const done = new Set<string>();
  const path: string[] = [requiredBy];

  const visit = (model: ModelEntry, asking: string): void => {
    const chosen = newest(candidates.get(model.modelUri) ?? []);
    if (path.includes(model.modelUri)) {
      const circle = [...path.slice(path.indexOf(model.modelUri)), model.modelUri];
      problems.push(problem("library.required-cycle", { modelUri: model.modelUri, path: circle.join(" → ") }));
      return;
    }
    if (!chosen) {
      if (!done.has(model.modelUri)) problems.push(problem("library.model-missing", missingData(model, asking)));
      done.add(model.modelUri);
      return;
    }
    if (isOlder(chosen, model)) problems.push(problem.warning("library.only-older", olderData(chosen, model, asking)));
    if (done.has(model.modelUri)) return;
    done.add(model.modelUri);
    path.push(model.modelUri);
    for (const next of chosen.requiredModels) visit(next, chosen.modelUri);
    path.pop();
    entries.push(chosen);
  };

  if (requiredBy !== OPC_UA_NAMESPACE) visit({ modelUri: OPC_UA_NAMESPACE, requiredModels: [] }, requiredBy);
  for (const model of required) visit(model, requiredBy);
  return { entries, problems: withoutRepeats(problems) };
}

function groupByUri(entries: readonly LibraryEntry[]): Map<string, LibraryEntry[]> {
  const groups = new Map<string, LibraryEntry[]>();
  for (const entry of entries) {
    const group = groups.get(entry.modelUri);
    if (group) group.push(entry);
    else groups.set(entry.modelUri, [entry]);
  }
  return groups;
}

function newest(entries: readonly LibraryEntry[]): LibraryEntry | undefined {
  let best: LibraryEntry | undefined;
  for (const entry of entries) if (!best || compareAge(entry, best) > 0) best = entry;
  return best;
}

/** Positive when `a` is newer. The publication date decides (OPC 10000-6 §F.5), else the version; unknown is oldest. */
export function compareAge(a: Versioned, b: Versioned): number {
  const dates = toTime(a.publicationDate) - toTime(b.publicationDate);
  return dates !== 0 ? dates : compareVersions(a.modelVersion ?? a.version ?? "", b.modelVersion ?? b.version ?? "");
}

/** Whether what is there is older than what is asked for; what the asking model does not say is no demand. */
function isOlder(chosen: Versioned, asked: Versioned): boolean {
  if (asked.publicationDate !== undefined && chosen.publicationDate !== undefined) {
    return toTime(chosen.publicationDate) < toTime(asked.publicationDate);
  }
  if (asked.version === undefined) return false;
  return compareVersions(chosen.version ?? "", asked.version) < 0;
}

function toTime(date: string | undefined): number {
  const time = date === undefined ? Number.NaN : Date.parse(date);
  return Number.isNaN(time) ? 0 : time;
}

function compareVersions(a: string, b: string): number {
  const left = a.split(/[.\-+]/);
  const right = b.split(/[.\-+]/);
  for (let i = 0; i < Math.max(left.length, right.length); i++) {
    const difference = (Number.parseInt(left[i] ?? "", 10) || 0) - (Number.parseInt(right[i] ?? "", 10) || 0);
    if (difference !== 0) return difference;
  }
  return 0;
}

function describe(model: Versioned): string {
  const date = model.publicationDate?.slice(0, 10);
  if (model.version !== undefined) return date === undefined ? model.version : `${model.version} of ${date}`;
  return date === undefined ? "any version" : `of ${date}`;
}

function missingData(model: ModelEntry, requiredBy: string): Record<string, string> {
  return { modelUri: model.modelUri, version: describe(model), requiredBy };
}

function olderData(chosen: LibraryEntry, model: ModelEntry, requiredBy: string): Record<string, string> {
  return { modelUri: model.modelUri, version: describe(model), found: describe(chosen), requiredBy };
}

function withoutRepeats(problems: readonly Problem[]): Problem[] {
  const seen = new Set<string>();
  return problems.filter((found) => {
    const id = JSON.stringify(found);
    if (seen.has(id)) return false;
    seen.add(id);
    return true;
  });
}
