/**
 * The runner. `startChecks` checks a whole model and keeps what it learned; `updateChecks` takes the next state of the
 * model and checks again only what the difference can touch. Both answer the same findings for the same model, in one
 * order: the model as a whole first, then node by node in the model's order, rule by rule.
 */
import type { AddressSpace } from "../address-space/address-space";
import { getPath } from "../address-space/browse";
import { compareRank } from "../address-space/edge-index";
import type { Node, NodeClass } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { getOwnNamespace } from "../address-space/model-header";
import { CheckContext } from "./check-context";
import type { Finding, Report, RuleId } from "./finding";
import { RULES } from "./registry";
import { ALL_CLASSES, type ModelRule, type NodeRule, type Rule } from "./rule";
import type { Subject } from "./slots";

export type CheckOptions = {
  /** Only these rules; all by default. */
  readonly rules?: readonly Rule[];
  /** Called now and then with the number of nodes checked. */
  readonly onProgress?: (done: number, total: number) => void;
  /** Asked as often; true ends the run with what was found until then. */
  readonly shouldStop?: () => boolean;
};

type RawFinding = Report & { readonly rule: Rule };

/** A run that can be continued. `updateChecks` takes its memory over: keep the newest run only. */
export type CheckRun = {
  readonly findings: readonly Finding[];
  readonly space: AddressSpace;
  readonly options: CheckOptions;
  readonly context: CheckContext;
  readonly results: Map<Subject, readonly RawFinding[]>;
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
  const results = new Map<Subject, readonly RawFinding[]>();
  const rules = groupRules(options.rules ?? RULES);
  checkSubject("model", context, rules, results);
  const total = space.own.nodes.size;
  let done = 0;
  for (const key of space.own.nodes.keys()) {
    checkSubject(key as NodeKey, context, rules, results);
    done++;
    if (done % STEP === 0) yield done;
    if (done % PROGRESS_STEP !== 0) continue;
    options.onProgress?.(done, total);
    if (options.shouldStop?.()) break;
  }
  options.onProgress?.(done, total);
  return { findings: listFindings(space, results), space, options, context, results };
}

/**
 * The findings of the next state of the model. The same as a full run, at the price of what the difference touches.
 * A change of ReferenceTypes or of required models asks every question anew and is a full run.
 */
export function updateChecks(last: CheckRun, after: AddressSpace): CheckRun {
  const { space: before, options, context, results } = last;
  if (before === after) return last;
  const changed = before.own.nodes.listChangedKeys(after.own.nodes) as NodeKey[];
  if (needsFullRun(before, after, changed)) return startChecks(after, options);
  const dirty = context.update(after, changed);
  for (const key of changed) dirty.add(key);
  const rules = groupRules(options.rules ?? RULES);
  for (const subject of dirty) checkSubject(subject, context, rules, results);
  return { findings: listFindings(after, results), space: after, options, context, results };
}

function needsFullRun(before: AddressSpace, after: AddressSpace, changed: readonly NodeKey[]): boolean {
  if (before.layers.length !== after.layers.length) return true;
  if (before.layers.some((layer, i) => layer !== after.layers[i] && layer !== before.own)) return true;
  const isReferenceType = (node: Node | undefined): boolean => node?.nodeClass === "ReferenceType";
  return changed.some(
    (key) =>
      isReferenceType(before.own.nodes.get(key)) ||
      isReferenceType(after.own.nodes.get(key)) ||
      before.layers.some((layer) => layer !== before.own && layer.nodes.has(key)),
  );
}

type RuleGroups = {
  readonly model: readonly ModelRule[];
  readonly byClass: ReadonlyMap<NodeClass, readonly NodeRule[]>;
};

const groups = new WeakMap<readonly Rule[], RuleGroups>();

function groupRules(rules: readonly Rule[]): RuleGroups {
  const known = groups.get(rules);
  if (known) return known;
  const isModelRule = (rule: Rule): rule is ModelRule => rule.concerns === "model";
  const nodeRules = rules.filter((r): r is NodeRule => !isModelRule(r));
  const made: RuleGroups = {
    model: rules.filter(isModelRule),
    byClass: new Map(ALL_CLASSES.map((c) => [c, nodeRules.filter((r) => r.concerns.includes(c))] as const)),
  };
  groups.set(rules, made);
  return made;
}

function checkSubject(
  subject: Subject,
  context: CheckContext,
  rules: RuleGroups,
  results: Map<Subject, readonly RawFinding[]>,
): void {
  const found: RawFinding[] = [];
  context.runAs(subject, () => {
    if (subject === "model") {
      for (const rule of rules.model) rule.check(context, (report) => found.push({ ...report, rule }));
      return;
    }
    const node = context.node(subject);
    if (!node || !context.isOwn(subject)) return;
    for (const rule of rules.byClass.get(node.nodeClass) ?? []) {
      rule.check(node, context, (report) => found.push({ key: subject, ...report, rule }));
    }
  });
  if (found.length > 0) results.set(subject, found);
  else results.delete(subject);
}

/** Puts findings in order and gives each its place; places follow renamed parents, so they are made last. */
function listFindings(space: AddressSpace, results: ReadonlyMap<Subject, readonly RawFinding[]>): Finding[] {
  const raw = [...results.values()].flat().filter((f) => f.key === undefined || space.isOwn(f.key));
  const nodeOf = (f: RawFinding): Node | undefined => (f.key === undefined ? undefined : space.getNode(f.key));
  const keyed = raw.map((finding) => ({ finding, node: nodeOf(finding) }));
  keyed.sort(
    (a, b) =>
      (a.node && b.node ? compareRank(a.node, b.node) : Number(a.node !== undefined) - Number(b.node !== undefined)) ||
      compareText(a.finding.rule.id, b.finding.rule.id) ||
      compareText(a.finding.message, b.finding.message) ||
      compareText((a.finding.facts ?? []).join("\n"), (b.finding.facts ?? []).join("\n")),
  );
  return keyed.map(({ finding, node }) => toFinding(space, finding, node));
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}

function toFinding(space: AddressSpace, raw: RawFinding, node: Node | undefined): Finding {
  const { rule, message, facts, severity, attribute, clause, data } = raw;
  return {
    rule: rule.id as RuleId,
    severity: severity ?? rule.severity,
    ...(node ? { key: node.key } : {}),
    nodeId: node ? formatNodeId(node.nodeId) : "",
    browseName: node?.browseName.name ?? "",
    path: node ? getPath(space, node.key) : nameModel(space),
    ...(attribute === undefined ? {} : { attribute }),
    message,
    clause: clause ?? rule.clause,
    facts: facts ?? [],
    ...(data ? { data } : {}),
  };
}

function nameModel(space: AddressSpace): string {
  const { header } = space.own;
  return header.models.length + header.namespaceUris.length === 0 ? "" : getOwnNamespace(header);
}
