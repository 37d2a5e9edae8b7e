/** Findings of a model's working state, kept by model and continued from the last run after an edit. */
import { startChecks, updateChecks, type CheckRun } from "../domain/checks/run-checks";
import { toReport, type CheckReport } from "../domain/checks/to-report";
import type { Finding } from "../domain/checks/finding";
import { singleton } from "../utils/singleton.server";
import { exportModel } from "./export-model.server";
import { loadWorkingModel } from "./working-model.server";

const MAX_CACHED = 16;
const getRuns = () => singleton("check-runs", () => new Map<string, CheckRun>());

export type ModelFindings = { readonly seq: number; readonly findings: readonly Finding[] };

/** The findings at the head; undefined when the model is gone. */
export async function checkModel(modelId: string): Promise<ModelFindings | undefined> {
  const working = await loadWorkingModel(modelId);
  if (!working) {
    getRuns().delete(modelId);
    return undefined;
  }
  const runs = getRuns();
  const before = runs.get(modelId);
  const run = before ? updateChecks(before, working.space) : startChecks(working.space);
  runs.delete(modelId);
  runs.set(modelId, run);
  for (const oldest of runs.keys()) {
    if (runs.size <= MAX_CACHED) break;
    runs.delete(oldest);
  }
  return { seq: working.seq, findings: run.findings };
}

export type FindingCounts = { readonly error: number; readonly warning: number; readonly hint: number };

/** How many of each severity, for lists and title blocks. */
export function countFindings(findings: readonly Pick<Finding, "severity">[]): FindingCounts {
  const counts = { error: 0, warning: 0, hint: 0 };
  for (const { severity } of findings) counts[severity]++;
  return counts;
}

/** The report that the API and the command line share: findings with the lines of the export. */
export async function reportModel(modelId: string): Promise<CheckReport | undefined> {
  const checked = await checkModel(modelId);
  const written = await exportModel(modelId);
  if (!checked || !written) return undefined;
  const { missing, warnings } = written.working;
  return toReport(checked.findings, { file: written.fileName, lines: written.lines, problems: [...missing, ...warnings] });
}
