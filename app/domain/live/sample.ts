/** One value of one node as it came from the server. */
export type StatusSeverity = "good" | "uncertain" | "bad";

export type Sample = {
  /** Numbers, texts and truth values as they are; other types as JSON or as text. */
  readonly value: unknown;
  /** The value for people, without unit. */
  readonly text: string;
  readonly status: { readonly code: number; readonly name: string; readonly severity: StatusSeverity };
  /** ISO 8601, UTC; null when the server gives none. */
  readonly sourceTimestamp: string | null;
  readonly serverTimestamp: string | null;
  /** Older samples of this node that a newer one replaced before they were sent, since the watch began. */
  readonly coalesced: number;
};
