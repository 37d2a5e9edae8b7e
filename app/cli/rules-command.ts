/** `rules`: the catalogue of the checker, as text or JSON, or the help of one rule. */
import { FILE_RULES } from "../domain/checks/file-rules";
import { findRule } from "../domain/checks/registry";
import { listRules, type ListedRule } from "../domain/checks/rule-list";
import { UsageError, type RulesCommand } from "./parse-command-line";

export function rules({ id, isJson }: RulesCommand): number {
  const listed = listRules();
  const one = listed.find((rule) => rule.id === id);
  if (id !== undefined && !one) throw new UsageError(`There is no rule ${id}.`);
  if (isJson) process.stdout.write(`${JSON.stringify(one ? { ...one, ...explain(one) } : listed, null, 2)}\n`);
  else process.stdout.write(one ? formatHelp(one) : formatRules(listed));
  return 0;
}

function formatRules(listed: readonly ListedRule[]): string {
  const lines = listed.map(({ id, severity, title, clause, hasFix, reason }) => {
    const marks = reason === undefined ? (hasFix ? " [fix]" : "") : ` [does not run: ${reason}]`;
    return `${id} ${severity.padEnd(7)} ${title}${marks}\n    ${clause}`;
  });
  const running = listed.filter((r) => r.implemented).length;
  const fixes = listed.filter((r) => r.hasFix).length;
  return `${lines.join("\n")}\n${listed.length} rules, ${running} run, ${fixes} can be mended\n`;
}

type Help = {
  readonly condition?: string;
  readonly why?: string;
  readonly fix?: string;
  readonly good?: string;
  readonly bad?: string;
};

function explain({ id }: ListedRule): Help {
  const rule = findRule(id);
  if (!rule) {
    const ofFile = FILE_RULES.find((r) => r.id === id);
    return ofFile ? { condition: ofFile.condition, why: ofFile.why } : {};
  }
  const { condition, why, fix, examples } = rule;
  return { condition, why, ...(fix ? { fix: fix.label } : {}), good: examples.good.text, bad: examples.bad.text };
}

function formatHelp(rule: ListedRule): string {
  const { condition, why, fix, good, bad } = explain(rule);
  const lines: readonly (readonly [label: string, text: string | undefined])[] = [
    ["Clause", rule.clause],
    ["Must hold", condition],
    ["If ignored", why],
    ["Mend", fix ?? (rule.implemented ? "by hand" : undefined)],
    ["Good", good],
    ["Bad", bad],
    ["Does not run", rule.reason],
  ];
  const shown = lines.flatMap(([label, text]) => (text === undefined ? [] : [`  ${label.padEnd(13)}${text}`]));
  return `${rule.id} ${rule.severity}: ${rule.title}\n${shown.join("\n")}\n`;
}
