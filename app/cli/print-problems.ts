/** Problems on the command line: one line each in the form that editors and pipelines turn into links, or one JSON document. */
import { formatProblem } from "../domain/core/problem-texts";
import type { Problem } from "../domain/core/result";

/** The place is a line of the file, or a path in it where the file is JSON. */
export function formatProblemLine(file: string, found: Problem): string {
  const { line = 1, column = 1, path } = found.at ?? {};
  const place = path === undefined ? `${line}:${column}` : path;
  return `${file}:${place}: ${found.severity}: ${formatProblem(found)} [${found.code}]`;
}

export function toProblemRow(file: string, found: Problem) {
  const { line = null, column = null, path } = found.at ?? {};
  const { code, severity } = found;
  const place = path === undefined ? { line, column } : { line, column, at: path };
  return { file, code, severity, message: formatProblem(found), ...place };
}

/** Lines on the error output. */
export function printProblems(file: string, problems: readonly Problem[]): void {
  for (const found of problems) process.stderr.write(`${formatProblemLine(file, found)}\n`);
}

/** The exit status of a command that could not do its work, said why. */
export function refuse({ isJson }: { readonly isJson: boolean }, file: string, problems: readonly Problem[]): number {
  const rows = problems.map((found) => toProblemRow(file, found));
  if (isJson) process.stdout.write(`${JSON.stringify({ problems: rows }, null, 2)}\n`);
  else printProblems(file, problems);
  return 2;
}
