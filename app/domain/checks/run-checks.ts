/**
 * The runner. `startChecks` checks a whole model and keeps what it learned; `updateChecks` takes the next state of the
 * model and checks again only what the difference can touch. Both answer the same findings for the same model, in one
 * order: the model as a whole first, then node by node in the model's order, rule by rule.
 */
import type { AddressSpace } from "../address-space/address-space";
import { hasValueAttributes, type Node } from "../address-space/node";
import { formatNodeId, type NodeKey } from "../address-space/node-id";
import { getOwnNamespace, type ModelHeader } from "../address-space/model-header";
import { CheckContext } from "./check-context";
import type { Finding, Report } from "./finding";
import { RULES } from "./registry";
import type { ModelRule, NodeRule, Rule } from "./rule";
import type { Subject } from "./slots";

export type CheckOptions = {
  /** Only these rules; all by default. */
  readonly rules?: readonly Rule[];
  /** Called now and then with the number of nodes checked. */
  readonly onProgress?: (done: number, total: number) => void;
  /** Asked as often; true ends the run with what was found until then. */
  readonly shouldStop?: () => boolean;
};

type RankedFinding = { readonly finding: Finding; readonly order: number };

/** A run that can be continued. `updateChecks` takes its memory over: keep the newest run only. */
export type CheckRun = {
  readonly findings: readonly Finding[];
  readonly space: AddressSpace;
  readonly options: CheckOptions;
  readonly context: CheckContext;
  readonly byKind: RulesByKind;
  readonly results: Map<Subject, readonly RankedFinding[]>;
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
  const results = new Map<Subject, readonly RankedFinding[]>();
  const rules = groupRules(options.rules ?? RULES);
  const byKind: RulesByKind = new Map();
  checkSubject("model", context, rules, results, byKind);
  const total = space.own.nodes.size;
  let done = 0;
  for (const key of space.own.nodes.keys()) {
    checkSubject(key as NodeKey, context, rules, results, byKind);
    done++;
    if (done % STEP === 0) yield done;
    if (done % PROGRESS_STEP !== 0) continue;
    options.onProgress?.(done, total);
    if (options.shouldStop?.()) break;
  }
  options.onProgress?.(done, total);
  return { findings: listFindings(results), space, options, context, byKind, results };
}

/**
 * The findings of the next state of the model. The same as a full run, at the price of what the difference touches.
 * A change of ReferenceTypes or of required models asks every question anew and is a full run.
 */
export function updateChecks(last: CheckRun, after: AddressSpace): CheckRun {
  const { space: before, options, context, byKind, results } = last;
  if (before === after) return last;
  const changed = before.own.nodes.listChangedKeys(after.own.nodes) as NodeKey[];
  if (needsFullRun(before, after, changed)) return startChecks(after, options);
  const dirty = context.update(after, changed);
  for (const key of changed) dirty.add(key);
  const rules = groupRules(options.rules ?? RULES);
  for (const subject of dirty) checkSubject(subject, context, rules, results, byKind);
  return { findings: listFindings(results), space: after, options, context, byKind, results };
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
  readonly nodes: readonly NodeRule[];
};

const groups = new WeakMap<readonly Rule[], RuleGroups>();

function groupRules(rules: readonly Rule[]): RuleGroups {
  const known = groups.get(rules);
  if (known) return known;
  const isModelRule = (rule: Rule): rule is ModelRule => rule.concerns === "model";
  const made: RuleGroups = {
    model: rules.filter(isModelRule),
    nodes: rules.filter((rule): rule is NodeRule => !isModelRule(rule)),
  };
  groups.set(rules, made);
  return made;
}

/**
 * The rules that a node can break at all, by its kind: class, types of the references that it declares, whether it has a
 * value and children. A model has a few dozen kinds, and most rules speak of few of them.
 */
function listRulesFor(
  node: Node,
  context: CheckContext,
  { nodes }: RuleGroups,
  byKind: RulesByKind,
): readonly NodeRule[] {
  const hasValue = hasValueAttributes(node) && node.value !== undefined;
  const hasChildren = context.childEdges(node.key).length > 0;
  let kind = `${node.nodeClass}${hasValue ? "+v" : ""}${hasChildren ? "+c" : ""}`;
  for (const { type } of node.references) if (!kind.includes(type)) kind += ` ${type}`;
  let rules = byKind.get(kind);
  if (!rules) {
    rules = nodes.filter(
      ({ concerns, declares, needs }) =>
        concerns.includes(node.nodeClass) &&
        (needs !== "value" || hasValue) &&
        (needs !== "children" || hasChildren) &&
        (declares === undefined || node.references.some((r) => context.closure(declares).has(r.type))),
    );
    byKind.set(kind, rules);
  }
  return rules;
}

type RulesByKind = Map<string, readonly NodeRule[]>;

function checkSubject(
  subject: Subject,
  context: CheckContext,
  rules: RuleGroups,
  results: Map<Subject, readonly RankedFinding[]>,
  byKind: RulesByKind,
): void {
  const found: RankedFinding[] = [];
  context.runAs(subject, () => {
    if (subject === "model") {
      for (const rule of rules.model)
        rule.check(context, (report) => found.push(rank(context, rule, report, undefined)));
      return;
    }
    const node = context.node(subject);
    if (!node || !context.isOwn(subject)) return;
    let current: NodeRule | undefined;
    const report = (reported: Report): void => {
      if (current) found.push(rank(context, current, reported, subject));
    };
    for (const rule of listRulesFor(node, context, rules, byKind)) {
      current = rule;
      rule.check(node, context, report);
    }
  });
  if (found.length > 0) results.set(subject, found);
  else results.delete(subject);
}

/** Places a report; the place is read like everything else, so that a renamed parent changes the paths below it. */
function rank(context: CheckContext, rule: Rule, report: Report, subject: NodeKey | undefined): RankedFinding {
  const { message, facts, severity, attribute, clause, data, key = subject } = report;
  const node = key !== undefined && context.isOwn(key) ? context.node(key) : undefined;
  const finding: Finding = {
    rule: rule.id,
    severity: severity ?? rule.severity,
    ...(node ? { key: node.key } : {}),
    nodeId: node ? formatNodeId(node.nodeId) : "",
    browseName: node?.browseName.name ?? "",
    path: node ? context.pathOf(node.key) : nameModel(context.header),
    ...(attribute === undefined ? {} : { attribute }),
    message,
    clause: clause ?? rule.clause,
    facts: facts ?? [],
    ...(data ? { data } : {}),
  };
  return { finding, order: node?.order ?? -1 };
}

/** All findings in order: by place in the model, then by rule. */
function listFindings(results: ReadonlyMap<Subject, readonly RankedFinding[]>): Finding[] {
  const ranked = [...results.values()].flat();
  ranked.sort(
    (a, b) =>
      a.order - b.order ||
      compareText(a.finding.key ?? "", b.finding.key ?? "") ||
      compareText(a.finding.rule, b.finding.rule) ||
      compareText(a.finding.message, b.finding.message) ||
      compareText(a.finding.facts.join("\n"), b.finding.facts.join("\n")),
  );
  return ranked.map(({ finding }) => finding);
}

function compareText(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}

function nameModel(header: ModelHeader): string {
  return header.models.length + header.namespaceUris.length === 0 ? "" : getOwnNamespace(header);
}
