/** A mapping as CSV for people: one line a row, sources and transforms in words. */
import type { MappingRow, SourceReference, Transform } from "../mapping/mapping";
import { formatCsv } from "./csv";
import type { MappingDocument } from "./mapping-document";

export type MappingLine = {
  readonly target: string;
  readonly nodeId: string;
  readonly dataType: string;
  readonly unit: string;
  readonly low: string;
  readonly high: string;
  readonly direction: string;
  readonly source: string;
  readonly role: string;
  readonly place: string;
  readonly transforms: string;
  readonly period: string;
  readonly safety: string;
  readonly comment: string;
};

/** The rows of a document in words; with a machine's document `place` tells port, unit or alias. */
export function listMappingLines(document: MappingDocument): MappingLine[] {
  return document.mapping.rows.map((row) => {
    const node = document.nodes.find((n) => n.target === row.target);
    const role = roleOf(row.source);
    const binding = document.machine?.bindings.find((b) => b.role === role);
    const place = binding
      ? [binding.source.name, binding.port === undefined ? "" : `port ${binding.port}`, binding.unitId === undefined ? "" : `unit ${binding.unitId}`].filter((p) => p !== "").join(", ")
      : "";
    return {
      target: row.target,
      nodeId: node?.nodeId ?? "",
      dataType: node?.dataType ?? "",
      unit: node?.unit?.symbol ?? "",
      low: node?.range ? String(node.range.low) : "",
      high: node?.range ? String(node.range.high) : "",
      direction: row.direction ?? "in",
      source: describeReference(row.source),
      role,
      place,
      transforms: row.transforms.map(describeTransform).join("; "),
      period: row.period === undefined ? "" : String(row.period),
      safety: row.mirrorsSafetySignal ? "shows a safety signal, read only" : "",
      comment: row.comment ?? "",
    };
  });
}

const HEAD: readonly (readonly [string, keyof MappingLine])[] = [
  ["Variable", "target"],
  ["NodeId", "nodeId"],
  ["Data type", "dataType"],
  ["Unit", "unit"],
  ["Low", "low"],
  ["High", "high"],
  ["Direction", "direction"],
  ["Source", "source"],
  ["Role", "role"],
  ["Place", "place"],
  ["Transforms", "transforms"],
  ["Period ms", "period"],
  ["Safety", "safety"],
  ["Comment", "comment"],
];

export function writeMappingCsv(document: MappingDocument): string {
  const rows = listMappingLines(document);
  return formatCsv([HEAD.map(([name]) => name), ...rows.map((row) => HEAD.map(([, key]) => row[key]))]);
}

function roleOf(source: SourceReference): string {
  if (source.kind === "formula" || source.kind === "constant") return "";
  return source.kind === "device-status" ? source.roles.join(", ") : source.role;
}

export function describeReference(source: SourceReference): string {
  switch (source.kind) {
    case "process-data":
      return `process data ${source.direction}, subindex ${source.subindex}`;
    case "parameter":
      return `parameter ${source.index}${source.subindex === 0 ? "" : `, subindex ${source.subindex}`}, on demand`;
    case "port-status":
      return "port status";
    case "validity":
      return `validity of process data ${source.direction}`;
    case "device-status":
      return "worst device status";
    case "event-code":
      return `event 0x${source.code.toString(16).toUpperCase().padStart(4, "0")}`;
    case "register":
      return `${source.table.replace("-", " ")} ${source.address}${source.bit === undefined ? "" : `, bit ${source.bit}`}${source.type === undefined ? "" : `, ${source.type}`}${source.order === undefined || source.type === "UInt16" || source.type === "Int16" ? "" : `, ${source.order}`}`;
    case "tag":
      return `tag ${source.name}`;
    case "json-path":
      return `JSON ${source.path.join("/")}`;
    case "opc-ua-node":
      return `node ${source.nodeId}`;
    case "constant":
      return `constant ${String(source.value)}`;
    case "formula":
      return `formula ${source.expression}`;
  }
}

export function describeTransform(transform: Transform): string {
  switch (transform.kind) {
    case "linear":
      return `× ${transform.gradient}${transform.offset === 0 ? "" : ` + ${transform.offset}`}`;
    case "unit":
      return `${transform.from} → ${transform.to}`;
    case "bit":
      return `bit ${transform.bit}${transform.invert ? ", inverted" : ""}`;
    case "value-map":
      return `map ${transform.entries.map((e) => `${String(e.from)}=${String(e.to)}`).join(" ")}`;
    case "lookup":
      return `table ${transform.points.map(([x, y]) => `${x}:${y}`).join(" ")}`;
    case "deadband":
      return `deadband ${transform.width}`;
    case "average":
      return `mean of ${transform.samples}`;
    case "counter":
      return `counter of ${transform.bits} bits${transform.resets ? ", may be reset" : ""}`;
  }
}

/** Rows that write: what an export must count and name. */
export function listOutputs(rows: readonly MappingRow[]): string[] {
  return rows.filter((row) => row.direction === "out").map((row) => row.target);
}
