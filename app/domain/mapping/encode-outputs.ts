/**
 * The way out: values of Variables → process data out and registers. Nothing is written here; who writes gets the octets.
 * Outputs can move machinery, so a value beyond the row's limits or the field's range is refused, never clipped, and then
 * nothing at all is made.
 */
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { planFrame } from "./decode-frame";
import { encodeRegisters } from "./decode-registers";
import { encodeFrame, type FieldInputs } from "./encode-frame";
import type { InputReference, Mapping, MappingRow } from "./mapping";
import { planMapping, type PlanMappingOptions } from "./plan-mapping";
import { toNumber } from "./sample";
import { isBad, StatusCode } from "./status";
import { makeTransform } from "./transform";

type Register = Extract<InputReference, { kind: "register" }>;

export type Outputs = {
  readonly frames: readonly { readonly role: string; readonly octets: Uint8Array }[];
  readonly registers: readonly { readonly reference: Register; readonly words: readonly number[] }[];
};

/**
 * `values` by the target of out rows; rows without a value are left out. Problems with the row's target as their path:
 * `encode.beyond-limits`, `encode.no-value`, `mapping.output-kind`, those of `planMapping` and `encodeFrame`.
 */
export function encodeOutputs(mapping: Mapping, options: PlanMappingOptions, values: Readonly<Record<string, number | boolean>>): Result<Outputs> {
  const plan = planMapping(mapping, options);
  if (!plan.ok) return plan;
  const problems: Problem[] = [];
  const fields = new Map<string, FieldInputs>();
  const registers: { reference: Register; words: readonly number[] }[] = [];
  for (const row of plan.value.outputs) {
    const given = values[row.target];
    if (given === undefined) continue;
    const value = prepare(row, given, options);
    const { source } = row;
    if (!value.ok) problems.push(...value.problems.map((p) => ({ ...p, at: { path: row.target } })));
    else if (source.kind === "process-data") {
      const layout = options.findLayout(source.role, "out");
      const field = layout.ok ? planFrame(layout.value.image).fields.find((f) => f.subindex === source.subindex) : undefined;
      if (field) fields.set(source.role, { ...fields.get(source.role), [field.id]: value.value });
    } else if (source.kind === "register" && (source.table === "coil" || source.table === "holding-register")) {
      const isFlag = source.table === "coil";
      registers.push({ reference: source, words: isFlag ? [value.value === 0 ? 0 : 1] : encodeRegisters(value.value, source.type ?? "UInt16", source.order) });
    } else problems.push(problem("mapping.output-kind", {}, { path: row.target }));
  }
  const frames: { role: string; octets: Uint8Array }[] = [];
  for (const [role, inputs] of fields) {
    const layout = options.findLayout(role, "out");
    const encoded = layout.ok ? encodeFrame(planFrame(layout.value.image), inputs) : layout;
    if (encoded.ok) frames.push({ role, octets: encoded.value });
    else problems.push(...encoded.problems);
  }
  return problems.length > 0 ? fail(...problems) : ok({ frames, registers });
}

/** Limits hold for the Variable's value, before any transform. */
function prepare(row: MappingRow, given: number | boolean, options: PlanMappingOptions): Result<number> {
  const { limits } = row;
  const number = Number(given);
  if (!limits || !(number >= limits.low && number <= limits.high)) {
    return fail(problem("encode.beyond-limits", { value: String(given), low: limits?.low ?? 0, high: limits?.high ?? 0 }));
  }
  let sample = { value: given as number | boolean | string | bigint | null, status: StatusCode.Good as number, time: 0 };
  for (const transform of row.transforms) {
    const step = makeTransform(transform, options.findConversion);
    if (!step.ok) return step;
    sample = step.value(sample);
  }
  const value = isBad(sample.status) ? undefined : toNumber(sample.value);
  return value === undefined ? fail(problem("encode.no-value")) : ok(value);
}
