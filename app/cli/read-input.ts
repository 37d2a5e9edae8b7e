/** What both commands do first: read the file and the folders given by `--with`. */
import { readFile, stat } from "node:fs/promises";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { READ_LIMITS } from "../domain/nodeset/limits";
import type { NodeSetContent } from "../domain/nodeset/nodeset-content";
import { findNodeSets } from "../library/find-nodesets.server";
import type { LibraryEntry } from "../library/library-entry";
import { readHere } from "../library/read-file.server";
import { resolvePath } from "./parse-command-line";

export async function readInput(file: string): Promise<Result<NodeSetContent>> {
  try {
    const path = resolvePath(file);
    const { size } = await stat(path);
    if (size > READ_LIMITS.maxBytes) return fail(problem("limit.file-size", { size, limit: READ_LIMITS.maxBytes }));
    return readHere(await readFile(path));
  } catch (error) {
    const detail = error instanceof Error ? error.message : String(error);
    return fail(problem("file.unreadable", { file, detail }));
  }
}

export async function readFolders(folders: readonly string[]): Promise<Result<LibraryEntry[]>> {
  const entries: LibraryEntry[] = [];
  const problems: Problem[] = [];
  for (const folder of folders) {
    const found = await findNodeSets(resolvePath(folder));
    problems.push(...found.problems);
    if (!found.ok) return fail(...problems);
    entries.push(...found.value);
  }
  return ok(entries, problems);
}
