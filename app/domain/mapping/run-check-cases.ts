/** Check cases: recorded input of a mapping with the node values expected from it. Every case starts with fresh memory. */
import type { AddressSpace } from "../address-space/address-space";
import type { NodeKey } from "../address-space/node-id";
import { fail, ok, problem, type Problem, type Result } from "../core/result";
import { parseHex } from "./bits";
import { findConversion } from "./find-conversion";
import { findTarget } from "./list-targets";
import { listParts } from "./mapping-entries";
import type { CheckCase } from "./mapping-parts";
import { MappingRunner } from "./mapping-runner";
import { frameKey, planMapping, toChannelKey, type MappingPlan } from "./plan-mapping";
import type { SampleValue } from "./sample";
import { formatStatusWithLimit } from "./status";
import { makeRoleLayouts, makeTargetRanges, toMapping } from "./type-mapping";

export type Expected = CheckCase["expected"][number];

/** One expected value that came out otherwise. */
export type CaseMiss = {
  readonly target: string;
  readonly path: string;
  readonly expected: Expected;
  /** Undefined where the mapping does not feed the target at all. */
  readonly found: { readonly value: SampleValue; readonly status: number } | undefined;
};

export type CaseResult = {
  readonly id: string;
  readonly name: string;
  readonly misses: readonly CaseMiss[];
  /** What kept the case from being run: a frame that is no hexadecimal text, one of the wrong length. */
  readonly problems: readonly Problem[];
};

/** The plan of a type's mapping as the model keeps it. Problems: those of `planMapping`. */
export function planTypeMapping(space: AddressSpace, type: NodeKey): Result<MappingPlan> {
  return planMapping(toMapping(space, type), {
    findConversion,
    findLayout: makeRoleLayouts(space, type),
    findRanges: makeTargetRanges(space, type),
  });
}

/** All cases of a type. Problems: those of `planMapping`, when the mapping cannot run at all. */
export function runCheckCases(space: AddressSpace, type: NodeKey): Result<CaseResult[]> {
  const cases = listParts(space, "check-case", type);
  if (cases.length === 0) return ok([]);
  const plan = planTypeMapping(space, type);
  if (!plan.ok) return fail(...plan.problems);
  const toPath = (target: string): string => findTarget(space, type, target)?.path ?? target;
  return ok(cases.map(({ id, value }) => ({ id, name: value.name, ...runCase(plan.value, value, toPath) })));
}

/** `toPath` makes of an expected target the one that the plan's rows have. */
export function runCase(
  plan: MappingPlan,
  value: CheckCase,
  toPath: (target: string) => string,
): Pick<CaseResult, "misses" | "problems"> {
  const runner = new MappingRunner(plan);
  const problems: Problem[] = [];
  for (const { role, direction, hex, isValid = true } of value.frames) {
    const octets = parseHex(hex);
    const expected = plan.frames.get(frameKey(role, direction))?.plan.octets;
    if (!octets) problems.push(problem("decode.hex", { text: hex }));
    else if (expected !== undefined && octets.length !== expected) {
      problems.push(problem("decode.length", { octets: octets.length, id: role, expected }));
    } else runner.offerFrame(role, direction, { octets, isValid, time: 0 });
  }
  for (const { reference, value: given, status = 0 } of value.samples) {
    if (reference.kind !== "constant") runner.offerSample(toChannelKey(reference), { value: given, status, time: 0 });
  }
  const misses = value.expected.flatMap((expected): CaseMiss[] => {
    const path = toPath(expected.target);
    const sample = runner.read(path);
    const isMet = sample !== undefined && sample.status === expected.status && isSameValue(sample.value, expected);
    return isMet ? [] : [{ target: expected.target, path, expected, found: sample && { value: sample.value, status: sample.status } }];
  });
  return { misses, problems };
}

function isSameValue(found: SampleValue, { value, tolerance = 0 }: Expected): boolean {
  if (typeof value === "number" && (typeof found === "number" || typeof found === "bigint")) {
    return Math.abs(Number(found) - value) <= tolerance;
  }
  return typeof found === "bigint" ? found.toString() === value : found === value;
}

/** `CreelDistance: expected 220 Good, got 219.9 Good`. */
export function formatMiss({ path, expected, found }: CaseMiss): string {
  const wanted = `expected ${String(expected.value ?? "no value")} ${formatStatusWithLimit(expected.status)}`;
  const got = found ? `got ${String(found.value ?? "no value")} ${formatStatusWithLimit(found.status)}` : "nothing feeds it";
  return `${path}: ${wanted}, ${got}`;
}
