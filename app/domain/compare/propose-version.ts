/** The next version by semantic versioning; the mapping of ratings to its parts is ours (versioning of models is not standardised). */
import type { ChangeRating } from "./change";

/**
 * breaking → major, additive → minor, neutral → patch. Below 1.0.0 a breaking change raises the minor part, since such a
 * version promises nothing yet (semver.org 2.0.0 §4). Undefined for a text that is no three-part number.
 */
export function proposeVersion(version: string | undefined, rating: ChangeRating | undefined): string | undefined {
  const match = /^(\d+)\.(\d+)(?:\.(\d+))?(?:[-+].*)?$/.exec(version?.trim() ?? "");
  if (!match) return undefined;
  const [major, minor, patch] = [Number(match[1]), Number(match[2]), Number(match[3] ?? 0)];
  switch (rating) {
    case undefined:
      return `${major}.${minor}.${patch}`;
    case "neutral":
      return `${major}.${minor}.${patch + 1}`;
    case "additive":
      return `${major}.${minor + 1}.0`;
    case "breaking":
      return major === 0 ? `0.${minor + 1}.0` : `${major + 1}.0.0`;
  }
}
