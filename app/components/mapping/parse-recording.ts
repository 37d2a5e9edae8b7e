/**
 * A recorded file: one frame a line as time, port and bytes, parted by comma, semicolon or tab. The first line may be a
 * head in any order; without one the columns are time, port, hex. Pure.
 */
import { fail, ok, problem, type Problem, type Result } from "~/domain/core/result";
import { parseHex } from "~/domain/mapping/bits";

export type RecordedFrame = {
  readonly time: string;
  readonly port: string;
  readonly octets: Uint8Array;
  readonly line: number;
};

export const RECORDING_LIMITS = { characters: 20_000_000, frames: 200_000, problems: 100 } as const;

type Columns = { readonly time: number; readonly port: number; readonly hex: number };

/** Problems: `recording.empty`, `recording.too-long`, and with their lines `recording.columns`, `recording.hex`. */
export function parseRecording(text: string): Result<readonly RecordedFrame[]> {
  if (text.length > RECORDING_LIMITS.characters) {
    return fail(problem("recording.too-long", { limit: RECORDING_LIMITS.frames }));
  }
  const lines = text.replace(/^\uFEFF/, "").split(/\r\n|\n|\r/);
  const first = lines.findIndex((line) => line.trim() !== "");
  if (first < 0) return fail(problem("recording.empty"));
  const separator = chooseSeparator(lines[first] ?? "");
  const head = findColumns(split(lines[first] ?? "", separator));
  const columns = head ?? { time: 0, port: 1, hex: 2 };
  const frames: RecordedFrame[] = [];
  const problems: Problem[] = [];
  for (let i = head ? first + 1 : first; i < lines.length && problems.length < RECORDING_LIMITS.problems; i++) {
    const line = lines[i] ?? "";
    if (line.trim() === "") continue;
    if (frames.length >= RECORDING_LIMITS.frames) {
      return fail(problem("recording.too-long", { limit: RECORDING_LIMITS.frames }, { line: i + 1 }));
    }
    const fields = split(line, separator);
    const hex = fields[columns.hex];
    const octets = hex === undefined ? undefined : parseHex(hex);
    if (hex === undefined) problems.push(problem("recording.columns", { count: fields.length }, { line: i + 1 }));
    else if (!octets) problems.push(problem("recording.hex", { text: hex.slice(0, 40) }, { line: i + 1 }));
    else frames.push({ time: fields[columns.time] ?? "", port: fields[columns.port] ?? "", octets, line: i + 1 });
  }
  return problems.length > 0 ? fail(...problems) : frames.length === 0 ? fail(problem("recording.empty")) : ok(frames);
}

function chooseSeparator(line: string): string {
  return line.includes("\t") ? "\t" : line.includes(";") ? ";" : ",";
}

function split(line: string, separator: string): string[] {
  return line.split(separator).map((field) => field.trim().replace(/^"(.*)"$/, "$1"));
}

/** Undefined when the line is no head. */
function findColumns(fields: readonly string[]): Columns | undefined {
  const find = (pattern: RegExp) => fields.findIndex((field) => pattern.test(field));
  const hex = find(/^(hex|bytes|octets|data|frame)$/i);
  if (hex < 0) return undefined;
  const at = (found: number): number => (found < 0 ? fields.length : found);
  return { time: at(find(/^(time|timestamp|t)$/i)), port: at(find(/^(port|source|role|device)$/i)), hex };
}
