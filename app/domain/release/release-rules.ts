/**
 * Which version a release may carry. OPC 10000-6 §F.2: Version is text for people, ModelVersion a semantic version by
 * which programs compare, PublicationDate decides between equal ones. The step from ratings to parts of the number is ours.
 */
import type { ModelEntry } from "../address-space/model-header";
import type { ChangeRating } from "../compare/change";
import { proposeVersion } from "../compare/propose-version";
import { fail, ok, problem, type Problem, type Result } from "../core/result";

export type ReleasedVersion = {
  readonly version: string;
  /** SemVer grammar: three numbers without leading zeros. */
  readonly modelVersion: string;
  /** ISO 8601 in UTC, without fractions of a second. */
  readonly publicationDate: string;
};

export type ReleaseIntent = {
  readonly version: string;
  readonly publicationDate: string;
  readonly rating: ChangeRating | undefined;
  readonly last: ReleasedVersion | undefined;
  readonly required: readonly ModelEntry[];
};

/**
 * Problems: `release.version`, `release.version-not-higher`, `release.version-too-low`, `release.date-not-later`,
 * `release.requirement-open`; the warning `release.breaking-same-namespace`.
 */
export function planRelease(intent: ReleaseIntent): Result<ReleasedVersion> {
  const { version, publicationDate, rating, last } = intent;
  const modelVersion = toModelVersion(version);
  if (modelVersion === undefined) return fail(problem("release.version", { version }));
  const problems: Problem[] = [];
  const notes: Problem[] = [];
  if (last) {
    const proposed = proposeVersion(last.modelVersion, rating);
    if (compareVersions(modelVersion, last.modelVersion) <= 0) {
      problems.push(problem("release.version-not-higher", { version, last: last.version }));
    } else if (proposed !== undefined && rating !== undefined && compareVersions(modelVersion, proposed) < 0) {
      problems.push(problem("release.version-too-low", { version, rating, proposed, last: last.version }));
    }
    if (Date.parse(publicationDate) <= Date.parse(last.publicationDate)) {
      problems.push(problem("release.date-not-later", { last: last.publicationDate }));
    }
    if (rating === "breaking") notes.push(problem.warning("release.breaking-same-namespace"));
  }
  for (const { modelUri, ...row } of intent.required) {
    if (row.version === undefined && row.modelVersion === undefined && row.publicationDate === undefined) {
      problems.push(problem("release.requirement-open", { modelUri }));
    }
  }
  return problems.length > 0 ? fail(...problems) : ok({ version, modelVersion, publicationDate }, notes);
}

/** `1.05.3` → `1.5.3`, `1.4` → `1.4.0`; undefined for a text that is no such number (SemVer forbids leading zeros). */
export function toModelVersion(version: string): string | undefined {
  const match = /^(\d{1,9})\.(\d{1,9})(?:\.(\d{1,9}))?$/.exec(version.trim());
  return match ? [match[1], match[2], match[3] ?? "0"].map(Number).join(".") : undefined;
}

/** Negative when `a` is the lower one, by the precedence of semver.org 2.0.0 §11 for plain versions. */
export function compareVersions(a: string, b: string): number {
  const [left, right] = [a, b].map((text) => (toModelVersion(text) ?? "0.0.0").split(".").map(Number));
  for (let i = 0; i < 3; i++) {
    const difference = (left?.[i] ?? 0) - (right?.[i] ?? 0);
    if (difference !== 0) return difference;
  }
  return 0;
}

/** The first version of a model: what its header says, when that is a version, else 1.0.0. */
export function proposeFirstVersion(entry: ModelEntry | undefined): string {
  return toModelVersion(entry?.modelVersion ?? entry?.version ?? "") ?? "1.0.0";
}
