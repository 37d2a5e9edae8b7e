/** Findings as the command line and the API print them. */
import type { NodeKey } from "../address-space/node-id";
import { formatProblem } from "../core/problem-texts";
import type { Problem, Severity } from "../core/result";
import type { Finding } from "./finding";
import { FILE_RULES } from "./file-rules";
import { findRule } from "./registry";
import { toFindings, type PlacedFinding } from "./problem-findings";

export type ReportedFinding = {
  readonly rule: string;
  readonly severity: Severity;
  readonly nodeId: string;
  readonly browseName: string;
  readonly path: string;
  readonly attribute?: string;
  readonly line: number;
  readonly column: number;
  readonly message: string;
  readonly clause: string;
  readonly facts: readonly string[];
  /** What happens in practice if nobody mends it. */
  readonly consequence?: string;
};

export type ReportedProblem = {
  readonly code: string;
  readonly message: string;
  readonly line: number;
  readonly column: number;
};

export type CheckReport = {
  readonly file: string;
  readonly counts: Readonly<Record<Severity, number>>;
  readonly findings: readonly ReportedFinding[];
  readonly problems: readonly ReportedProblem[];
};

export type ReportSources = {
  readonly file: string;
  /** Where each node's element starts: the reader's map, or the writer's, which knows lines only. */
  readonly lines: ReadonlyMap<NodeKey, number | { readonly line: number; readonly column: number }>;
  readonly problems?: readonly Problem[];
  /** Findings about the text of the file. */
  readonly ofText?: readonly PlacedFinding[];
};

/**
 * The report of one file, in the order of its lines. What belongs to the model as a whole stands at line 1. Problems of
 * reading that break a rule appear among the findings too.
 */
export function toReport(findings: readonly Finding[], sources: ReportSources): CheckReport {
  const { file, lines, problems = [], ofText = [] } = sources;
  const placed: PlacedFinding[] = [
    ...findings.map((f) => ({ ...f, ...findPlace(f, lines) })),
    ...toFindings(problems),
    ...ofText,
  ];
  const reported = placed.map(toReportedFinding).sort(compareReported);
  const counts = { error: 0, warning: 0, hint: 0 };
  for (const { severity } of reported) counts[severity]++;
  return { file, counts, findings: reported, problems: problems.map(toReportedProblem) };
}

const WEIGHT: Readonly<Record<Severity, number>> = { error: 2, warning: 1, hint: 0 };

/** Whether a severity is the asked one or above. */
export function isAtLeast(severity: Severity, lowest: Severity): boolean {
  return WEIGHT[severity] >= WEIGHT[lowest];
}

/** The report without findings below the severity that is asked for. */
export function keepFrom(report: CheckReport, lowest: Severity | undefined): CheckReport {
  if (lowest === undefined) return report;
  const findings = report.findings.filter((f) => isAtLeast(f.severity, lowest));
  const counts = { error: 0, warning: 0, hint: 0 };
  for (const { severity } of findings) counts[severity]++;
  return { ...report, counts, findings };
}

function findPlace(finding: Finding, lines: ReportSources["lines"]): { line: number; column: number } {
  const place = finding.key === undefined ? undefined : lines.get(finding.key);
  if (place === undefined) return { line: 1, column: 1 };
  return typeof place === "number" ? { line: place, column: 1 } : { line: place.line, column: place.column };
}

function toReportedFinding(finding: PlacedFinding): ReportedFinding {
  const { rule, severity, nodeId, browseName, path, attribute, line = 1, column = 1, message, clause, facts } = finding;
  const consequence = (findRule(rule) ?? FILE_RULES.find((r) => r.id === rule))?.why;
  return {
    rule,
    severity,
    nodeId,
    browseName,
    path,
    line,
    column,
    message,
    clause,
    facts,
    ...(attribute === undefined ? {} : { attribute }),
    ...(consequence === undefined ? {} : { consequence }),
  };
}

function toReportedProblem(found: Problem): ReportedProblem {
  return { code: found.code, message: formatProblem(found), line: found.at?.line ?? 1, column: found.at?.column ?? 1 };
}

function compareReported(a: ReportedFinding, b: ReportedFinding): number {
  return a.line - b.line || a.column - b.column || compareText(a.rule, b.rule) || compareText(a.message, b.message);
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
