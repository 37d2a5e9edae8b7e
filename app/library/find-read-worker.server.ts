/** Finds the worker bundle, seen from wherever this module was bundled into. */
import { existsSync } from "node:fs";
import { join, sep } from "node:path";
import { fileURLToPath } from "node:url";

/**
 * The built worker, or undefined when this module runs from its source (tests, development): a build could then be older
 * than the source.
 */
export function findReadWorker(): string | undefined {
  const here = fileURLToPath(import.meta.url);
  const at = here.lastIndexOf(`${sep}build${sep}`);
  if (at < 0) return undefined;
  const file = join(here.slice(0, at), "build", "node", "read-worker.js");
  return existsSync(file) ? file : undefined;
}
