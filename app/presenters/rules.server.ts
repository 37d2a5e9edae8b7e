/** The catalogue of the checker, and the help of one rule: its examples are built and checked when they are shown. */
import type { Layer } from "../domain/address-space/address-space";
import { OPC_UA_NAMESPACE } from "../domain/address-space/node-id";
import { FILE_RULES } from "../domain/checks/file-rules";
import type { Finding } from "../domain/checks/finding";
import { findRule } from "../domain/checks/registry";
import { listRules, type ListedRule } from "../domain/checks/rule-list";
import type { Example, Rule } from "../domain/checks/rule";
import { runExample, type ExampleRun } from "../domain/checks/run-example";
import { writeNodeSet } from "../domain/nodeset/write-nodeset";
import { getLibrary } from "../library/library.server";

export type ShownExample = {
  readonly text: string;
  /** The elements of the nodes as a NodeSet2 file has them; the mapping and its sources as JSON. */
  readonly source: string;
  readonly wiring?: string;
  readonly findings: readonly Pick<Finding, "severity" | "message" | "facts" | "path" | "clause">[];
};

export type RuleHelp = ListedRule & {
  readonly condition?: string;
  readonly why?: string;
  readonly concerns?: string;
  readonly fix?: string;
  readonly good?: ShownExample;
  readonly bad?: ShownExample;
  readonly previous?: string;
  readonly next?: string;
};

/** The models that examples stand on. */
const REQUIRED = [OPC_UA_NAMESPACE, "http://opcfoundation.org/UA/DI/", "http://opcfoundation.org/UA/Machinery/"];
const MAX_LINES = 120;

export async function readRuleHelp(id: string): Promise<RuleHelp | undefined> {
  const all = listRules();
  const at = all.findIndex((r) => r.id === id);
  const listed = all[at];
  if (!listed) return undefined;
  const [previous, next] = [all[at - 1]?.id, all[at + 1]?.id];
  const around = { ...(previous ? { previous } : {}), ...(next ? { next } : {}) };
  const rule = findRule(id);
  const ofFile = FILE_RULES.find((r) => r.id === id);
  if (ofFile) return { ...listed, ...around, condition: ofFile.condition, why: ofFile.why, concerns: "Files" };
  if (!rule) return { ...listed, ...around };
  const resolved = await getLibrary().resolve(REQUIRED.map((modelUri) => ({ modelUri, requiredModels: [] })));
  const layers = resolved.ok ? resolved.value : [];
  return {
    ...listed,
    ...around,
    condition: rule.condition,
    why: rule.why,
    concerns: nameConcerns(rule),
    ...(rule.fix ? { fix: rule.fix.label } : {}),
    good: showExample(rule, rule.examples.good, layers),
    bad: showExample(rule, rule.examples.bad, layers),
  };
}

function nameConcerns({ concerns }: Rule): string {
  if (concerns === "model") return "The model as a whole";
  if (concerns === "wiring") return "Mappings, machines and sources";
  return concerns.length === 8 ? "All nodes" : concerns.join(", ");
}

function showExample(rule: Rule, example: Example, required: readonly Layer[]): ShownExample {
  const run = runExample(rule, example, required);
  const findings = run.findings.map(({ severity, message, facts, path, clause }) => ({
    severity,
    message,
    facts,
    path,
    clause,
  }));
  const wiring = run.wiring ? { wiring: cut(JSON.stringify(toShownWiring(run.wiring), undefined, 2).split("\n")) } : {};
  return { text: run.text, source: toSource(run), ...wiring, findings };
}

function toShownWiring({ mappings, machines, sources }: NonNullable<ExampleRun["wiring"]>): object {
  return { mappings: mappings.map((m) => m.mapping), machines, sources };
}

/** The lines of the example's nodes; of a rule about the header those of the head. */
function toSource({ header, nodes, shown }: ExampleRun): string {
  const { xml, lines } = writeNodeSet({ header, nodes });
  const text = xml.split("\n");
  const starts = [...lines.values()].sort((a, b) => a - b);
  if (shown.size === 0) return cut(text.slice(0, (starts[0] ?? text.length) - 1));
  const picked = [...shown].flatMap((key) => {
    const start = lines.get(key) ?? 1;
    const end = starts.find((line) => line > start) ?? text.length - 1;
    return text.slice(start - 1, end - 1);
  });
  return cut(picked.map((line) => line.replace(/^ {2}/, "")));
}

function cut(lines: readonly string[]): string {
  const shown = lines.slice(0, MAX_LINES);
  return [...shown, ...(lines.length > MAX_LINES ? [`… ${lines.length - MAX_LINES} more lines`] : [])].join("\n");
}
