/** What the bench's input gives at each node, in words. Pure. */
import type { FieldReading } from "../frames/read-fields";
import { chooseDecimals, formatNumber } from "~/domain/live/format-live";
import { formatStatus, isBad, isGood, StatusCode } from "~/domain/mapping/status";
import type { SampleValue } from "~/domain/mapping/sample";
import type { NodeTrace, TraceStep } from "~/domain/mapping/trace-row";
import { viewRoleFrame } from "./view-role-frame";
import type { MappingScene, Member } from "./mapping-scene";

export type StationReading = { readonly text: string; readonly unit: string };

export type NodeReading = {
  readonly text: string;
  readonly unit: string;
  readonly value: SampleValue;
  readonly status: string;
  readonly statusCode: number;
  readonly tone: FieldReading["tone"];
  /** By key of the station (row-stations.ts). */
  readonly stations: ReadonlyMap<string, StationReading>;
  readonly steps: readonly TraceStep[];
};

/** Readings by row id; a node that waits for its first sample has none. */
export function toReadings(scene: MappingScene, traces: readonly NodeTrace[]): Map<string, NodeReading> {
  const byPath = new Map(traces.map((trace) => [trace.target, trace]));
  const readings = new Map<string, NodeReading>();
  for (const member of scene.members) {
    const trace = member.row && member.row.direction !== "out" ? byPath.get(member.target.path) : undefined;
    if (trace && trace.status !== StatusCode.Bad_WaitingForInitialData)
      readings.set(member.id, toReading(member, trace));
  }
  return readings;
}

function toReading(member: Member, { value, status, steps }: NodeTrace): NodeReading {
  const unit = value === null ? "" : (member.target.unit?.symbol ?? "");
  const text = formatNodeValue(value, member);
  const stations = new Map<string, StationReading>([["node", { text, unit }]]);
  let transform = 0;
  for (const step of steps) {
    if (step.kind === "transform") stations.set(`step ${transform++}`, toStation(step));
    else if (step.kind === "bits") stations.set("bits", { text: step.text.split(": ").at(-1) ?? "", unit: "" });
    else if (step.kind === "raw") {
      stations.set("raw", toStation(step));
      stations.set("special", { text: step.text === "raw" ? "none met" : step.text, unit: "" });
    } else if (step.kind === "scaled") stations.set("scaled", toStation(step));
    else if (step.kind !== "node") stations.set("read", toStation(step));
  }
  return {
    text,
    unit,
    value,
    status: formatStatus(status),
    statusCode: status,
    tone: toTone(status),
    stations,
    steps,
  };
}

function toStation(step: TraceStep): StationReading {
  return { text: formatSampleValue(step.value), unit: step.value === null ? "" : step.unit };
}

export function toTone(status: number): FieldReading["tone"] {
  return isGood(status) ? "good" : isBad(status) ? "bad" : "uncertain";
}

/** `2 Running` for a state, decimals after the range of the Variable. */
export function formatNodeValue(value: SampleValue, { target }: Member): string {
  const state = target.states.find((one) => one.value === Number(value));
  if (state && value !== null && typeof value !== "string") return `${Number(value)} ${state.text}`;
  if (typeof value !== "number" || Number.isInteger(value)) return formatSampleValue(value);
  return formatNumber(value, chooseDecimals(value, target.range ?? null));
}

export function formatSampleValue(value: SampleValue): string {
  if (value === null) return "–";
  if (typeof value !== "number") return String(value).replace(/^-/, "−");
  return Number.isInteger(value) ? formatNumber(value, 0) : String(Number(value.toPrecision(8))).replace(/^-/, "−");
}

/** The symbol's code of what a row's source delivers, for a conversion that is added to it. */
export function findSourceUnit({ row }: Member, scene: Pick<MappingScene, "roles">): string | undefined {
  if (row?.source.kind !== "process-data") return undefined;
  const { role, direction, subindex } = row.source;
  const known = scene.roles.get(role);
  const field = known && viewRoleFrame(known, direction)?.fields.find((one) => one.subindex === subindex);
  return field?.plan.unit?.code || undefined;
}
