import { existsSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

/** The folder of the installation, found upwards from this module, so that it does not depend on the working directory. */
export function findProjectRoot(from = dirname(fileURLToPath(import.meta.url))): string {
  let folder = from;
  while (!existsSync(join(folder, "drizzle", "meta", "_journal.json"))) {
    const parent = dirname(folder);
    if (parent === folder) throw new Error(`The installation folder was not found above ${from}`);
    folder = parent;
  }
  return folder;
}
