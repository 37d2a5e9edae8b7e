/** `check`: the findings of one file, as text or JSON. */
import { AddressSpace, buildLayer } from "../domain/address-space/address-space";
import { getOwnNamespace } from "../domain/address-space/model-header";
import { runChecks } from "../domain/checks/run-checks";
import { toReport, type CheckReport } from "../domain/checks/to-report";
import type { Problem } from "../domain/core/result";
import type { NodeSetContent } from "../domain/nodeset/nodeset-content";
import { listRequired } from "../library/describe-nodeset.server";
import { getLibrary } from "../library/library.server";
import type { CheckCommand } from "./parse-command-line";
import { formatReport } from "./format-report";
import { readFolders, readInput } from "./read-input";

export async function check(command: CheckCommand): Promise<number> {
  const content = await readInput(command.file);
  if (!content.ok)
    return print(command, toReport([], { file: command.file, lines: new Map(), problems: content.problems }), 2);
  const folders = await readFolders(command.folders);
  const problems = [...content.problems, ...folders.problems];
  const { lines } = content.value;
  if (!folders.ok) return print(command, toReport([], { file: command.file, lines, problems }), 2);
  const { header } = content.value;
  const layers = await getLibrary().resolve(listRequired(header), {
    extra: folders.value,
    requiredBy: getOwnNamespace(header),
  });
  problems.push(...layers.problems);
  const isComplete = layers.ok && layers.problems.every((found) => found.severity !== "error");
  if (!isComplete) return print(command, toReport([], { file: command.file, lines, problems }), 2);
  const report = checkContent(command.file, content.value, layers.value, problems);
  const hasErrors = report.counts.error > 0 || problems.some((found) => found.severity === "error");
  return print(command, report, hasErrors ? 1 : 0);
}

function checkContent(
  file: string,
  content: NodeSetContent,
  layers: Parameters<typeof AddressSpace.of>[0],
  problems: readonly Problem[],
): CheckReport {
  const space = AddressSpace.of(layers, buildLayer(content.header, content.nodes));
  return toReport(runChecks(space), { file, lines: content.lines, problems });
}

function print(command: CheckCommand, report: CheckReport, code: number): number {
  process.stdout.write(command.isJson ? `${JSON.stringify(report, null, 2)}\n` : formatReport(report));
  return code;
}
