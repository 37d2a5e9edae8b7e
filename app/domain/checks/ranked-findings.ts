/** Findings with their place in the order: the model as a whole, then node by node in the model's order, rule by rule. */
import { formatNodeId } from "../address-space/node-id";
import { getOwnNamespace, type ModelHeader } from "../address-space/model-header";
import type { CheckContext } from "./check-context";
import type { Finding, Report } from "./finding";
import type { Rule } from "./rule";
import type { Subject } from "./slots";

export type RankedFinding = {
  readonly finding: Finding;
  /** Whose check reported it. */
  readonly subject: Subject;
  readonly order: number;
};

/** Places a report; the place is read like everything else, so that a renamed parent changes the paths below it. */
export function rankReport(context: CheckContext, rule: Rule, reported: Report, subject: Subject): RankedFinding {
  const { message, facts, severity, attribute, place, clause, data } = reported;
  const key = reported.key ?? (subject === "model" || subject === "wiring" ? undefined : subject);
  const node = key !== undefined && context.isOwn(key) ? context.node(key) : undefined;
  const finding: Finding = {
    rule: rule.id,
    severity: severity ?? rule.severity,
    ...(node ? { key: node.key } : {}),
    nodeId: node ? formatNodeId(node.nodeId) : "",
    browseName: node?.browseName.name ?? "",
    path: node ? context.pathOf(node.key) : nameModel(context.header),
    ...(attribute === undefined ? {} : { attribute }),
    ...(place ? { place } : {}),
    message,
    clause: clause ?? rule.clause,
    facts: facts ?? [],
    ...(data ? { data } : {}),
  };
  return { finding, subject, order: node?.order ?? -1 };
}

function nameModel(header: ModelHeader): string {
  return header.models.length + header.namespaceUris.length === 0 ? "" : getOwnNamespace(header);
}

export function compareRanked(a: RankedFinding, b: RankedFinding): number {
  return (
    a.order - b.order ||
    compareText(a.finding.key ?? "", b.finding.key ?? "") ||
    compareText(a.finding.rule, b.finding.rule) ||
    compareText(a.finding.message, b.finding.message) ||
    compareText(a.finding.facts.join("\n"), b.finding.facts.join("\n"))
  );
}

/** One ordered list of two. */
export function mergeRanked(a: readonly RankedFinding[], b: readonly RankedFinding[]): RankedFinding[] {
  const merged: RankedFinding[] = [];
  let at = 0;
  for (const next of b) {
    for (let other = a[at]; other && compareRanked(other, next) <= 0; other = a[++at]) merged.push(other);
    merged.push(next);
  }
  for (; at < a.length; at++) merged.push(a[at] as RankedFinding);
  return merged;
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
