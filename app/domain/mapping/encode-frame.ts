/**
 * Values → process data out: the reverse of decode-frame. Limits are checked before anything is written, since an output
 * can move machinery: a value outside its range is refused, never clipped.
 */
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import type { FieldPlan, FramePlan } from "./decode-frame";
import { writeBits } from "./bits";
import { unscale } from "./scale";

/** Physical values by field id. Fields that are not named stay zero. */
export type FieldInputs = Readonly<Record<string, number | bigint | boolean>>;

/** Problems: `encode.unknown-field`, `encode.not-encodable`, `encode.out-of-range`, `encode.not-a-number`. */
export function encodeFrame(plan: FramePlan, inputs: FieldInputs): Result<Uint8Array> {
  const octets = new Uint8Array(plan.octets);
  const problems: Problem[] = [];
  for (const [id, input] of Object.entries(inputs)) {
    const field = plan.fields.find((f) => f.id === id);
    if (!field) {
      problems.push(problem("encode.unknown-field", { id, choices: plan.fields.map((f) => f.id).join(", ") }));
      continue;
    }
    const bits = toBits(field, input);
    if (typeof bits === "bigint") writeBits(octets, field.bitOffset, field.bitLength, bits);
    else problems.push(bits);
  }
  return problems.length > 0 ? fail(...problems) : ok(octets);
}

function toBits(field: FieldPlan, input: number | bigint | boolean): bigint | Problem {
  const { type, id } = field;
  switch (type.kind) {
    case "BooleanT":
      return input === false || input === 0 || input === 0n ? 0n : 1n;
    case "Float32T": {
      const view = new DataView(new ArrayBuffer(4));
      view.setFloat32(0, (Number(input) - field.offset) / field.gradient);
      return BigInt(view.getUint32(0));
    }
    case "UIntegerT":
    case "IntegerT":
      return toIntegerBits(field, type, input);
    default:
      return problem("encode.not-encodable", { id, kind: type.kind });
  }
}

function toIntegerBits(
  field: FieldPlan,
  type: Extract<FieldPlan["type"], { kind: "UIntegerT" | "IntegerT" }>,
  input: number | bigint | boolean,
): bigint | Problem {
  const { id, bitLength } = field;
  const isScaled = field.gradient !== 1 || field.offset !== 0;
  const physical = typeof input === "boolean" ? Number(input) : input;
  if (typeof physical === "number" && !Number.isFinite(physical)) return problem("encode.not-a-number", { id });
  const raw =
    typeof physical === "bigint" && !isScaled
      ? physical
      : BigInt(isScaled ? unscale(Number(physical), field) : Math.round(Number(physical)));
  const [lower, upper] =
    type.kind === "IntegerT"
      ? [-(1n << BigInt(bitLength - 1)), (1n << BigInt(bitLength - 1)) - 1n]
      : [0n, (1n << BigInt(bitLength)) - 1n];
  const isAllowed =
    type.ranges.length === 0 ||
    type.ranges.some((r) => Number(raw) >= r.lower && Number(raw) <= r.upper) ||
    type.singleValues.some((s) => Number(s.value) === Number(raw));
  if (raw < lower || raw > upper || !isAllowed) return problem("encode.out-of-range", { id, value: String(input) });
  return BigInt.asUintN(bitLength, raw);
}
