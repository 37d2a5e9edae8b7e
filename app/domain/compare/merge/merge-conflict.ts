/** Places at which both sides of a merge changed the same thing in different ways. */
import type { NodeKey } from "../../address-space/node-id";

export type MergeSide = "ours" | "theirs";

export type MergeConflict = {
  /** Stays the same while both sides stay as they are; a choice names it. */
  readonly id: string;
  /** Absent where the model as a whole is meant. */
  readonly key?: NodeKey;
  readonly path: string;
  /** An attribute, `type definition`, `modelling rule`, `owner`, `node` (one removed what the other changed), a header field. */
  readonly what: string;
  readonly base: string | null;
  readonly ours: string | null;
  readonly theirs: string | null;
};

export type MergeChoices = ReadonlyMap<string, MergeSide>;

/** Collects conflicts and answers what was chosen; without a choice a place stays as it is on our side. */
export class ConflictList {
  readonly #choices: MergeChoices;
  readonly #found: MergeConflict[] = [];

  constructor(choices: MergeChoices) {
    this.#choices = choices;
  }

  get found(): readonly MergeConflict[] {
    return this.#found;
  }

  decide(conflict: MergeConflict): MergeSide {
    this.#found.push(conflict);
    return this.#choices.get(conflict.id) ?? "ours";
  }

  /** What holds at a conflict that is told already; undefined where there is none. */
  choiceOf(id: string): MergeSide | undefined {
    return this.#found.some((c) => c.id === id) ? (this.#choices.get(id) ?? "ours") : undefined;
  }
}

export function conflictId(...parts: readonly string[]): string {
  return parts.join("\u001f");
}

/** A value on one line, for people. */
export function formatSide(value: unknown): string | null {
  if (value === undefined || value === null) return null;
  if (typeof value === "string") return value;
  if (Array.isArray(value) && value.every((v) => typeof v === "object" && v !== null && "text" in v)) {
    return value
      .map((v: { text: string; locale?: string }) => (v.locale ? `${v.locale}: ${v.text}` : v.text))
      .join(" · ");
  }
  if (typeof value === "object" && "name" in value && typeof value.name === "string" && !("fields" in value))
    return value.name;
  if (typeof value === "object" && "xml" in value && typeof value.xml === "string") return value.xml.slice(0, 300);
  return JSON.stringify(value).slice(0, 300);
}
