/** Counts what one Variable does while it is watched; the caller tells the time, so that a test needs no clock. */
import { isBad, isGood } from "../mapping/status";
import type { Observation } from "./as-built";

export type StatusSeverity = "good" | "uncertain" | "bad";

const RANK: Readonly<Record<StatusSeverity, number>> = { good: 0, uncertain: 1, bad: 2 };

/** The severity of a StatusCode (OPC 10000-4 §7.38.1, Table 173). */
function getSeverity(code: number): StatusSeverity {
  if (isGood(code)) return "good";
  return isBad(code) ? "bad" : "uncertain";
}

export class ObservationTally {
  readonly #nodeId: string;
  readonly #path: string;
  readonly #start: number;
  #samples = 0;
  #worst: { severity: StatusSeverity; name: string } = { severity: "good", name: "Good" };
  #severity: StatusSeverity | undefined;
  #since: number;
  #badFor = 0;
  #uncertainFor = 0;
  #lastAt: number | undefined;
  readonly #gaps: [shortest: number, second: number] = [Infinity, Infinity];

  constructor(nodeId: string, path: string, start: number) {
    this.#nodeId = nodeId;
    this.#path = path;
    this.#start = start;
    this.#since = start;
  }

  /** One sample as it arrives, milliseconds. */
  offer(time: number, code: number, name: string): void {
    const severity = getSeverity(code);
    this.#samples++;
    if (this.#lastAt !== undefined) this.#noteGap(time - this.#lastAt);
    this.#lastAt = time;
    if (RANK[severity] > RANK[this.#worst.severity]) this.#worst = { severity, name };
    if (severity === this.#severity) return;
    this.#close(time);
    this.#severity = severity;
    this.#since = time;
  }

  end(time: number, promisedPeriod?: number): Observation {
    this.#close(time);
    return {
      nodeId: this.#nodeId,
      path: this.#path,
      watchedFor: time - this.#start,
      samples: this.#samples,
      badFor: this.#badFor,
      uncertainFor: this.#uncertainFor,
      worstStatus: this.#worst.name,
      ...(Number.isFinite(this.#gaps[1]) ? { shortestGap: this.#gaps[1] } : {}),
      ...(promisedPeriod === undefined ? {} : { promisedPeriod }),
    };
  }

  #noteGap(gap: number): void {
    const [shortest, second] = this.#gaps;
    if (gap < shortest) this.#gaps.splice(0, 2, gap, shortest);
    else if (gap < second) this.#gaps[1] = gap;
  }

  #close(time: number): void {
    const lasted = time - this.#since;
    if (this.#severity === "bad") this.#badFor = Math.max(this.#badFor, lasted);
    if (this.#severity === "uncertain") this.#uncertainFor = Math.max(this.#uncertainFor, lasted);
    this.#since = time;
  }
}
