/**
 * Expected outcomes are values. A reader returns what it could read and the problems it met; a failure carries at
 * least one problem of severity "error". Misuse by a programmer throws instead.
 */

export type Severity = "error" | "warning" | "hint";

/** Where a problem stands: a place in a file, a node, an attribute, or several of these. Lines and columns are 1-based. */
export type Place = {
  file?: string;
  line?: number;
  column?: number;
  /** NodeId text with `nsu=` (see formatNodeId), or a node key. */
  node?: string;
  attribute?: string;
  path?: string;
};

/** A coded problem. Its text comes from the one table in `problem-texts.ts`, keyed by `code`. */
export type Problem = {
  code: string;
  severity: Severity;
  at?: Place;
  data?: Readonly<Record<string, string | number | boolean>>;
};

export type Result<T> =
  { ok: true; value: T; problems: readonly Problem[] } | { ok: false; problems: readonly Problem[] };

export function ok<T>(value: T, problems: readonly Problem[] = []): Result<T> {
  return { ok: true, value, problems };
}

/** A failure; throws RangeError when called without a problem, since a failure must say why. */
export function fail<T = never>(...problems: readonly Problem[]): Result<T> {
  if (problems.length === 0) throw new RangeError("fail() needs at least one problem");
  return { ok: false, problems };
}

/** Makes a problem of severity "error"; `problem.warning` and `problem.hint` make the others. */
export function problem(code: string, data?: Problem["data"], at?: Place): Problem {
  return makeProblem(code, "error", data, at);
}

problem.warning = (code: string, data?: Problem["data"], at?: Place): Problem => makeProblem(code, "warning", data, at);
problem.hint = (code: string, data?: Problem["data"], at?: Place): Problem => makeProblem(code, "hint", data, at);

function makeProblem(code: string, severity: Severity, data?: Problem["data"], at?: Place): Problem {
  return { code, severity, ...(at ? { at } : {}), ...(data ? { data } : {}) };
}

/** The value of a Result that cannot have failed; throws RangeError with the codes when it did (programmer mistake). */
export function getValue<T>(result: Result<T>): T {
  if (result.ok) return result.value;
  throw new RangeError(`Unexpected failure: ${result.problems.map((p) => p.code).join(", ")}`);
}

/** Makes a switch exhaustive; throws RangeError with the value. */
export function assertNever(value: never): never {
  throw new RangeError(`Unexpected value: ${JSON.stringify(value)}`);
}
