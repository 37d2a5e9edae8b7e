/**
 * Formulas over named inputs, in the expression language of mathjs restricted to what ends: numbers, names, arithmetic,
 * comparison, logic, conditions and a short list of functions. No assignments, no function definitions, no member
 * access, no loops; the number of terms is limited, so that evaluating is bounded by the length of the text.
 */
import { parse, type MathNode } from "mathjs/number";
import { fail, ok, problem, type Result } from "../core/result";

const MAX_NODES = 300;

const FUNCTIONS = new Set(
  "abs ceil floor round sign sqrt exp log log10 log2 pow min max mean sin cos tan asin acos atan atan2 hypot".split(" "),
);
const CONSTANTS = new Set(["pi", "e", "true", "false"]);
const NODE_TYPES = new Set([
  "ConstantNode",
  "SymbolNode",
  "OperatorNode",
  "ParenthesisNode",
  "ConditionalNode",
  "RelationalNode",
  "FunctionNode",
]);
const OPERATORS = new Set(
  "add subtract multiply divide mod pow unaryMinus unaryPlus larger smaller largerEq smallerEq equal unequal and or not xor".split(
    " ",
  ),
);

export type CompiledFormula = {
  /** Input names in the order of their first use. */
  readonly names: readonly string[];
  /** The result; NaN for anything that is no finite number or Boolean (such as a division by zero). */
  readonly evaluate: (inputs: Readonly<Record<string, number>>) => number | boolean;
};

/** Problems: `formula.syntax`, `formula.not-allowed`, `formula.too-long`, `formula.unknown-name`. */
export function compileFormula(expression: string, allowedNames: readonly string[]): Result<CompiledFormula> {
  const parsed = parseExpression(expression);
  if (!parsed.ok) return parsed;
  const names = new Set<string>();
  let nodes = 0;
  let refused: string | undefined;
  parsed.value.traverse((node, path) => {
    nodes++;
    const name = findName(node);
    const isCallee = path === "fn";
    if (!NODE_TYPES.has(node.type)) refused ??= node.type.replace(/Node$/, "");
    else if (node.type === "OperatorNode" && !OPERATORS.has(String(Reflect.get(node, "fn"))))
      refused ??= String(Reflect.get(node, "op"));
    else if (node.type === "ConstantNode" && typeof Reflect.get(node, "value") === "string") refused ??= "text";
    else if (node.type === "SymbolNode" && isCallee && !FUNCTIONS.has(name)) refused ??= `${name}()`;
    else if (node.type === "SymbolNode" && !isCallee && !CONSTANTS.has(name)) names.add(name);
  });
  if (nodes > MAX_NODES) return fail(problem("formula.too-long", { count: nodes, limit: MAX_NODES }));
  if (refused !== undefined) return fail(problem("formula.not-allowed", { what: refused }));
  const unknown = [...names].find((name) => !allowedNames.includes(name));
  if (unknown !== undefined) {
    return fail(problem("formula.unknown-name", { name: unknown, choices: allowedNames.join(", ") || "none" }));
  }
  const code = parsed.value.compile();
  return ok({ names: [...names], evaluate: (inputs) => toResult(code.evaluate({ mean, ...inputs })) });
}

/** The mean of what is there: an input that carries no value is left out. */
function mean(...values: readonly number[]): number {
  const known = values.filter((value) => !Number.isNaN(value));
  return known.reduce((sum, value) => sum + value, 0) / known.length;
}

function findName(node: MathNode): string {
  return String(Reflect.get(node, "name") ?? "");
}

function toResult(value: unknown): number | boolean {
  if (typeof value === "boolean") return value;
  return typeof value === "number" && Number.isFinite(value) ? value : Number.NaN;
}

/** The parser throws on bad text; this is the one place where that becomes a value. */
function parseExpression(expression: string): Result<MathNode> {
  if (expression.length > 1_000) return fail(problem("formula.too-long", { count: expression.length, limit: 1_000 }));
  try {
    return ok(parse(expression));
  } catch (error) {
    return fail(problem("formula.syntax", { message: error instanceof Error ? error.message : String(error) }));
  }
}
