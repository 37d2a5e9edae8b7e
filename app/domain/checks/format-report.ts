/**
 * A report for people: one line a finding, in the form that editors and pipelines turn into links. `isChecked` is false
 * when the file could not be checked, and nothing can be said about its findings.
 */
import type { CheckReport } from "./to-report";

export function formatReport(report: CheckReport, isChecked: boolean): string {
  const { file, counts, findings, problems } = report;
  const lines: string[] = [];
  for (const { line, column, code, message } of problems) lines.push(`${file}:${line}:${column}: ${message} [${code}]`);
  for (const finding of findings) {
    const { line, column, severity, rule, message, path, facts, clause, consequence } = finding;
    lines.push(`${file}:${line}:${column}: ${severity} ${rule}: ${message}${path === "" ? "" : ` (${path})`}`);
    for (const fact of facts) lines.push(`    ${fact}`);
    if (consequence !== undefined) lines.push(`    If ignored: ${consequence}`);
    if (clause !== "") lines.push(`    ${clause}`);
  }
  if (!isChecked) lines.push("Not checked.");
  else
    lines.push(`${count(counts.error, "error")}, ${count(counts.warning, "warning")}, ${count(counts.hint, "hint")}`);
  return `${lines.join("\n")}\n`;
}

function count(number: number, name: string): string {
  return `${number} ${name}${number === 1 ? "" : "s"}`;
}
