import type { Severity } from "~/domain/core/result";

/** A finding of the checker about a source or one of its ports. */
export type SourceFinding = {
  readonly rule: string;
  readonly severity: Severity;
  readonly message: string;
  readonly sourceId: string;
  readonly port: number | undefined;
};
