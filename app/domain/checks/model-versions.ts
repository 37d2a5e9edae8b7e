/** Versions and dates of models (OPC 10000-6 §F.2). */
import type { ModelEntry } from "../address-space/model-header";

const SEMVER =
  /^(0|[1-9]\d*)\.(0|[1-9]\d*)\.(0|[1-9]\d*)(?:-([0-9A-Za-z-]+(?:\.[0-9A-Za-z-]+)*))?(?:\+[0-9A-Za-z.-]+)?$/;

export function isSemanticVersion(text: string): boolean {
  return SEMVER.test(text);
}

/** Negative, zero, positive as `a` is older, equal, newer; undefined where one of them is no semantic version. */
export function compareVersions(a: string, b: string): number | undefined {
  const [left, right] = [SEMVER.exec(a), SEMVER.exec(b)];
  if (!left || !right) return undefined;
  for (const i of [1, 2, 3]) {
    const difference = Number(left[i]) - Number(right[i]);
    if (difference !== 0) return difference;
  }
  return comparePrerelease(left[4], right[4]);
}

/** A pre-release stands before its release; its parts are compared one by one, numbers as numbers. */
function comparePrerelease(a: string | undefined, b: string | undefined): number {
  if (a === b) return 0;
  if (a === undefined) return 1;
  if (b === undefined) return -1;
  const [left, right] = [a.split("."), b.split(".")];
  for (let i = 0; i < Math.max(left.length, right.length); i++) {
    const [x, y] = [left[i], right[i]];
    if (x === y) continue;
    if (x === undefined) return -1;
    if (y === undefined) return 1;
    const [isNumber, isOtherNumber] = [/^\d+$/.test(x), /^\d+$/.test(y)];
    if (isNumber && isOtherNumber) return Number(x) - Number(y);
    if (isNumber !== isOtherNumber) return isNumber ? -1 : 1;
    return x < y ? -1 : 1;
  }
  return 0;
}

/** Milliseconds of a date; one without time zone is taken as UTC. Undefined where it is no date. */
export function toInstant(text: string | undefined): number | undefined {
  if (text === undefined || text === "") return undefined;
  const instant = Date.parse(/(?:Z|[+-]\d\d:\d\d)$/.test(text) ? text : `${text}Z`);
  return Number.isNaN(instant) ? undefined : instant;
}

/** Whether a loaded model satisfies the minimum that a required model states; true where none is stated. */
export function satisfies(loaded: ModelEntry, required: ModelEntry): boolean {
  if (required.modelVersion === undefined && required.publicationDate === undefined) return true;
  if (loaded.modelVersion !== undefined && required.modelVersion !== undefined) {
    const order = compareVersions(loaded.modelVersion, required.modelVersion);
    if (order !== undefined && order !== 0) return order > 0;
    return order === undefined || isSameOrLater(loaded, required);
  }
  if (loaded.modelVersion !== undefined) return true;
  if (required.modelVersion !== undefined) return false;
  return isSameOrLater(loaded, required);
}

function isSameOrLater(loaded: ModelEntry, required: ModelEntry): boolean {
  const [has, wants] = [toInstant(loaded.publicationDate), toInstant(required.publicationDate)];
  return wants === undefined || (has !== undefined && has >= wants);
}

/** `1.05.03, 2023-12-15` for facts. */
export function describeModel(model: ModelEntry): string {
  const parts = [model.modelVersion ?? model.version, model.publicationDate].filter((part) => part !== undefined);
  return `${model.modelUri} (${parts.join(", ") || "no version"})`;
}
