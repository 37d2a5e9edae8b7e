/** `roundtrip`: reads a file and writes it again. Required models are not needed: values stay as they stand. */
import { randomUUID } from "node:crypto";
import { rename, rm, writeFile } from "node:fs/promises";
import { problem, type Problem } from "../domain/core/result";
import { writeNodeSet } from "../domain/nodeset/write-nodeset";
import { resolvePath, type RoundtripCommand } from "./parse-command-line";
import { printProblems } from "./print-problems";
import { readFolders, readInput } from "./read-input";

export async function roundtrip(command: RoundtripCommand): Promise<number> {
  const folders = await readFolders(command.folders);
  printProblems(command.input, folders.problems);
  if (!folders.ok) return 2;
  const content = await readInput(command.input);
  printProblems(command.input, content.problems);
  if (!content.ok) return 2;
  if (!content.value.isWhole) {
    printProblems(command.input, [problem("roundtrip.not-whole", { output: command.output })]);
    return 1;
  }
  const { xml } = writeNodeSet(content.value, { canonicalOrder: command.isCanonical });
  const failure = await save(resolvePath(command.output), xml);
  if (failure) {
    printProblems(command.output, [failure]);
    return 2;
  }
  process.stdout.write(`${command.output}: ${content.value.nodes.length} nodes\n`);
  return content.problems.some((found) => found.severity === "error") ? 1 : 0;
}

/** Written beside and renamed, so that a full disk leaves the old file. */
async function save(file: string, xml: string): Promise<Problem | undefined> {
  const temporary = `${file}.${randomUUID()}.part`;
  try {
    await writeFile(temporary, xml);
    await rename(temporary, file);
    return undefined;
  } catch (error) {
    await rm(temporary, { force: true }).catch(() => undefined);
    return problem("file.unwritable", { file, detail: error instanceof Error ? error.message : String(error) });
  }
}
