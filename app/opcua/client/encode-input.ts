/** What a person typed → a Variant of the data type that the server wants. Scalars only; the rest is refused, never guessed. */
import { DataType, LocalizedText, Variant, VariantArrayType } from "node-opcua";
import { fail, ok, problem, type Result } from "~/domain/core/result";
import { INTEGER_RANGES, type BuiltInType } from "~/domain/simulation/motion";

export type Input = string | number | boolean;

/** Problems: `endpoint.input` (not a value of the type), `endpoint.input-type` (a type that is not written from here). */
export function encodeInput(input: Input, dataType: DataType, name: string): Result<Variant> {
  const type = (DataType[dataType] ?? "Variant") as BuiltInType;
  const wrong = (): Result<Variant> => fail(problem("endpoint.input", { name, value: String(input), type }));
  const made = (value: unknown): Result<Variant> => ok(new Variant({ dataType, arrayType: VariantArrayType.Scalar, value }));
  if (type === "Boolean") return input === true || input === "true" ? made(true) : input === false || input === "false" ? made(false) : wrong();
  if (type === "Int64" || type === "UInt64") return encodeLong(input, type, made, wrong);
  const bounds = INTEGER_RANGES[type];
  if (bounds || type === "Float" || type === "Double") {
    const number = toNumber(input);
    const fits = Number.isFinite(number) && (!bounds || (Number.isInteger(number) && number >= bounds[0] && number <= bounds[1]));
    return fits ? made(number) : wrong();
  }
  if (type === "String") return made(String(input));
  if (type === "LocalizedText") return made(new LocalizedText({ text: String(input) }));
  if (type === "DateTime") {
    const date = new Date(String(input));
    return Number.isNaN(date.getTime()) ? wrong() : made(date);
  }
  return fail(problem("endpoint.input-type", { name, type }));
}

/** People write the minus as on screen, and a comma where their language does. */
function toNumber(input: Input): number {
  const text = String(input).trim().replace("\u2212", "-").replace(",", ".");
  return text === "" ? Number.NaN : Number(text);
}

function encodeLong(input: Input, type: "Int64" | "UInt64", made: (value: unknown) => Result<Variant>, wrong: () => Result<Variant>): Result<Variant> {
  const text = String(input).trim().replace("\u2212", "-");
  if (!/^-?\d{1,20}$/.test(text)) return wrong();
  const value = BigInt(text);
  const fits = type === "Int64" ? BigInt.asIntN(64, value) === value : BigInt.asUintN(64, value) === value;
  if (!fits) return wrong();
  const whole = BigInt.asUintN(64, value);
  return made([Number(whole >> 32n), Number(whole & 0xffffffffn)]);
}
