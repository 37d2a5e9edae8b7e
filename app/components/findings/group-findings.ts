/** Findings in the order in which people settle them: errors first, then by rule or by place. */
import type { Finding } from "~/domain/checks/finding";
import { findRule } from "~/domain/checks/registry";
import type { Severity } from "~/domain/core/result";

export type Grouping = "rule" | "place";

export type FindingGroup = {
  readonly id: string;
  readonly title: string;
  /** Rule number, or the path's first part. */
  readonly mark: string;
  readonly clause: string | undefined;
  readonly severity: Severity;
  readonly findings: readonly Finding[];
};

const weight: Readonly<Record<Severity, number>> = { error: 0, warning: 1, hint: 2 };

export function groupFindings(findings: readonly Finding[], grouping: Grouping): FindingGroup[] {
  const groups = new Map<string, Finding[]>();
  for (const finding of findings) {
    const id = grouping === "rule" ? finding.rule : toPlace(finding);
    const list = groups.get(id);
    if (list) list.push(finding);
    else groups.set(id, [finding]);
  }
  return [...groups].map(([id, list]) => toGroup(id, list, grouping)).sort(compareGroups);
}

/** The type or the topmost object that owns the finding's node. */
function toPlace(finding: Finding): string {
  return finding.key === undefined ? "" : (finding.path.split("/")[0] ?? "");
}

function toGroup(id: string, list: readonly Finding[], grouping: Grouping): FindingGroup {
  const findings = [...list].sort((a, b) => weight[a.severity] - weight[b.severity]);
  const severity = findings[0]?.severity ?? "hint";
  if (grouping === "place")
    return { id, mark: "", title: id === "" ? "The model as a whole" : id, clause: undefined, severity, findings };
  const clauses = new Set(findings.map((finding) => finding.clause));
  return {
    id,
    mark: id,
    title: findRule(id)?.title ?? id,
    clause: clauses.size === 1 ? findings[0]?.clause : undefined,
    severity,
    findings,
  };
}

function compareGroups(a: FindingGroup, b: FindingGroup): number {
  return weight[a.severity] - weight[b.severity] || (a.id < b.id ? -1 : a.id > b.id ? 1 : 0);
}

/** Whether the text occurs in what a row shows. */
export function matchesText(finding: Finding, text: string): boolean {
  const wanted = text.trim().toLowerCase();
  if (wanted === "") return true;
  return [
    finding.rule,
    finding.browseName,
    finding.path,
    finding.message,
    finding.clause,
    findRule(finding.rule)?.title ?? "",
  ].some((part) => part.toLowerCase().includes(wanted));
}

/** A finding's identity among those of one model: the same fault keeps it from run to run. */
export function getFindingId(finding: Finding): string {
  return [finding.rule, finding.key ?? "", finding.attribute ?? "", finding.message].join("\n");
}
