/** The body of an as-built report: all its evidence in one JSON text, which is hashed, signed and never changed. */
import { z } from "zod";
import type { AsBuiltAspect, AsBuiltDifference, AsBuiltTolerance, AsBuiltVerdict, Observation } from "./as-built";

export const AS_BUILT_FORMAT = "ferrule-as-built-1";

export const toleranceSchema = z.strictObject({
  ignored: z.array(z.string().trim().min(1).max(500)).max(200),
  range: z.number().min(0).max(1),
  areTextsChecked: z.boolean(),
});

/** A point check as the report quotes it. */
export type QuotedPointCheck = {
  readonly path: string;
  readonly nodeId: string;
  readonly stimulus: string;
  readonly localReading: number;
  readonly shownValue: number;
  readonly unit: string;
  readonly tolerance: number;
  readonly isWithin: boolean;
  readonly checkedBy: string;
  /** ISO 8601, UTC. */
  readonly at: string;
};

export type AsBuiltReport = {
  readonly format: typeof AS_BUILT_FORMAT;
  readonly model: { readonly id: string; readonly name: string; readonly namespaceUri: string; readonly version: string | null; readonly revision: number | null };
  readonly target: { readonly id: string; readonly name: string; readonly endpointUrl: string; readonly securityMode: string };
  /** What the report is to prove. */
  readonly delivery?: { readonly version: string; readonly gateway: string; readonly sha256: string };
  readonly madeBy: string;
  /** ISO 8601, UTC. */
  readonly startedAt: string;
  readonly endedAt: string;
  readonly tolerance: AsBuiltTolerance;
  readonly watchedFor: number;
  readonly verdict: AsBuiltVerdict;
  readonly counts: { readonly nodes: number; readonly servedNodes: number; readonly watched: number; readonly counted: number; readonly ignored: number };
  readonly differences: readonly AsBuiltDifference[];
  /** Those that were not good all the time, and the number of all. */
  readonly observations: readonly Observation[];
  readonly pointChecks: readonly QuotedPointCheck[];
  /** What kept the comparison from being complete, as sentences. */
  readonly remarks: readonly string[];
};

/** The aspects in the order in which an engineer works them off. */
export const ASPECT_ORDER: readonly AsBuiltAspect[] = ["namespace", "version", "missing", "additional", "identity", "type", "data type", "unit", "range", "access", "value", "reference", "status", "rate", "device", "text"];

/** The differences by aspect, those that count first. */
export function groupDifferences(differences: readonly AsBuiltDifference[]): { aspect: AsBuiltAspect; list: AsBuiltDifference[] }[] {
  return ASPECT_ORDER.flatMap((aspect) => {
    const list = differences.filter((d) => d.aspect === aspect).sort((a, b) => Number(a.ignoredBy !== undefined) - Number(b.ignoredBy !== undefined));
    return list.length > 0 ? [{ aspect, list }] : [];
  });
}

/** Signals whose newest check was outside its tolerance; the list comes newest first. */
export function listOutside(pointChecks: readonly QuotedPointCheck[]): QuotedPointCheck[] {
  const seen = new Set<string>();
  return pointChecks.filter(({ nodeId, isWithin }) => {
    if (seen.has(nodeId)) return false;
    seen.add(nodeId);
    return !isWithin;
  });
}
