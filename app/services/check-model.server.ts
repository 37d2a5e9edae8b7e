/** Findings of a model's working state, kept by model and continued from the last run after an edit. */
import { listWaivers } from "../db/repositories/waivers.server";
import type { AddressSpace } from "../domain/address-space/address-space";
import { startChecksInSteps, updateChecks, type CheckRun } from "../domain/checks/run-checks";
import { keepFrom, toReport, type CheckReport, type ReportedFinding } from "../domain/checks/to-report";
import type { Finding } from "../domain/checks/finding";
import type { Wiring } from "../domain/checks/wiring";
import { makeWiring } from "../domain/mapping/make-wiring";
import { applyWaivers, type WaivedFindings, type Waiver } from "../domain/checks/waivers";
import type { Severity } from "../domain/core/result";
import { singleton } from "../utils/singleton.server";
import { exportModel } from "./export-model.server";
import { loadPlannedSources } from "./load-planned-sources.server";
import { loadWorkingModel } from "./working-model.server";

const MAX_CACHED = 16;
/** How long a check may keep the thread before other requests get their turn. */
const SLICE_MS = 15;
const getRuns = () => singleton("check-runs", () => new Map<string, Promise<CheckRun>>());

export type ModelFindings = {
  readonly seq: number;
  /** Those that nobody has accepted. */
  readonly findings: readonly Finding[];
  readonly waived: WaivedFindings["waived"];
};

/** The findings at the head; undefined when the model is gone. */
export async function checkModel(modelId: string): Promise<ModelFindings | undefined> {
  const working = await loadWorkingModel(modelId);
  const runs = getRuns();
  if (!working) {
    runs.delete(modelId);
    return undefined;
  }
  // A run takes over the memory of the one before, so those of one model stand in a queue.
  const before = runs.get(modelId);
  const wiring = makeWiring(working.space, await loadPlannedSources(working.model.organizationId));
  const run = before ? before.then((last) => advance(last, working.space, wiring), () => check(working.space, wiring)) : check(working.space, wiring);
  runs.delete(modelId);
  runs.set(modelId, run);
  for (const oldest of runs.keys()) {
    if (runs.size <= MAX_CACHED) break;
    runs.delete(oldest);
  }
  const { findings, space } = await run;
  const { open, waived } = applyWaivers(space, findings, await listWaivers(modelId));
  return { seq: working.seq, findings: open, waived };
}

/** All findings of the state that was checked last, accepted ones too; for who decides on them. */
export async function listAllFindings(modelId: string): Promise<{ seq: number; space: AddressSpace; findings: readonly Finding[] } | undefined> {
  const checked = await checkModel(modelId);
  const run = await getRuns().get(modelId);
  return checked && run && { seq: checked.seq, space: run.space, findings: run.findings };
}

/** An edit touches little; other required models are a new check. */
function advance(last: CheckRun, space: AddressSpace, wiring: Wiring): CheckRun | Promise<CheckRun> {
  const isSameBase = last.space.layers.length === space.layers.length && last.space.layers.every((layer, i) => layer === space.layers[i] || layer === last.space.own);
  return isSameBase ? updateChecks(last, space, wiring) : check(space, wiring);
}

async function check(space: AddressSpace, wiring: Wiring): Promise<CheckRun> {
  const steps = startChecksInSteps(space, { wiring });
  let since = performance.now();
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
    if (performance.now() - since < SLICE_MS) continue;
    await new Promise((resolve) => setImmediate(resolve));
    since = performance.now();
  }
}

export type FindingCounts = { readonly error: number; readonly warning: number; readonly hint: number };

/** How many of each severity, for lists and title blocks. */
export function countFindings(findings: readonly Pick<Finding, "severity">[]): FindingCounts {
  const counts = { error: 0, warning: 0, hint: 0 };
  for (const { severity } of findings) counts[severity]++;
  return counts;
}

export type ModelReport = {
  readonly report: CheckReport;
  readonly waived: readonly { readonly finding: ReportedFinding; readonly waiver: Waiver }[];
};

/** The report that the API and the command line share: findings with the lines of the export. */
export async function reportModel(modelId: string, lowest?: Severity): Promise<ModelReport | undefined> {
  const checked = await checkModel(modelId);
  const written = await exportModel(modelId);
  if (!checked || !written) return undefined;
  const { missing, warnings } = written.working;
  const { fileName: file, lines } = written;
  const waived = checked.waived.flatMap(({ finding, waiver }) =>
    toReport([finding], { file, lines }).findings.map((reported) => ({ finding: reported, waiver })),
  );
  const report = toReport(checked.findings, { file, lines, problems: [...missing, ...warnings] });
  return { report: keepFrom(report, lowest), waived };
}
