/** The signal list as a workbook: what was surveyed, and how it is mapped. */
import writeWorkbook from "write-excel-file/node";
import { listMappingLines } from "../domain/deliver/mapping-csv";
import type { MappingDocument } from "../domain/deliver/mapping-document";
import type { SurveySignal } from "../domain/mapping/mapping-parts";

type Cell = { readonly value: string; readonly type: StringConstructor; readonly fontWeight?: "bold"; readonly wrap?: boolean };

const SURVEY_HEAD = ["Signal", "Group", "State", "Wanted by", "Delivered by", "Source or sensor", "Data type", "Unit", "Low", "High", "Evidence", "Note"];
const MAPPING_HEAD = ["Variable", "NodeId", "Data type", "Unit", "Low", "High", "Source", "Role", "Transforms", "Comment"];

export async function writeSignalList(name: string, signals: readonly SurveySignal[], mapping: MappingDocument | undefined): Promise<Uint8Array> {
  const survey = [SURVEY_HEAD, ...signals.map(toSurveyRow)];
  const mapped = mapping ? listMappingLines(mapping).map((l) => [l.target, l.nodeId, l.dataType, l.unit, l.low, l.high, l.source, l.role, l.transforms, l.comment]) : [];
  const sheets = [
    { data: toCells(survey), sheet: "Signals", columns: toColumns(survey) },
    { data: toCells([MAPPING_HEAD, ...mapped]), sheet: "Mapping", columns: toColumns([MAPPING_HEAD, ...mapped]) },
  ];
  const buffer = await writeWorkbook(sheets as never).toBuffer();
  if (buffer.length === 0) throw new Error(`The workbook of ${name} is empty`);
  return buffer;
}

function toSurveyRow(signal: SurveySignal): string[] {
  const { name, group, state, wantedBy, delivery, dataType = "", unit = "", range, evidence, note = "" } = signal;
  const shown = evidence.map((e) => `${e.kind}: ${e.text}${e.url === undefined ? "" : ` (${e.url})`}`).join("; ");
  return [name, group, state, wantedBy.join(", "), delivery.kind, delivery.text, dataType, unit, range ? String(range.low) : "", range ? String(range.high) : "", shown, note];
}

/** Text cells only: a spreadsheet runs no text. */
function toCells(rows: readonly (readonly string[])[]): Cell[][] {
  return rows.map((row, i) => row.map((value) => ({ value, type: String, ...(i === 0 ? { fontWeight: "bold" as const } : {}) })));
}

function toColumns(rows: readonly (readonly string[])[]): { width: number }[] {
  return (rows[0] ?? []).map((_, i) => ({ width: Math.min(60, Math.max(8, ...rows.map((row) => (row[i]?.length ?? 0) + 2))) }));
}
