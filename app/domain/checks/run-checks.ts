/**
 * The runner. `startChecks` checks a whole model and keeps what it learned; `updateChecks` takes the next state of the
 * model and checks again only what the difference can touch. Both answer the same findings for the same model, in one
 * order: the model as a whole first, then node by node in the model's order, rule by rule.
 */
import type { AddressSpace } from "../address-space/address-space";
import type { Node } from "../address-space/node";
import type { NodeKey } from "../address-space/node-id";
import { CheckContext } from "./check-context";
import type { Finding, Report } from "./finding";
import { compareRanked, mergeRanked, rankReport, type RankedFinding } from "./ranked-findings";
import { RULES } from "./registry";
import type { Rule } from "./rule";
import { RuleTable } from "./rule-table";
import type { Subject } from "./slots";
import type { Wiring } from "./wiring";

export type CheckOptions = {
  /** Only these rules; all by default. */
  readonly rules?: readonly Rule[];
  /** Mappings, machines and sources; without them the rules about these do not run. */
  readonly wiring?: Wiring;
  /** Called now and then with the number of nodes checked. */
  readonly onProgress?: (done: number, total: number) => void;
  /** Asked as often; true ends the run with what was found until then. */
  readonly shouldStop?: () => boolean;
};

/** A run that can be continued. `updateChecks` takes its memory over: keep the newest run only. */
export type CheckRun = {
  readonly findings: readonly Finding[];
  readonly space: AddressSpace;
  readonly options: CheckOptions;
  readonly context: CheckContext;
  readonly table: RuleTable;
  readonly ranked: readonly RankedFinding[];
};

const STEP = 50;
const PROGRESS_STEP = 500;

/** Checks the own model of an address space; findings inside required models stay out. Never throws. */
export function runChecks(space: AddressSpace, options: CheckOptions = {}): readonly Finding[] {
  return run(space, options, new CheckContext(space, false)).findings;
}

/** Like `runChecks`, and ready to be continued by `updateChecks`. */
export function startChecks(space: AddressSpace, options: CheckOptions = {}): CheckRun {
  return run(space, options, new CheckContext(space));
}

/**
 * Like `startChecks`, in steps: whoever shares a thread with others does something else between them. Each step answers how
 * many nodes are done; the last one answers the run.
 */
export function startChecksInSteps(
  space: AddressSpace,
  options: CheckOptions = {},
): Generator<number, CheckRun, undefined> {
  return takeSteps(space, options, new CheckContext(space));
}

function run(space: AddressSpace, options: CheckOptions, context: CheckContext): CheckRun {
  const steps = takeSteps(space, options, context);
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}

function* takeSteps(
  space: AddressSpace,
  options: CheckOptions,
  context: CheckContext,
): Generator<number, CheckRun, undefined> {
  const table = new RuleTable(options.rules ?? RULES);
  const ranked: RankedFinding[] = [];
  const checks: Checks = { context, table, wiring: options.wiring };
  checkSubject("model", checks, ranked);
  checkSubject("wiring", checks, ranked);
  const total = space.own.nodes.size;
  let done = 0;
  for (const key of space.own.nodes.keys()) {
    checkSubject(key as NodeKey, checks, ranked);
    done++;
    if (done % STEP === 0) yield done;
    if (done % PROGRESS_STEP !== 0) continue;
    options.onProgress?.(done, total);
    if (options.shouldStop?.()) break;
  }
  options.onProgress?.(done, total);
  ranked.sort(compareRanked);
  return { findings: ranked.map((r) => r.finding), space, options, context, table, ranked };
}

/**
 * The findings of the next state of the model, and of its wiring where this is given. The same as a full run, at the price
 * of what the difference touches. A change of the tree of ReferenceTypes or of required models asks every question anew
 * and is a full run.
 */
export function updateChecks(
  last: CheckRun,
  after: AddressSpace,
  wiring: Wiring | undefined = last.options.wiring,
): CheckRun {
  const { space: before, context, table } = last;
  const isRewired = wiring !== last.options.wiring;
  if (before === after && !isRewired) return last;
  const options = isRewired ? { ...last.options, ...(wiring ? { wiring } : {}) } : last.options;
  const changed = before.own.nodes.listChangedKeys(after.own.nodes) as NodeKey[];
  if (needsFullRun(before, after, changed)) return startChecks(after, options);
  const dirty = context.update(after, changed);
  for (const key of changed) dirty.add(key);
  if (isRewired) dirty.add("wiring");
  const found: RankedFinding[] = [];
  for (const subject of dirty) checkSubject(subject, { context, table, wiring }, found);
  const kept = last.ranked.filter((r) => !dirty.has(r.subject));
  const ranked = mergeRanked(kept, found.sort(compareRanked));
  return { findings: ranked.map((r) => r.finding), space: after, options, context, table, ranked };
}

function needsFullRun(before: AddressSpace, after: AddressSpace, changed: readonly NodeKey[]): boolean {
  if (before.layers.length !== after.layers.length) return true;
  if (before.layers.some((layer, i) => layer !== after.layers[i] && layer !== before.own)) return true;
  return changed.some(
    (key) =>
      isMovedReferenceType(before.own.nodes.get(key), after.own.nodes.get(key)) ||
      before.layers.some((layer) => layer !== before.own && layer.nodes.has(key)),
  );
}

/** Whether the tree of ReferenceTypes may differ; attributes of a ReferenceType are read like those of any node. */
function isMovedReferenceType(old: Node | undefined, node: Node | undefined): boolean {
  if (old?.nodeClass !== "ReferenceType" && node?.nodeClass !== "ReferenceType") return false;
  return old?.nodeClass !== node?.nodeClass || old?.references !== node?.references || old?.order !== node?.order;
}

type Checks = {
  readonly context: CheckContext;
  readonly table: RuleTable;
  readonly wiring: Wiring | undefined;
};

function checkSubject(subject: Subject, { context, table, wiring }: Checks, found: RankedFinding[]): void {
  context.runAs(subject, () => {
    let current: Rule | undefined;
    const report = (reported: Report): void => {
      if (current) found.push(rankReport(context, current, reported, subject));
    };
    if (subject === "model") {
      for (const rule of table.model) (current = rule).check(context, report);
    } else if (subject === "wiring") {
      if (wiring) for (const rule of table.wiring) (current = rule).check(wiring, context, report);
    } else {
      const node = context.node(subject);
      if (!node || !context.isOwn(subject)) return;
      for (const rule of table.rulesFor(node, context)) (current = rule).check(node, context, report);
    }
  });
}
