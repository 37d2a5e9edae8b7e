/**
 * As-built: whether a running server serves what was released. The evidence is told apart: what the server has (nodes and
 * what they say), what its values did while somebody watched, and what people checked by hand.
 */
import type { ChangeKind } from "../compare/change";

/** What may differ without counting: nodes of a vendor by pattern, and texts. */
export type AsBuiltTolerance = {
  /** Patterns over paths and NodeIds, `*` for any characters; what they meet is listed as ignored, never hidden. */
  readonly ignored: readonly string[];
  /** Relative difference of limits of a range that still counts as equal. */
  readonly range: number;
  /** Whether names and descriptions for people count. */
  readonly areTextsChecked: boolean;
};

export const STRICT_TOLERANCE: AsBuiltTolerance = { ignored: [], range: 0, areTextsChecked: false };

export type AsBuiltAspect =
  | "namespace"
  | "version"
  | "missing"
  | "additional"
  | "identity"
  | "type"
  | "data type"
  | "unit"
  | "range"
  | "access"
  | "value"
  | "reference"
  | "text"
  | "status"
  | "rate"
  | "device";

export type AsBuiltDifference = {
  readonly aspect: AsBuiltAspect;
  readonly kind: ChangeKind | "namespace-missing" | "version-differs" | "bad-status" | "too-slow" | "never-came" | "device-differs";
  readonly nodeId?: string;
  readonly path: string;
  readonly detail?: string;
  readonly released: string | null;
  readonly found: string | null;
  /** Why it does not count, where it does not. */
  readonly ignoredBy?: string;
};

/** A model that the release stands on, and what the server says of it. Dates are compared by day. */
export type ServedModel = { readonly modelUri: string; readonly version?: string; readonly publicationDate?: string };

/** What a Variable did while it was watched. Times are milliseconds; `badFor` is the longest time in one piece. */
export type Observation = {
  readonly nodeId: string;
  readonly path: string;
  readonly watchedFor: number;
  readonly samples: number;
  readonly badFor: number;
  readonly uncertainFor: number;
  /** Name of the worst status that was seen. */
  readonly worstStatus: string;
  /** The second shortest time between two samples, that a chance pair does not count; absent with fewer than three. */
  readonly shortestGap?: number;
  /** What the mapping promises; absent for a Variable that nothing feeds. */
  readonly promisedPeriod?: number;
};

/**
 * `as released`: nothing that counts differs. `differs`: something does. `not shown`: the walk over the server was cut, so
 * that nothing missing can be claimed to be there.
 */
export type AsBuiltVerdict = "as released" | "differs" | "not shown";

export type AsBuiltComparison = {
  readonly verdict: AsBuiltVerdict;
  readonly differences: readonly AsBuiltDifference[];
  readonly counts: { readonly nodes: number; readonly counted: number; readonly ignored: number };
};
