/** `rules`: the catalogue of the checker, as text or JSON. */
import { listRules, type ListedRule } from "../domain/checks/rule-list";
import type { RulesCommand } from "./parse-command-line";

export function rules({ isJson }: RulesCommand): number {
  const listed = listRules();
  process.stdout.write(isJson ? `${JSON.stringify(listed, null, 2)}\n` : formatRules(listed));
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
