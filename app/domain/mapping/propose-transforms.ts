/**
 * Between a source and a Variable: which transforms unit and data type ask for. Gradient and offset of process data are
 * applied by decoding already and never proposed again.
 */
import { problem, type Problem } from "../core/result";
import { canConvert, unitByCode } from "../units/units";
import type { FieldPlan } from "./decode-frame";
import type { Target } from "./list-targets";
import type { Transform } from "./mapping";

export type SourceFacts = {
  readonly field?: FieldPlan;
  /** UN/CEFACT code of what the source delivers. */
  readonly unit?: string;
  /** value = raw × scale + offset, for sources that deliver raw numbers. */
  readonly scale?: number;
  readonly offset?: number;
};

export type TransformProposal = {
  readonly transforms: Transform[];
  /** Why, in short sentences. */
  readonly reasons: readonly string[];
  readonly problems: readonly Problem[];
};

export function proposeTransforms(target: Target, facts: SourceFacts): TransformProposal {
  const transforms: Transform[] = [];
  const reasons: string[] = [];
  const problems: Problem[] = [];
  if ((facts.scale ?? 1) !== 1 || (facts.offset ?? 0) !== 0) {
    transforms.push({ kind: "linear", gradient: facts.scale ?? 1, offset: facts.offset ?? 0 });
    reasons.push(`The list gives a scale of ${facts.scale ?? 1}${facts.offset ? ` and an offset of ${facts.offset}` : ""}.`);
  }
  const from = facts.unit ?? facts.field?.unit?.code ?? "";
  const to = target.unit?.code ?? "";
  if (from !== "" && to !== "" && from !== to) {
    if (canConvert(from, to)) {
      transforms.push({ kind: "unit", from, to });
      reasons.push(`The source delivers ${symbolOf(from)}, the Variable is in ${symbolOf(to)}.`);
    } else problems.push(problem.warning("transform.unit-dimension", { from: symbolOf(from), to: symbolOf(to) }));
  }
  const map = proposeValueMap(target, facts.field);
  if (map) {
    transforms.push(map);
    reasons.push("The values of the source have the names of the Variable's states.");
  }
  return { transforms, reasons, problems };
}

function symbolOf(code: string): string {
  return unitByCode(code)?.symbol ?? code;
}

/** A map from the device's single values to states of the same name, where the numbers are not the same anyway. */
function proposeValueMap(target: Target, field: FieldPlan | undefined): Transform | undefined {
  const named = field && "singleValues" in field.type ? field.type.singleValues : [];
  if (target.states.length === 0 || named.length === 0) return undefined;
  const entries = named.flatMap(({ value, name }) => {
    const texts = Object.values(name ?? {}).map(fold);
    const state = target.states.find((s) => texts.includes(fold(s.text)));
    return state ? [{ from: value, to: state.value }] : [];
  });
  const isSame = entries.every(({ from, to }) => Number(from) === to);
  return entries.length === 0 || isSame ? undefined : { kind: "value-map", entries };
}

function fold(text: string): string {
  return text.toLowerCase().replace(/[^a-z0-9]+/g, "");
}
