/** `map`: a mapping document and one frame a source, in; node values with status codes, out. */
import { findLayout, type MappingDocument } from "../domain/deliver/mapping-document";
import { fail, ok, problem, type Result } from "../domain/core/result";
import type { Direction } from "../domain/iodd/device-description";
import { parseHex } from "../domain/mapping/bits";
import { findConversion } from "../domain/mapping/find-conversion";
import { MappingRunner } from "../domain/mapping/mapping-runner";
import { frameKey, planMapping } from "../domain/mapping/plan-mapping";
import type { Sample } from "../domain/mapping/sample";
import { formatQuality, formatStatus } from "../domain/mapping/status";
import type { MapCommand } from "./parse-command-line";
import { readMappingFile } from "./read-mapping";
import { refuse } from "./print-problems";

type NodeValue = {
  readonly target: string;
  readonly nodeId: string | null;
  readonly value: number | boolean | string | null;
  readonly unit: MappingDocument["nodes"][number]["unit"];
  readonly status: string;
  readonly quality: string;
};

export async function map(command: MapCommand): Promise<number> {
  const document = await readMappingFile(command.file);
  if (!document.ok) return refuse(command, command.file, document.problems);
  const values = runFrames(document.value, command.frames);
  if (!values.ok) return refuse(command, command.file, values.problems);
  process.stdout.write(
    command.isJson ? `${JSON.stringify({ nodes: values.value }, null, 2)}\n` : formatValues(values.value),
  );
  return 0;
}

function runFrames(document: MappingDocument, frames: readonly string[]): Result<NodeValue[]> {
  const plan = planMapping(document.mapping, {
    findConversion,
    findLayout: (role, direction) => {
      const layout = findLayout(document, role, direction);
      return layout ? ok(layout) : fail(problem("mapping.no-device", { role }));
    },
  });
  if (!plan.ok) return plan;
  const runner = new MappingRunner(plan.value);
  for (const text of frames) {
    const frame = readFrame(document, text);
    if (!frame.ok) return frame;
    const { role, direction, octets } = frame.value;
    const expected = plan.value.frames.get(frameKey(role, direction))?.plan.octets;
    if (expected !== undefined && octets.length !== expected) {
      return fail(problem("decode.length", { octets: octets.length, id: role, expected }));
    }
    runner.offerFrame(role, direction, { octets, isValid: true, time: 0 });
  }
  const rows = document.mapping.rows.map(({ target }) => ({ target, sample: runner.read(target) }));
  return ok(rows.flatMap(({ target, sample }) => (sample ? [toNodeValue(document, target, sample)] : [])));
}

/** `SOURCE=HEX`; `SOURCE:out=HEX` for what was set. */
function readFrame(
  document: MappingDocument,
  text: string,
): Result<{ role: string; direction: Direction; octets: Uint8Array }> {
  const at = text.lastIndexOf("=");
  const source = at < 0 ? text : text.slice(0, at);
  const direction: Direction = source.endsWith(":out") ? "out" : "in";
  const role = source.replace(/:(in|out)$/, "");
  const roles = document.mapping.roles.map((r) => r.role);
  if (!roles.includes(role)) return fail(problem("mapping.unknown-role", { role, choices: roles.join(", ") }));
  const octets = parseHex(text.slice(at + 1));
  return octets && at >= 0
    ? ok({ role, direction, octets })
    : fail(problem("decode.hex", { text: text.slice(at + 1) }));
}

function toNodeValue(document: MappingDocument, target: string, sample: Sample): NodeValue {
  const node = document.nodes.find((n) => n.target === target);
  return {
    target,
    nodeId: node?.nodeId ?? null,
    value: typeof sample.value === "bigint" ? sample.value.toString() : sample.value,
    unit: node?.unit ?? null,
    status: formatStatus(sample.status),
    quality: formatQuality(sample.status),
  };
}

function formatValues(values: readonly NodeValue[]): string {
  const rows = values.map(
    (v) =>
      `${v.target}: ${v.value ?? "–"}${v.unit && v.value !== null ? ` ${v.unit.symbol}` : ""}  ${v.status} ${v.quality}`,
  );
  return `${rows.join("\n")}\n`;
}
