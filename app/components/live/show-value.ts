import type { LiveRange } from "~/domain/live/live-node";
import type { Sample } from "~/domain/live/sample";
import { chooseDecimals, formatNumber } from "~/domain/live/format-live";
import type { Status } from "../notation/status-badge";
import type { StreamState } from "./live-values";

/** The value as a row shows it. States keep their text; figures get the decimals that their range needs. */
export function showValue(sample: Sample, range: LiveRange | null): string {
  const { value, text } = sample;
  if (typeof value !== "number" || text !== String(value)) return text;
  return formatNumber(value, chooseDecimals(value, range));
}

/** Shape of the status: a value whose stream stopped is stale, whatever its status was. */
export function toStatus(sample: Sample, stream: StreamState): Status {
  return stream === "running" ? sample.status.severity : "stale";
}

const WORDS: Readonly<Record<Exclude<StreamState, "running">, string>> = {
  stopped: "stream stopped",
  lost: "server not reached",
  paused: "paused",
};

/** The word beside the shape. */
export function nameStatus(sample: Sample, stream: StreamState): string {
  return stream === "running" ? sample.status.name : WORDS[stream];
}
