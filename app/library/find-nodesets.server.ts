/** Finds NodeSet2 files below a folder, within bounds: a wrong folder must not cost minutes. */
import { readdir, readFile, stat } from "node:fs/promises";
import { basename, join } from "node:path";
import { fail, ok, problem, type Problem, type Result } from "../domain/core/result";
import { READ_LIMITS } from "../domain/nodeset/limits";
import { recogniseFile } from "../domain/nodeset/recognise-file";
import { describeBytes } from "./describe-nodeset.server";
import type { LibraryEntry } from "./library-entry";

const MAX_FILES = 2_000;
const MAX_DEPTH = 8;

/** Files that are no NodeSet2 are passed over; one that is broken is a warning. Problem: `library.folder-missing`. */
export async function findNodeSets(folder: string): Promise<Result<LibraryEntry[]>> {
  const isFolder = await stat(folder).then(
    (found) => found.isDirectory(),
    () => false,
  );
  if (!isFolder) return fail(problem("library.folder-missing", { folder }));
  const problems: Problem[] = [];
  const entries: LibraryEntry[] = [];
  const paths = await listXmlFiles(folder, 0);
  if (paths.length > MAX_FILES) problems.push(problem.warning("library.folder-limit", { folder, limit: MAX_FILES }));
  for (const path of paths.slice(0, MAX_FILES)) {
    const entry = await describeFile(path, problems);
    if (entry) entries.push(entry);
  }
  return ok(entries, problems);
}

async function listXmlFiles(folder: string, depth: number): Promise<string[]> {
  const found: string[] = [];
  const children = await readdir(folder, { withFileTypes: true }).catch(() => []);
  for (const child of children.sort((a, b) => (a.name < b.name ? -1 : 1))) {
    const path = join(folder, child.name);
    if (child.isFile() && /\.xml$/i.test(child.name)) found.push(path);
    else if (child.isDirectory() && depth < MAX_DEPTH && child.name !== "node_modules") {
      found.push(...(await listXmlFiles(path, depth + 1)));
    }
    if (found.length > MAX_FILES) break;
  }
  return found;
}

async function describeFile(path: string, problems: Problem[]): Promise<LibraryEntry | undefined> {
  const size = await stat(path).then(
    (found) => found.size,
    () => Number.POSITIVE_INFINITY,
  );
  if (size > READ_LIMITS.maxBytes) return undefined;
  const bytes = await readFile(path);
  if (recogniseFile(bytes).kind !== "nodeset") return undefined;
  const entry = describeBytes(bytes, basename(path), { kind: "file", path });
  if (entry.ok) return entry.value;
  const first = entry.problems[0];
  problems.push(problem.warning("library.unreadable", { file: path, detail: first?.code ?? "" }, first?.at));
  return undefined;
}
